import type { Span } from '../sheet/types.ts'
import type { RuleId } from '../verify/rules.ts'

/** A fact found wrong inside a statement: the rule, what is there, one act to try and where. The caller adds the file. */
export class FormulaError extends Error {
  override readonly name = 'FormulaError'
  readonly rule: RuleId
  readonly hint: string
  readonly span: Span

  constructor(rule: RuleId, message: string, hint: string, span: Span, cause?: unknown) {
    super(message, cause === undefined ? {} : { cause })
    this.rule = rule
    this.hint = hint
    this.span = span
  }
}
