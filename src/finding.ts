import { VFileMessage } from 'vfile-message'
import type { Span } from './sheet/types.ts'
import { RULES, type RuleId } from './verify/rules.ts'

export interface FindingInput {
  readonly rule: RuleId
  /** What is there and what was expected, with the numbers; lower case, no full stop. */
  readonly message: string
  /** One act to try. */
  readonly hint: string
  /** The file as the user gave it. */
  readonly file: string
  readonly span: Span
  readonly cause?: unknown
}

/** A finding as a VFile message: `ruleId`, `reason`, `place`, `file`, `note` (the hint) and `fatal` (true error, false warning). */
export function finding(input: FindingInput): VFileMessage {
  const { rule, message, hint, file, span, cause } = input
  const result = new VFileMessage(message, {
    place: span,
    source: 'stanchion',
    ruleId: rule,
    ...(cause instanceof Error ? { cause } : {}),
  })
  const severity = RULES[rule].severity
  result.fatal = severity === 'error' ? true : severity === 'warning' ? false : undefined
  result.note = hint
  result.file = file
  return result
}

export type Severity = 'error' | 'warning' | 'note'

export function severityOf(message: VFileMessage): Severity {
  return message.fatal === true ? 'error' : message.fatal === false ? 'warning' : 'note'
}
