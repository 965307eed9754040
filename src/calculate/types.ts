import type { VFileMessage } from 'vfile-message'
import type { Dimension } from '../quantity/dimension.ts'
import type { UnitExpression } from '../quantity/units.ts'
import type {
  Acceptance,
  Assignment,
  Block,
  CallerInput,
  FunctionDefinition,
  InlineValue,
  MethodBlock,
  Sheet,
  Span,
  Statement,
} from '../sheet/types.ts'

export type { UnitExpression } from '../quantity/units.ts'

export type BinaryOperator = '+' | '-' | '*' | '/' | '^' | 'and' | 'or'
export type RelationOperator = '<' | '<=' | '>' | '>=' | '==' | '!='

/**
 * A parsed formula: what the sheet's author wrote, with every name resolved to a unit, a function or a value, and every
 * part with its place. Brackets are kept as written (`group`), so that the page shows the author's own grouping.
 */
export type Formula =
  /** `text` is the number as typed: `4.60` keeps its zero. */
  | { readonly type: 'number'; readonly value: number; readonly text: string; readonly span: Span }
  | {
      readonly type: 'quantity'
      readonly value: number
      readonly text: string
      readonly unit: UnitExpression
      readonly si: number
      readonly dimension: Dimension
      readonly span: Span
    }
  | { readonly type: 'text'; readonly value: string; readonly span: Span }
  | { readonly type: 'truth'; readonly value: boolean; readonly span: Span }
  /** A constant of mathematics: `pi`. */
  | { readonly type: 'constant'; readonly name: 'pi'; readonly span: Span }
  /** `N_Ed`, or a dotted path: `tube.A` is ['tube', 'A']. */
  | { readonly type: 'name'; readonly path: readonly string[]; readonly span: Span }
  | { readonly type: 'call'; readonly name: string; readonly args: readonly Formula[]; readonly span: Span }
  | {
      readonly type: 'unary'
      readonly operator: '-' | '+' | 'not'
      readonly body: Formula
      readonly span: Span
    }
  | {
      readonly type: 'binary'
      readonly operator: BinaryOperator
      readonly left: Formula
      readonly right: Formula
      readonly span: Span
      readonly operatorSpan: Span
    }
  /** `a < b`, and a chain `0.2 <= x <= 3`: one more operand than operators. */
  | {
      readonly type: 'relation'
      readonly operators: readonly RelationOperator[]
      readonly operands: readonly Formula[]
      readonly span: Span
    }
  | { readonly type: 'group'; readonly body: Formula; readonly span: Span }
  /** `condition ? then : otherwise` */
  | {
      readonly type: 'case'
      readonly condition: Formula
      readonly then: Formula
      readonly otherwise: Formula
      readonly span: Span
    }
  | { readonly type: 'list'; readonly items: readonly Formula[]; readonly span: Span }
  | {
      readonly type: 'record'
      readonly fields: readonly { readonly key: string; readonly value: Formula }[]
      readonly span: Span
    }
  /** `states[1].theta`: a field of something other than a plain name. */
  | { readonly type: 'field'; readonly of: Formula; readonly key: string; readonly span: Span }
  /** `v[2]`, `M[1, 2]`: indices count from 1. */
  | { readonly type: 'item'; readonly of: Formula; readonly indices: readonly Formula[]; readonly span: Span }

export interface Quantity {
  readonly type: 'quantity'
  /** In coherent SI units (m, kg, s, N, Pa, rad = 1). Always finite. */
  readonly si: number
  readonly dimension: Dimension
}

export interface QuantityArray {
  readonly type: 'array'
  /** Shape: a vector, or rows of a matrix. */
  readonly si: readonly number[] | readonly (readonly number[])[]
  readonly dimension: Dimension
}

/** A looked-up row of a table (a section, a material) or the names of a used sheet. */
export interface RecordValue {
  readonly type: 'record'
  readonly of: 'section' | 'material' | 'method' | 'record'
  /** The designation, grade or method id. */
  readonly title: string
  /** Where the row comes from, as printed: table, standard, and whether it is from memory. */
  readonly source?: string
  readonly fields: Readonly<Record<string, Value>>
}

export interface FunctionValue {
  readonly type: 'function'
  readonly name: string
  readonly parameters: readonly string[]
  readonly body: Formula
  /** The names the body may use, with the values they had where the function was defined. */
  readonly names: ReadonlyMap<string, Value>
}

/** A structure, ready to be asked the questions of CONTRACT.md section 2. */
export interface ModelValue {
  readonly type: 'model'
  readonly of: string
  /** What it describes, in words, for the printed line: `column, 4.60 m, pinned – pinned`. */
  readonly description: string
  readonly model: unknown
}

export type Value =
  | Quantity
  | QuantityArray
  | { readonly type: 'text'; readonly value: string }
  | { readonly type: 'truth'; readonly value: boolean }
  | RecordValue
  | FunctionValue
  | ModelValue
  /** A list of records, such as the states that `equilibrium` finds. */
  | { readonly type: 'list'; readonly items: readonly Value[] }

/**
 * Where a value comes from: typed in (`given`), read from a table (`looked-up`), calculated (`derived`),
 * carried from another sheet (`carried`), bound by the using sheet (`bound`), defined (`function`, `model`).
 */
export type Origin = 'given' | 'looked-up' | 'derived' | 'carried' | 'bound' | 'function' | 'model'

/** How an iterative or numerical result was obtained, and how far an independent route differs from it. */
export interface SolverReport {
  /** What was asked, as written: `critical_load(mast, 1)`. */
  readonly question: string
  readonly route: string
  /** A plain SI number; the printed sheet shows it with `dimension`. */
  readonly value: number
  readonly dimension: Dimension
  readonly status: 'converged' | 'bad-bracket' | 'iteration-limit' | 'not-finite' | 'closed-form'
  readonly iterations?: number
  readonly residual?: number
  readonly second?: {
    readonly route: string
    readonly value: number
    /** |second − value| / |value| */
    readonly difference: number
    /** The largest difference that is accepted; beyond it the sheet fails. */
    readonly allowed: number
  }
  /** The published source of the method. */
  readonly source?: string
}

interface LineBase {
  readonly formula: Formula
  /** Every name the formula uses (dotted paths joined by `.`), with its value and how it is best shown. */
  readonly operands: ReadonlyMap<string, Operand>
  /** For each `case` formula evaluated in this line: whether its condition held. */
  readonly branches: ReadonlyMap<Formula, boolean>
  readonly reports: readonly SolverReport[]
}

export interface Operand {
  readonly value: Value
  readonly origin: Origin
  /** The formula by which the value was given, when it is a plain quantity: printed as typed (`4.60 m`). */
  readonly asTyped?: Formula
  /** The unit asked for by `to`, when its line has one. */
  readonly unit?: UnitExpression
}

/** A calculated `name = expression` (or a function definition). */
export interface NamedLine extends LineBase {
  readonly kind: 'named'
  readonly statement: Assignment | FunctionDefinition | CallerInput
  readonly name: string
  readonly value: Value
  readonly origin: Origin
  /** The unit asked for by `to`. */
  readonly unit?: UnitExpression
  /** For an input of a used sheet: the using sheet's binding, in whose terms it was given. */
  readonly boundBy?: Assignment
  /** For an input of a used sheet that the using sheet left at its default. */
  readonly byDefault?: boolean
}

export type Verdict = 'pass' | 'fail'

/** A calculated check. For `a <= b` the demand is a and the capacity b; for `a >= b` the demand is b. */
export interface CheckLine extends LineBase {
  readonly kind: 'check'
  readonly statement: Acceptance
  readonly title: string
  readonly demand: Quantity
  readonly capacity: Quantity
  readonly demandFormula: Formula
  readonly capacityFormula: Formula
  /** demand / capacity; Infinity is never stored: absent when capacity is zero or the quotient has no meaning. */
  readonly utilisation?: number
  readonly verdict: Verdict
  /** A limit of use of a method, not an acceptance of the design. */
  readonly validity: boolean
}

export type Line = NamedLine | CheckLine

export interface CalculatedBlock {
  readonly block: Block
  /** Lines in document order; a statement that could not be calculated is among the failures instead. */
  readonly lines: readonly Line[]
  readonly failures: readonly Failure[]
  /** For a `method` block: the used sheet, calculated with this sheet's bindings. */
  readonly used?: UsedSheet
}

/** A statement that could not be calculated. */
export interface Failure {
  readonly statement: Statement
  /** The finding's message, or which earlier failure it depends on. */
  readonly because: string
}

export interface UsedSheet {
  readonly block: MethodBlock
  readonly id: string
  readonly as: string
  readonly brief: boolean
  readonly builtIn: boolean
  readonly calculation: Calculation
}

export interface CalculatedInline {
  readonly inline: InlineValue
  readonly formula?: Formula
  readonly value?: Value
  readonly unit?: UnitExpression
  /** When the expression is just a name: how that name is best shown. */
  readonly operand?: Operand
}

/** A Sheet plus the value of every statement, the verdict of every check, and findings. Immutable. */
export interface Calculation {
  readonly sheet: Sheet
  readonly blocks: readonly CalculatedBlock[]
  readonly inlineValues: readonly CalculatedInline[]
  /** All names of this sheet in order of definition, for other sheets and for the notation list. */
  readonly names: ReadonlyMap<string, NamedLine>
  /** The sheets used, by the name they are used as. */
  readonly usedSheets: ReadonlyMap<string, UsedSheet>
  /** Every name that some formula of the sheet mentions, calculated or not. */
  readonly mentioned: ReadonlySet<string>
  readonly findings: readonly VFileMessage[]
}
