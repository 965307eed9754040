import fc from 'fast-check'
import type { BinaryOperator, Formula, Operand, RelationOperator } from '../../../src/calculate/types.ts'
import type { Dimension } from '../../../src/quantity/dimension.ts'

const at = { line: 1, column: 1, offset: 0 }
const span = { start: at, end: at }

export const number = (text: string): Formula => ({ type: 'number', value: Number(text), text, span })
export const name = (...path: string[]): Formula => ({ type: 'name', path, span })
export const group = (body: Formula): Formula => ({ type: 'group', body, span })
export const call = (fn: string, ...args: Formula[]): Formula => ({ type: 'call', name: fn, args, span })
export const negative = (body: Formula): Formula => ({ type: 'unary', operator: '-', body, span })
export const binary = (operator: BinaryOperator, left: Formula, right: Formula): Formula => ({
  type: 'binary',
  operator,
  left,
  right,
  span,
  operatorSpan: span,
})
export const relation = (operators: readonly RelationOperator[], ...operands: Formula[]): Formula => ({
  type: 'relation',
  operators,
  operands,
  span,
})
export const caseOf = (condition: Formula, then: Formula, otherwise: Formula): Formula => ({
  type: 'case',
  condition,
  then,
  otherwise,
  span,
})
export const quantity = (text: string, unit: string, factor: number, dimension: Dimension): Formula => ({
  type: 'quantity',
  value: Number(text),
  text,
  unit: [{ unit, exponent: 1 }],
  si: Number(text) * factor,
  dimension,
  span,
})

const NONE: Dimension = [0, 0, 0, 0]
const LENGTH: Dimension = [0, 1, 0, 0]

interface Named {
  readonly path: readonly string[]
  /** As the printer writes it; stated here, not asked of the printer. */
  readonly tex: string
  readonly si: number
  readonly dimension: Dimension
}

/** Names of every make, with values that are shown in full. */
export const NAMES: readonly Named[] = [
  { path: ['a'], tex: 'a', si: 1.25, dimension: NONE },
  { path: ['b'], tex: 'b', si: -0.75, dimension: NONE },
  { path: ['x_1'], tex: 'x_{1}', si: 3, dimension: NONE },
  { path: ['lambda_bar'], tex: '\\bar{\\lambda}', si: 0.5, dimension: NONE },
  { path: ['f_prime'], tex: "f'", si: 1.5, dimension: NONE },
  { path: ['EI'], tex: '\\mathrm{EI}', si: 12000, dimension: NONE },
  { path: ['N_b_Rd'], tex: 'N_{\\mathrm{b,Rd}}', si: 0.002, dimension: NONE },
  { path: ['big'], tex: '\\mathrm{big}', si: 1.2e9, dimension: NONE },
  { path: ['L'], tex: 'L', si: 2.5, dimension: LENGTH },
  { path: ['t'], tex: 't', si: 0.035, dimension: LENGTH },
  { path: ['e'], tex: 'e', si: -0.012, dimension: LENGTH },
  { path: ['tube', 'i'], tex: 'i_{\\textit{tube}}', si: 0.047, dimension: LENGTH },
  { path: ['minor', 'k_z'], tex: 'k_{\\mathrm{z};\\textit{minor}}', si: 0.8, dimension: NONE },
]

export const OPERANDS: ReadonlyMap<string, Operand> = new Map(
  NAMES.map(({ path, si, dimension }) => [
    path.join('.'),
    { value: { type: 'quantity', si, dimension }, origin: 'derived' },
  ]),
)

const leaf = fc.oneof(
  { weight: 4, arbitrary: fc.constantFrom(...NAMES.map(({ path }) => name(...path))) },
  { weight: 2, arbitrary: fc.constantFrom('2', '3', '0.5', '.25', '1', '29000', '1e-2', '2.50').map(number) },
  {
    weight: 1,
    arbitrary: fc.constantFrom(quantity('4.60', 'm', 1, LENGTH), quantity('12', 'mm', 0.001, LENGTH)),
  },
  { weight: 1, arbitrary: fc.constant<Formula>({ type: 'constant', name: 'pi', span }) },
)

const FUNCTIONS = [
  'sin',
  'cos',
  'tan',
  'exp',
  'log',
  'log10',
  'abs',
  'floor',
  'ceil',
  'sqrt',
  'cbrt',
] as const

/** Formulas of every make that stands for a number, with brackets of the author here and there, and none where they are needed. */
export const { formula } = fc.letrec<{ formula: Formula; condition: Formula }>((tie) => ({
  formula: fc.oneof(
    { depthSize: 'small', withCrossShrink: true },
    leaf,
    fc
      .tuple(
        fc.constantFrom<BinaryOperator>('+', '-', '*', '/', '+', '-', '*', '/', '^'),
        tie('formula'),
        tie('formula'),
      )
      .map((parts) => binary(...parts)),
    fc
      .tuple(tie('formula'), fc.constantFrom('2', '3', '0.5'))
      .map(([base, n]) => binary('^', base, number(n))),
    tie('formula').map(group),
    tie('formula').map(negative),
    fc.tuple(fc.constantFrom(...FUNCTIONS), tie('formula')).map(([fn, body]) => call(fn, body)),
    fc
      .tuple(fc.constantFrom('min', 'max', 'hypot'), tie('formula'), tie('formula'))
      .map(([fn, p, q]) => call(fn, p, q)),
    fc.tuple(tie('formula'), fc.constantFrom('2', '4')).map(([body, n]) => call('nthRoot', body, number(n))),
    fc.tuple(tie('formula'), tie('formula'), tie('formula')).map((args) => call('euler_load', ...args)),
    fc
      .tuple(tie('condition'), tie('formula'), tie('formula'))
      .map(([condition, then, otherwise]) => caseOf(condition, then, otherwise)),
  ),
  condition: fc.oneof(
    { depthSize: 'small', withCrossShrink: true },
    fc
      .tuple(fc.constantFrom<RelationOperator>('<', '<=', '>', '>='), tie('formula'), tie('formula'))
      .map(([operator, left, right]) => relation([operator], left, right)),
    fc
      .tuple(tie('formula'), tie('formula'), tie('formula'))
      .map((operands) => relation(['<=', '<'], ...operands)),
    fc
      .tuple(fc.constantFrom<BinaryOperator>('and', 'or'), tie('condition'), tie('condition'))
      .map((parts) => binary(...parts)),
    tie('condition').map((body): Formula => ({ type: 'unary', operator: 'not', body: group(body), span })),
    tie('condition').map(group),
  ),
}))

const CALLS: Readonly<Record<string, (...args: number[]) => number>> = {
  sin: Math.sin,
  cos: Math.cos,
  tan: Math.tan,
  exp: Math.exp,
  log: Math.log,
  log10: Math.log10,
  abs: Math.abs,
  floor: Math.floor,
  ceil: Math.ceil,
  sqrt: (x) => Math.pow(x, 1 / 2),
  cbrt: (x) => Math.pow(x, 1 / 3),
  min: Math.min,
  max: Math.max,
  hypot: (a, b) => Math.pow(a * a + b * b, 1 / 2),
  nthRoot: (x, n) => Math.pow(x, 1 / n),
  euler_load: (E, I, L) => (Math.PI * Math.PI * E * I) / (L * L),
}

/** The number that a formula stands for, in SI; dimensions are let pass. */
export function valueOf(part: Formula, branches?: Map<Formula, boolean>): number {
  const inner = (body: Formula) => valueOf(body, branches)
  switch (part.type) {
    case 'number':
      return part.value
    case 'quantity':
      return part.si
    case 'constant':
      return Math.PI
    case 'group':
      return inner(part.body)
    case 'name':
      return NAMES.find(({ path }) => path.join('.') === part.path.join('.'))?.si ?? NaN
    case 'unary':
      return -inner(part.body)
    case 'binary':
      return arithmetic(part.operator, inner(part.left), inner(part.right))
    case 'call':
      return CALLS[part.name]?.(...part.args.map(inner)) ?? NaN
    case 'case': {
      const holds = truthOf(part.condition, branches)
      branches?.set(part, holds)
      return inner(holds ? part.then : part.otherwise)
    }
    default:
      throw new Error(`no number: ${part.type}`)
  }
}

function arithmetic(operator: BinaryOperator, a: number, b: number): number {
  switch (operator) {
    case '+':
      return a + b
    case '-':
      return a - b
    case '*':
      return a * b
    case '/':
      return a / b
    default:
      return Math.pow(a, b)
  }
}

function truthOf(part: Formula, branches?: Map<Formula, boolean>): boolean {
  if (part.type === 'group') return truthOf(part.body, branches)
  if (part.type === 'unary') return !truthOf(part.body, branches)
  if (part.type === 'binary') {
    const left = truthOf(part.left, branches)
    const right = truthOf(part.right, branches)
    return part.operator === 'and' ? left && right : left || right
  }
  if (part.type !== 'relation') throw new Error(`no truth: ${part.type}`)
  const values = part.operands.map((side) => valueOf(side, branches))
  return part.operators.every((operator, i) => {
    const [a, b] = [values[i] ?? NaN, values[i + 1] ?? NaN]
    return { '<': a < b, '<=': a <= b, '>': a > b, '>=': a >= b, '==': a === b, '!=': a !== b }[operator]
  })
}
