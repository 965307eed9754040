import type { VFileMessage } from 'vfile-message'
import { severityOf } from '../finding.ts'
import { cleanText } from './clean-text.ts'
import { displayWidth } from './display-width.ts'

/** Longest excerpt of a line, in characters; what is cut off is marked. */
const WIDTH = 100
/** Characters shown before the place of a finding that lies far out in its line. */
const BEFORE = 40

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

/** The line, and the line of carets below it; `from` and `to` are columns, counted from 1 in UTF-16 units as editors do. */
function excerptOf(source: string, line: number, from: number, to: number): string[] {
  const start = from > WIDTH - BEFORE / 2 ? wholeCharacter(source, from - BEFORE) : 0
  const end = wholeCharacter(source, start + WIDTH)
  const before = (start > 0 ? '…' : '') + cleanText(source.slice(start, Math.max(from - 1, start)))
  const marked = cleanText(source.slice(Math.max(from - 1, start), Math.min(Math.max(to - 1, start), end)))
  const shown = `${start > 0 ? '…' : ''}${cleanText(source.slice(start, end))}${end < source.length ? '…' : ''}`
  const label = `${line} | `
  const margin = `${' '.repeat(label.length - 2)}| `
  return [`${label}${shown}`, `${margin}${blank(before)}${'^'.repeat(Math.max(displayWidth(marked), 1))}`]
}

/** The offset, or the one before it where that would part a character outside the Basic Multilingual Plane. */
function wholeCharacter(source: string, offset: number): number {
  return /[\udc00-\udfff]/.test(source.charAt(offset)) ? offset - 1 : offset
}

/** As wide as the text: blanks, and tabs where it has tabs. */
function blank(text: string): string {
  return text
    .split('\t')
    .map((part) => ' '.repeat(displayWidth(part)))
    .join('\t')
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
