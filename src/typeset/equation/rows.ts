import { measure } from './measure.ts'
import type { Print } from './print.ts'

/** A factor in brackets is begun where it stands when at least this part of the row is left; a term never is. */
const ROOM = 0.4

/** Sets a row in by one em. */
const INDENT = '\\quad '

/**
 * Breaks a print into rows: at its outermost operators first, and inside a part only where that part is wider than a whole
 * row. A row may still be too wide when nothing in it can be broken.
 *
 * @param first width left in the first row, in em
 * @param rest width of each further row, in em
 */
export function rowsOf(print: Print, first: number, rest: number): string[] {
  const rows: string[] = []
  let row = ''
  let indent = 0
  let isEmpty = true
  const waiting = [print]
  for (let piece = waiting.shift(); piece; piece = waiting.shift()) {
    const tex = isEmpty ? (piece.atStart ?? piece.tex) : piece.tex
    const room = (rows.length === 0 ? first : rest) - indent
    const left = room - measure(row)
    const { depth = 0 } = piece
    if (measure(row + tex) <= room || (isEmpty && !piece.split && !piece.within)) {
      row += tex
      isEmpty = false
    } else if (!isEmpty && !(piece.split && piece.isFactor && left > ROOM * rest)) {
      rows.push(INDENT.repeat(indent) + row)
      row = ''
      indent = depth
      isEmpty = true
      waiting.unshift(piece)
    } else if (piece.split) {
      waiting.unshift(...piece.split().map((part) => ({ ...part, depth: depth + (part.depth ?? 0) })))
    } else if (piece.within) {
      waiting.unshift({ ...piece.within(left), depth })
    }
  }
  rows.push(INDENT.repeat(indent) + row)
  return rows
}
