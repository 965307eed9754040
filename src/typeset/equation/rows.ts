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
  const rows = ['']
  let left = first
  let begins = true
  const waiting = [print]
  for (let piece = waiting.shift(); piece; piece = waiting.shift()) {
    const atStart: boolean = begins
    begins = false
    const tex = atStart ? (piece.atStart ?? piece.tex) : piece.tex
    const width = measure(tex)
    const inPlace = piece.split && piece.isFactor && left > ROOM * rest
    if (width <= left) {
      rows.push((rows.pop() ?? '') + tex)
      left -= width
    } else if (!atStart && !inPlace) {
      rows.push(INDENT.repeat(piece.depth ?? 0))
      left = rest - (piece.depth ?? 0)
      begins = true
      waiting.unshift(piece)
    } else if (piece.split) {
      begins = atStart
      const { depth = 0 } = piece
      waiting.unshift(...piece.split().map((part) => ({ ...part, depth: depth + (part.depth ?? 0) })))
    } else if (piece.within) {
      waiting.unshift(piece.within(left))
      begins = atStart
    } else {
      rows.push((rows.pop() ?? '') + tex)
      left = 0
    }
  }
  return rows
}
