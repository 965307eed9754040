import type { VFileMessage } from 'vfile-message'
import { finding, type FindingInput } from '../finding.ts'
import type { Prepared } from '../pipeline.ts'

const START = { start: { line: 1, column: 1, offset: 0 }, end: { line: 1, column: 1, offset: 0 } }

/** What the program should not have met, as a finding about the sheet it was at; `--debug` shows where. */
export function internalError(file: string, cause: unknown): VFileMessage {
  return aboutFile({
    rule: 'internal-error',
    message: `the program failed: ${cause instanceof Error ? cause.message : String(cause)}`,
    hint: 'run again with `--debug`, and report what it prints',
    file,
    cause,
  })
}

/** The sheet after the program failed at it: whatever was known of it, it does not count as calculated. */
export function failedAt(sheet: Prepared, cause: unknown): Prepared {
  return { ...sheet, findings: [...sheet.findings, internalError(sheet.path, cause)], verdict: 'error' }
}

/** A finding about a file as a whole, placed at its start. */
export function aboutFile(input: Omit<FindingInput, 'span'>): VFileMessage {
  return finding({ ...input, span: START })
}
