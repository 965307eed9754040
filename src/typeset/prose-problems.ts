import type { Element } from 'hast'
import type { Position } from 'unist'
import type { VFileMessage } from 'vfile-message'
import { finding } from '../finding.ts'
import type { Point, Sheet, Span } from '../sheet/types.ts'

interface Placed {
  readonly position?: Position | undefined
}

interface MathProblem {
  readonly problem: string
  /** How far into the mathematics. */
  readonly offset?: number
}

/** Mathematics in prose that KaTeX cannot set. */
export function proseMathProblem(
  node: Placed & { readonly value: string },
  { problem, offset }: MathProblem,
  sheet: Sheet,
): VFileMessage {
  return finding({
    rule: 'bad-mathematics',
    message: `\`${node.value.split('\n')[0] ?? ''}\` cannot be set as mathematics: ${problem}`,
    hint: 'correct the formula between the `$` signs; a dollar sign in text is written `\\$`',
    file: sheet.path,
    span: within(node, offset, sheet),
  })
}

/** A picture that is not in the text itself. */
export function pictureProblem(element: Element, src: string, sheet: Sheet): VFileMessage {
  return finding({
    rule: 'picture-left-out',
    message: `the picture \`${src}\` is not on the page: only pictures written into the sheet are`,
    hint: 'write the picture as a `data:image/png;base64,…` address, or name the drawing in words',
    file: sheet.path,
    span: spanOf(element),
  })
}

const START: Point = { line: 1, column: 1, offset: 0 }

function spanOf({ position }: Placed): Span {
  if (!position) return { start: START, end: START }
  const point = ({ line, column, offset = 0 }: Position['start']): Point => ({ line, column, offset })
  return { start: point(position.start), end: point(position.end) }
}

/** The place inside the mathematics where reading stopped, when that is known; else the whole. */
function within(node: Placed & { readonly value: string }, offset: number | undefined, sheet: Sheet): Span {
  const whole = spanOf(node)
  const begin = sheet.text.indexOf(node.value, whole.start.offset)
  if (offset === undefined || begin < 0 || begin > whole.end.offset) return whole
  const at = Math.min(begin + offset, Math.max(begin, whole.end.offset - 1))
  const before = sheet.text.slice(0, at)
  const lineStart = before.lastIndexOf('\n') + 1
  const line = before.split('\n').length
  return { start: { line, column: at - lineStart + 1, offset: at }, end: whole.end }
}
