import { DIMENSIONLESS, sameDimension, type Dimension } from '../../quantity/dimension.ts'
import { finite, isNumeric, isRefusal, type Outcome } from '../arithmetic.ts'
import { describeKind, describeValue, quantity } from '../describe.ts'
import { FormulaError } from '../formula-error.ts'
import { math } from '../mathematics.ts'
import type { Quantity, QuantityArray, Value } from '../types.ts'
import { anyQuantity, argumentAt, expectCount, misused, numberOf, ordinalOf } from './arguments.ts'
import type { CallContext, SheetFunction } from './types.ts'

type Call = SheetFunction['call']

const arithmetic = (
  name: string,
  signature: string,
  summary: string,
  explain: string,
  call: Call,
): SheetFunction => ({
  name,
  signature,
  summary,
  explain,
  group: 'arithmetic',
  call,
})

/** Refuses a result that is infinite or not a number, with the argument that led to it. */
function usable(outcome: Outcome<Quantity>, argument: Value, context: CallContext): Quantity {
  if (!isRefusal(outcome)) return outcome
  const rule = outcome.refused === 'not-real' ? 'not-real' : 'not-finite'
  const what = rule === 'not-real' ? 'has no real value' : 'has no finite value'
  throw new FormulaError(
    rule,
    `\`${context.source(context.formula)}\` ${what}: the argument is ${describeValue(argument)}`,
    'check the argument; it is outside the range of the function',
    context.formula.span,
  )
}

/** A function of one number without unit (an angle in radians is one). */
function ofNumber(
  name: string,
  f: (x: number) => number,
  summary: string,
  range = 'any number',
): SheetFunction {
  const signature = `${name}(x)`
  return arithmetic(
    name,
    signature,
    summary,
    `x: a number without unit, ${range}; an angle in rad or deg is such a number. Gives a number without unit.`,
    (args, context) => {
      expectCount(args, 1, 1, context, signature)
      const argument = args[0] as Value
      const x = numberOf(argument, argumentAt(context, 0), `the argument of \`${name}\``, context)
      const result = f(x)
      const outcome: Outcome<Quantity> = Number.isNaN(result)
        ? { refused: 'not-real' }
        : finite(result, DIMENSIONLESS)
      return usable(outcome, argument, context)
    },
  )
}

/** A function of one quantity whose dimension is raised to a power. */
function ofQuantity(
  name: string,
  f: (x: number) => number,
  exponent: number,
  summary: string,
  explain: string,
): SheetFunction {
  const signature = `${name}(x)`
  return arithmetic(name, signature, summary, explain, (args, context) => {
    expectCount(args, 1, 1, context, signature)
    const value = anyQuantity(args[0] as Value, argumentAt(context, 0), `the argument of \`${name}\``)
    const result = f(value.si)
    const dimension = scaled(value.dimension, exponent)
    return usable(Number.isNaN(result) ? { refused: 'not-real' } : finite(result, dimension), value, context)
  })
}

function scaled(dimension: Dimension, exponent: number): Dimension {
  return dimension.map((part) => part * exponent) as unknown as Dimension
}

/** Rounding is done on plain numbers only: what it does to a quantity would depend on the unit. */
function rounding(name: string, f: (x: number) => number, summary: string): SheetFunction {
  return ofNumber(
    name,
    f,
    summary,
    'any number; divide a quantity by its unit first, as in `ceil(L/(1 mm))*(1 mm)`',
  )
}

/** The arguments as quantities of one dimension: several of them, or the entries of one array. */
function alike(
  args: readonly Value[],
  context: CallContext,
  signature: string,
): { values: readonly number[]; dimension: Dimension } {
  expectCount(args, 1, Infinity, context, signature)
  const [first] = args as [Value]
  if (args.length === 1 && first.type === 'array')
    return {
      values: (first.si as readonly (number | readonly number[])[]).flat(),
      dimension: first.dimension,
    }
  const values = args.map((arg, i) =>
    anyQuantity(arg, argumentAt(context, i), `argument ${i + 1} of \`${context.formula.name}\``),
  )
  const odd = values.findIndex((value) => !sameDimension(value.dimension, (values[0] as Quantity).dimension))
  if (odd > 0) {
    const part = argumentAt(context, odd)
    const message = `\`${context.formula.name}\` compares ${describeValue(first)} and ${describeValue(values[odd] as Quantity)}: ${describeKind(first)} and ${describeKind(values[odd] as Quantity)}`
    throw new FormulaError(
      'unit-mismatch',
      message,
      `check the unit of \`${context.source(part)}\``,
      part.span,
    )
  }
  return { values: values.map((value) => value.si), dimension: (values[0] as Quantity).dimension }
}

function overAlike(name: string, f: (values: readonly number[]) => number, summary: string): SheetFunction {
  const signature = `${name}(a, b, …)`
  return arithmetic(
    name,
    signature,
    summary,
    `a, b, …: quantities of one dimension, or one array. Gives a quantity of that dimension.`,
    (args, context) => {
      const { values, dimension } = alike(args, context, signature)
      if (values.length === 0)
        throw misused(argumentAt(context, 0), 'the array has no entries', 'give at least one value')
      return usable(finite(f(values), dimension), args[0] as Value, context)
    },
  )
}

/** Adds from the smallest magnitude up, in an order that does not depend on how the arguments stand. */
const total = (values: readonly number[]): number =>
  [...values].sort((a, b) => Math.abs(a) - Math.abs(b) || a - b).reduce((sum, value) => sum + value, 0)

function arrayOf(value: Value, context: CallContext, index: number): QuantityArray {
  if (value.type === 'array') return value
  const part = argumentAt(context, index)
  throw misused(
    part,
    `\`${context.source(part)}\` is ${describeKind(value)}, and an array was expected`,
    'write it as `[a, b]` or `[a, b; c, d]`',
  )
}

/** An operation of linear algebra done by mathjs on the array's numbers. */
function onMatrix(
  name: string,
  exponent: number,
  f: (si: never) => unknown,
  summary: string,
  explain: string,
): SheetFunction {
  const signature = `${name}(A)`
  return arithmetic(name, signature, summary, explain, (args, context) => {
    expectCount(args, 1, 1, context, signature)
    const array = arrayOf(args[0] as Value, context, 0)
    let raw: unknown
    try {
      raw = f(array.si as never)
    } catch (cause) {
      throw misused(
        argumentAt(context, 0),
        `\`${name}\` has no result: ${cause instanceof Error ? lowerFirst(cause.message) : 'the matrix does not allow it'}`,
        'check the number of rows and columns, and that the matrix is not singular',
        cause,
      )
    }
    const dimension = scaled(array.dimension, name === 'det' ? array.si.length : exponent)
    if (typeof raw === 'number') return usable(finite(raw, dimension), array, context)
    return { type: 'array', si: raw as number[][], dimension }
  })
}

function lowerFirst(text: string): string {
  return text.charAt(0).toLowerCase() + text.slice(1)
}

const atan2: SheetFunction = arithmetic(
  'atan2',
  'atan2(y, x)',
  'angle of the direction (x, y), from −π to π',
  'y, x: quantities of one dimension, not both zero. Gives an angle.',
  (args, context) => {
    expectCount(args, 2, 2, context, 'atan2(y, x)')
    const { values } = alike(args, context, 'atan2(y, x)')
    return quantity(Math.atan2(values[0] as number, values[1] as number), DIMENSIONLESS)
  },
)

const nthRoot: SheetFunction = arithmetic(
  'nthRoot',
  'nthRoot(x, n)',
  'n-th root of a quantity',
  'x: a quantity, not negative; n: a whole number from 1. Gives a quantity of dimension x^(1/n).',
  (args, context) => {
    expectCount(args, 2, 2, context, 'nthRoot(x, n)')
    const value = anyQuantity(args[0] as Value, argumentAt(context, 0), 'the argument of `nthRoot`')
    const n = ordinalOf(args[1] as Value, argumentAt(context, 1), 'the index of the root', context)
    const outcome: Outcome<Quantity> =
      value.si < 0
        ? { refused: 'not-real' }
        : finite(Math.pow(value.si, 1 / n), scaled(value.dimension, 1 / n))
    return usable(outcome, value, context)
  },
)

const log: SheetFunction = arithmetic(
  'log',
  'log(x)',
  'natural logarithm',
  'x: a number without unit, above zero. For base 10 use `log10(x)`. Gives a number without unit.',
  (args, context) => {
    expectCount(args, 1, 1, context, 'log(x)')
    const argument = args[0] as Value
    const x = numberOf(argument, argumentAt(context, 0), 'the argument of `log`', context)
    return usable(x < 0 ? { refused: 'not-real' } : finite(Math.log(x), DIMENSIONLESS), argument, context)
  },
)

const mod: SheetFunction = arithmetic(
  'mod',
  'mod(x, y)',
  'what remains of x after whole multiples of y',
  'x, y: quantities of one dimension, y above zero. Gives a quantity of that dimension, from 0 up to y.',
  (args, context) => {
    expectCount(args, 2, 2, context, 'mod(x, y)')
    const { values, dimension } = alike(args, context, 'mod(x, y)')
    const [x, y] = values as [number, number]
    return usable(
      y > 0 ? finite(x - y * Math.floor(x / y), dimension) : { refused: 'not-finite' },
      args[1] as Value,
      context,
    )
  },
)

const round: SheetFunction = arithmetic(
  'round',
  'round(x) or round(x, n)',
  'rounds to n decimals (0 when n is left out), halves away from zero',
  'x: a number without unit; n: decimals, 0 to 15. To round a quantity divide it by its unit first.',
  (args, context) => {
    expectCount(args, 1, 2, context, 'round(x, n)')
    const x = numberOf(args[0] as Value, argumentAt(context, 0), 'the argument of `round`', context)
    const decimals = args[1]
      ? numberOf(args[1], argumentAt(context, 1), 'the number of decimals', context)
      : 0
    if (!Number.isInteger(decimals) || decimals < 0 || decimals > 15)
      throw misused(
        argumentAt(context, 1),
        `the number of decimals is ${decimals}`,
        'use a whole number from 0 to 15',
      )
    const [digits, exponent] = Math.abs(x).toString().split('e') as [string, string | undefined]
    const shifted = Math.round(Number(`${digits}e${Number(exponent ?? 0) + decimals}`))
    return quantity(Math.sign(x) * Number(`${shifted}e${-decimals}`), DIMENSIONLESS)
  },
)

const count: SheetFunction = arithmetic(
  'count',
  'count(v)',
  'number of entries of an array or list',
  'v: an array or a list. Gives a whole number.',
  (args, context) => {
    expectCount(args, 1, 1, context, 'count(v)')
    const value = args[0] as Value
    if (value.type === 'list') return quantity(value.items.length, DIMENSIONLESS)
    return quantity(arrayOf(value, context, 0).si.length, DIMENSIONLESS)
  },
)

const norm: SheetFunction = arithmetic(
  'norm',
  'norm(v)',
  'length of a vector (square root of the sum of squares)',
  'v: an array. Gives a quantity of its dimension.',
  (args, context) => {
    expectCount(args, 1, 1, context, 'norm(v)')
    const array = arrayOf(args[0] as Value, context, 0)
    if (!isNumeric(array))
      throw misused(argumentAt(context, 0), 'an array was expected', 'write it as `[a, b]`')
    return usable(
      finite(Math.hypot(...(array.si as readonly (number | readonly number[])[]).flat()), array.dimension),
      array,
      context,
    )
  },
)

const sign = (name: string): SheetFunction =>
  arithmetic(
    name,
    `${name}(x)`,
    '1, 0 or −1 as x is positive, zero or negative',
    'x: a quantity. Gives a number without unit.',
    (args, context) => {
      expectCount(args, 1, 1, context, `${name}(x)`)
      return quantity(
        Math.sign(anyQuantity(args[0] as Value, argumentAt(context, 0), 'the argument of `sign`').si) + 0,
        DIMENSIONLESS,
      )
    },
  )

const hypot = overAlike('hypot', (values) => Math.hypot(...values), 'square root of the sum of squares')

/** Arithmetic beyond the operators. Trigonometry is in radians. */
export const ELEMENTARY: readonly SheetFunction[] = [
  ofQuantity(
    'abs',
    Math.abs,
    1,
    'magnitude',
    'x: a quantity. Gives a quantity of its dimension, not negative.',
  ),
  ofNumber('acos', Math.acos, 'angle whose cosine is x', 'from −1 to 1'),
  ofNumber('acosh', Math.acosh, 'inverse hyperbolic cosine', 'from 1'),
  ofNumber('asin', Math.asin, 'angle whose sine is x', 'from −1 to 1'),
  ofNumber('asinh', Math.asinh, 'inverse hyperbolic sine'),
  ofNumber('atan', Math.atan, 'angle whose tangent is x'),
  atan2,
  ofNumber('atanh', Math.atanh, 'inverse hyperbolic tangent', 'between −1 and 1'),
  ofQuantity('cbrt', Math.cbrt, 1 / 3, 'cube root', 'x: a quantity. Gives a quantity of dimension x^(1/3).'),
  rounding('ceil', Math.ceil, 'smallest whole number not below x'),
  ofNumber('cos', Math.cos, 'cosine'),
  ofNumber('cosh', Math.cosh, 'hyperbolic cosine'),
  ofNumber('cot', (x) => 1 / Math.tan(x), 'cotangent', 'not a multiple of π'),
  count,
  onMatrix(
    'det',
    NaN,
    (si) => math.det(si),
    'determinant',
    'A: a square array. Gives a quantity of dimension A^n for n rows.',
  ),
  ofNumber('exp', Math.exp, 'exponential function'),
  rounding('floor', Math.floor, 'largest whole number not above x'),
  hypot,
  onMatrix(
    'inv',
    -1,
    (si) => math.inv(si),
    'inverse matrix',
    'A: a square array that is not singular. Gives an array of dimension 1/A.',
  ),
  log,
  ofNumber('log10', (x) => (x < 0 ? NaN : Math.log10(x)), 'logarithm to base 10', 'above zero'),
  overAlike('max', (values) => Math.max(...values), 'largest of several'),
  overAlike('mean', (values) => total(values) / values.length, 'arithmetic mean'),
  overAlike('min', (values) => Math.min(...values), 'smallest of several'),
  mod,
  norm,
  nthRoot,
  round,
  sign('sign'),
  ofNumber('sin', Math.sin, 'sine'),
  ofNumber('sinh', Math.sinh, 'hyperbolic sine'),
  ofQuantity(
    'sqrt',
    Math.sqrt,
    1 / 2,
    'square root',
    'x: a quantity, not negative. Gives a quantity of dimension x^(1/2).',
  ),
  overAlike('sum', total, 'sum of several or of an array'),
  ofNumber('tan', Math.tan, 'tangent', 'not an odd multiple of π/2'),
  ofNumber('tanh', Math.tanh, 'hyperbolic tangent'),
  onMatrix(
    'transpose',
    1,
    (si) => math.transpose(si),
    'transposed matrix',
    'A: an array of rows. Gives an array.',
  ),
]
