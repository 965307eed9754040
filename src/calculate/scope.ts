import type { Span } from '../sheet/types.ts'
import { FormulaError } from './formula-error.ts'
import type { Formula, FunctionValue, SolverReport, Value } from './types.ts'

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

/** What the body of a sheet's function sees: its arguments, and the names as they were where it is defined. */
export function scopeOfFunction(
  fn: FunctionValue,
  args: readonly Value[],
  outer: Pick<Scope, 'source' | 'budget' | 'onReport'>,
): Scope {
  const local = new Map(fn.parameters.map((parameter, i) => [parameter, args[i] as Value]))
  return {
    lookup: (name, span) => {
      const value = local.get(name) ?? fn.names.get(name)
      if (value) return value
      throw new FormulaError(
        'undefined-name',
        `\`${name}\` is not defined`,
        'define it above the function',
        span,
      )
    },
    source: (span) => outer.source(span),
    budget: outer.budget,
    onReport: (report) => outer.onReport?.(report),
  }
}
