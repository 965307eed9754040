import type { Element } from 'hast'
import type { VFileMessage } from 'vfile-message'
import { finding } from '../finding.ts'
import type { Sheet, Span } from '../sheet/types.ts'

interface Placed {
  readonly position?: {
    readonly start: { readonly line: number; readonly column: number; readonly offset?: number | undefined }
    readonly end: { readonly line: number; readonly column: number; readonly offset?: number | undefined }
  } | undefined
}

/** Mathematics in prose that KaTeX cannot set. */
export function proseMathProblem(node: Placed & { readonly value: string }, problem: string, sheet: Sheet): VFileMessage {
  return finding({
    rule: 'bad-mathematics',
    message: `\`${node.value.split('\n')[0] ?? ''}\` cannot be set as mathematics: ${lowerFirst(problem)}`,
    hint: 'correct the formula between the `$` signs; a dollar sign in text is written `\\$`',
    file: sheet.path,
    span: spanOf(node),
  })
}

/** A picture that is not in the text itself. */
export function imageProblem(element: Element, src: string, sheet: Sheet): VFileMessage {
  return finding({
    rule: 'picture-left-out',
    message: `the picture \`${src}\` is not on the page: only pictures written into the sheet are`,
    hint: 'write the picture as a `data:image/png;base64,…` address, or name the drawing in words',
    file: sheet.path,
    span: spanOf(element as Placed),
  })
}

const lowerFirst = (text: string): string => text.slice(0, 1).toLowerCase() + text.slice(1).replace(/\.$/, '')

const START = { line: 1, column: 1, offset: 0 }

function spanOf({ position }: Placed): Span {
  if (!position) return { start: START, end: START }
  const point = ({ line, column, offset }: { line: number; column: number; offset?: number | undefined }) => ({
    line,
    column,
    offset: offset ?? 0,
  })
  return { start: point(position.start), end: point(position.end) }
}
