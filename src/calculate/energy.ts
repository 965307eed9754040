import { DIMENSIONLESS, sameDimension, type Dimension } from '../quantity/dimension.ts'
import type { Span } from '../sheet/types.ts'
import { evaluate } from './evaluate.ts'
import { scopeOfFunction } from './scope.ts'
import { findFunction } from './functions/index.ts'
import { FormulaError } from './formula-error.ts'
import { isSmoothFunction, Symbolic, type Term } from './symbolic.ts'
import { quantity } from './describe.ts'
import { partsOf } from './parts-of.ts'
import type { Formula, FunctionValue, Quantity } from './types.ts'

/** What a coordinate is measured by: 1 for an angle, or the size that the sheet gives. */
export interface CoordinateSize {
  readonly name: string
  readonly size: Quantity
}

/** A total potential energy of plain SI numbers, with its exact partial derivatives. The last argument of the sheet's function is the load. */
export interface EnergyFunction {
  readonly coordinates: readonly CoordinateSize[]
  readonly loadName: string
  readonly loadDimension: Dimension
  readonly energyDimension: Dimension
  energy(q: readonly number[], load: number): number
  /** The partial derivative of the given order in each coordinate and in the load. Made once, kept. */
  partial(orders: readonly number[], loadOrder: number): (q: readonly number[], load: number) => number
}

/** Dimensions that a load may have, the likeliest first: force, moment, force per length, pressure, number, acceleration. */
const LOAD_DIMENSIONS: readonly Dimension[] = [
  [1, 1, -2, 0],
  [1, 2, -2, 0],
  [1, 0, -2, 0],
  [1, -1, -2, 0],
  [0, 0, 0, 0],
  [0, 1, -2, 0],
]
const ENERGY: Dimension = [1, 2, -2, 0]

export interface EnergyContext {
  /** A formula's own text, for messages. */
  source(span: Span): string
  readonly budget: { left: number }
}

/**
 * Makes the plain energy function of a sheet's `V(q1, …, P)`: finds the load's dimension by calculating V with units,
 * turns V into terms, and confirms at a trial state that both give the same.
 *
 * @throws FormulaError when V is not smooth, its dimensions do not fit, or the two calculations differ
 */
export function energyFunction(
  fn: FunctionValue,
  coordinates: readonly CoordinateSize[],
  context: EnergyContext,
): EnergyFunction {
  const loadName = fn.parameters.at(-1) as string
  const trial = coordinates.map(({ size }, i) => (0.1 * size.si * (i + 1)) / coordinates.length)
  const { loadDimension, value } = findLoadDimension(fn, coordinates, trial, context)
  const graph = new Symbolic()
  const root = toTerm(
    fn,
    fn.parameters.map((_, i) => graph.variable(i)),
    graph,
    context,
  )
  const energy = graph.compile(root)
  const n = coordinates.length
  const call = (f: (v: ArrayLike<number>) => number) => {
    const variables = new Float64Array(n + 1)
    return (q: readonly number[], load: number): number => {
      for (let i = 0; i < n; i++) variables[i] = q[i] as number
      variables[n] = load
      return f(variables)
    }
  }
  const plain = call(energy)
  const reduced = plain(trial, 1)
  if (!(Math.abs(reduced - value.si) <= 1e-9 * Math.max(Math.abs(reduced), Math.abs(value.si)))) {
    throw new FormulaError(
      'cross-check-failed',
      `the energy at a trial state is ${value.si} by the calculation with units and ${reduced} by plain numbers`,
      'report this as a fault of the program',
      fn.body.span,
    )
  }
  const partials = new Map<string, (q: readonly number[], load: number) => number>()
  return {
    coordinates,
    loadName,
    loadDimension,
    energyDimension: value.dimension,
    energy: plain,
    partial(orders, loadOrder) {
      const key = [...orders, loadOrder].join()
      let partial = partials.get(key)
      if (!partial) {
        let term = root
        for (const [i, order] of [...orders, loadOrder].entries())
          for (let k = 0; k < order; k++) term = graph.derivative(term, i)
        partial = call(graph.compile(term))
        partials.set(key, partial)
      }
      return partial
    },
  }
}

function findLoadDimension(
  fn: FunctionValue,
  coordinates: readonly CoordinateSize[],
  trial: readonly number[],
  context: EnergyContext,
): { loadDimension: Dimension; value: Quantity } {
  const fits: { loadDimension: Dimension; value: Quantity }[] = []
  let first: unknown
  for (const loadDimension of LOAD_DIMENSIONS) {
    const args = [
      ...coordinates.map(({ size }, i) => quantity(trial[i] as number, size.dimension)),
      quantity(1, loadDimension),
    ]
    try {
      const value = evaluate(fn.body, scopeOfFunction(fn, args, context))
      if (value.type !== 'quantity')
        throw new FormulaError(
          'function-misused',
          `\`${fn.name}\` does not give a quantity`,
          'write the total potential energy',
          fn.body.span,
        )
      fits.push({ loadDimension, value })
    } catch (cause) {
      if (!(cause instanceof FormulaError)) throw cause
      first ??= cause
    }
  }
  const chosen = fits.find(({ value }) => sameDimension(value.dimension, ENERGY)) ?? fits[0]
  if (!chosen) throw first
  if (
    !sameDimension(chosen.value.dimension, ENERGY) &&
    !sameDimension(chosen.value.dimension, DIMENSIONLESS)
  ) {
    throw new FormulaError(
      'unit-mismatch',
      `\`${fn.name}\` is not an energy, whatever unit its load \`${fn.parameters.at(-1)}\` has`,
      'a total potential energy is force times length; give coordinates that are not angles their size, as in `mechanism(V, {w: 1 mm})`',
      fn.body.span,
    )
  }
  return chosen
}

/** Turns a function's body into a term, with `args` in place of its parameters. What holds no parameter is calculated once. */
function toTerm(fn: FunctionValue, args: readonly Term[], graph: Symbolic, context: EnergyContext): Term {
  const parameters = new Map(fn.parameters.map((name, i) => [name, args[i] as Term]))
  const scope = scopeOfFunction({ ...fn, parameters: [] }, [], context)
  const convert = (formula: Formula): Term => {
    if (--context.budget.left < 0) throw refuse(formula, 'needs more operations than are allowed')
    if (!mentions(formula, parameters)) {
      const value = evaluate(formula, scope)
      if (value.type === 'quantity') return graph.constant(value.si)
      throw refuse(formula, 'is not a number or quantity')
    }
    switch (formula.type) {
      case 'name':
        if (formula.path.length > 1) throw refuse(formula, 'asks for a part of a coordinate')
        return parameters.get(formula.path[0] as string) as Term
      case 'group':
        return convert(formula.body)
      case 'unary':
        if (formula.operator === 'not') throw refuse(formula, 'has a condition in it')
        return formula.operator === '-' ? graph.negative(convert(formula.body)) : convert(formula.body)
      case 'binary': {
        const { operator } = formula
        if (operator === 'and' || operator === 'or') throw refuse(formula, 'has a condition in it')
        const [a, b] = [convert(formula.left), convert(formula.right)]
        return {
          '+': () => graph.sum(a, b),
          '-': () => graph.difference(a, b),
          '*': () => graph.product(a, b),
          '/': () => graph.quotient(a, b),
          '^': () => graph.power(a, b),
        }[operator]()
      }
      case 'call': {
        const inner = fn.names.get(formula.name)
        if (!findFunction(formula.name) && inner?.type === 'function')
          return toTerm(inner, formula.args.map(convert), graph, context)
        const [only] = formula.args
        if (formula.args.length === 1 && only && isSmoothFunction(formula.name))
          return graph.call(formula.name, convert(only))
        throw refuse(
          formula,
          `uses \`${formula.name}\` of a coordinate or the load, which has no derivative everywhere`,
        )
      }
      case 'case':
        throw refuse(formula, 'has branches that depend on a coordinate or the load')
      default:
        throw refuse(formula, 'is not arithmetic')
    }
  }
  const refuse = (formula: Formula, why: string) =>
    new FormulaError(
      'function-misused',
      `\`${context.source(formula.span).replace(/\s+/g, ' ').slice(0, 60)}\` ${why}, and an energy must be smooth`,
      'write the energy with + - * / ^ and smooth functions such as sin, cos, sqrt and exp',
      formula.span,
    )
  return convert(fn.body)
}

function mentions(formula: Formula, names: ReadonlyMap<string, unknown>): boolean {
  switch (formula.type) {
    case 'name':
      return names.has(formula.path[0] as string)
    case 'call':
      return formula.args.some((arg) => mentions(arg, names))
    default:
      return partsOf(formula).some((part) => mentions(part, names))
  }
}
