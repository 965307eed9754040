import type { VFileMessage } from 'vfile-message'
import { severityOf } from '../finding.ts'
import { cleanText } from './clean-text.ts'

/** Longest excerpt of a line, in characters; what is cut off is marked. */
const WIDTH = 100

/**
 * A finding with its place, the line it stands in, a caret under the place, and its hint.
 *
 * @param text the file that the finding is about, when it is known
 */
export function formatFinding(message: VFileMessage, text: string | undefined): string {
  const line = message.line ?? 1
  const column = message.column ?? 1
  const head = `${message.file ?? ''}:${line}:${column}: ${severityOf(message)}: ${message.reason}  ${message.ruleId ?? ''}`
  const source = text?.split('\n')[line - 1]
  const excerpt =
    source === undefined || source === '' ? [] : excerptOf(source, line, column, endColumn(message, source))
  return cleanText([head, ...excerpt, `hint: ${message.note ?? ''}`].join('\n'))
}

function endColumn(message: VFileMessage, source: string): number {
  const place = message.place
  if (!place || !('end' in place)) return (message.column ?? 1) + 1
  return place.end.line === place.start.line ? place.end.column : source.length + 1
}

function excerptOf(source: string, line: number, from: number, to: number): string[] {
  const label = `${line} | `
  const start = from > WIDTH - 20 ? from - 40 : 0
  const cut = source.slice(start, start + WIDTH)
  const lead = start > 0 ? '…' : ''
  const tail = start + WIDTH < source.length ? '…' : ''
  const before = lead + cut.slice(0, Math.max(from - 1 - start, 0))
  const marked = cut.slice(Math.max(from - 1 - start, 0), Math.max(to - 1 - start, 0))
  const pad = [...before]
    .map((character) => (character === '\t' ? '\t' : ' '.repeat(columns(character))))
    .join('')
  const carets = '^'.repeat(
    Math.max(
      [...marked].reduce((sum, character) => sum + columns(character), 0),
      1,
    ),
  )
  return [`${label}${lead}${cut}${tail}`, `${' '.repeat(label.length - 2)}| ${pad}${carets}`]
}

/** Columns that a character takes on a terminal: none for a combining mark, two for a wide one. */
function columns(character: string): number {
  if (/\p{Mark}/u.test(character)) return 0
  const code = character.codePointAt(0) as number
  const wide =
    (code >= 0x1100 && code <= 0x115f) ||
    (code >= 0x2e80 && code <= 0xa4cf) ||
    (code >= 0xac00 && code <= 0xd7a3) ||
    (code >= 0xf900 && code <= 0xfaff) ||
    (code >= 0xfe30 && code <= 0xfe6f) ||
    (code >= 0xff00 && code <= 0xff60) ||
    (code >= 0x1f300 && code <= 0x1faff) ||
    (code >= 0x20000 && code <= 0x3fffd)
  return wide ? 2 : 1
}

/** `2 errors, 1 warning in 1 sheet`, or nothing when there are no findings. */
export function summaryLine(findings: readonly VFileMessage[], sheets: number): string | undefined {
  const counted = (['error', 'warning', 'note'] as const)
    .map(
      (severity) =>
        [findings.filter((message) => severityOf(message) === severity).length, severity] as const,
    )
    .filter(([count]) => count > 0)
    .map(([count, severity]) => `${count} ${severity}${count === 1 ? '' : 's'}`)
  return counted.length === 0
    ? undefined
    : `${counted.join(', ')} in ${sheets} sheet${sheets === 1 ? '' : 's'}`
}
