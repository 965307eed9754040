import type { Formula, FunctionValue, SolverReport, Value } from '../types.ts'

/** What a built-in function may use besides its arguments. */
export interface CallContext {
  /** The call as parsed; its `args` are the arguments' formulas. */
  readonly formula: Extract<Formula, { type: 'call' }>
  /** The text of a part of it, for messages. */
  source(part: Formula): string
  /** Operations that may still be made. */
  readonly budget: { left: number }
  /** Records how a numerical result came about; the printed sheet shows it under the line. */
  report(report: SolverReport): void
  /** Calculates a function of the sheet for given arguments. */
  apply(fn: FunctionValue, args: readonly Value[]): Value
}

/** A function that sheets can call. Its words are printed by `stanchion explain NAME` and in the reference pages. */
export interface SheetFunction {
  readonly name: string
  /** As it is called: `euler_load(E, I, L)`. */
  readonly signature: string
  /** One line. */
  readonly summary: string
  /** Arguments with their units and range, the result, how it can fail. */
  readonly explain: string
  /** The published source of the method, where there is one. */
  readonly source?: string
  readonly group: 'arithmetic' | 'table' | 'model' | 'question' | 'closed form'
  /** A value read from a table rather than calculated. */
  readonly looksUp?: boolean
  call(args: readonly Value[], context: CallContext): Value
}
