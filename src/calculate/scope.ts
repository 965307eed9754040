import type { Span } from '../sheet/types.ts'
import type { Formula, SolverReport, Value } from './types.ts'

/** Gives names their values, and hears what is learnt on the way. */
export interface Scope {
  /** The value of a plain name, or why there is none. */
  lookup(name: string, span: Span): Value
  /** A formula's own text, for messages. */
  source(span: Span): string
  /** Operations that may still be made; shared by all formulas of a sheet. */
  readonly budget: { left: number }
  onBranch?(formula: Formula, taken: boolean): void
  onReport?(report: SolverReport): void
}

/** The formulas of one type. */
export type Node<T extends Formula['type']> = Extract<Formula, { type: T }>
