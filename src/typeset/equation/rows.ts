import { measure } from './measure.ts'
import type { Print } from './print.ts'

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
  const waiting = [print]
  for (let piece = waiting.shift(); piece; piece = waiting.shift()) {
    const atStart = rows.at(-1) === ''
    const width = measure(piece.tex)
    if (width <= left) {
      rows.push((rows.pop() ?? '') + (atStart && rows.length > 0 ? startOf(piece) : piece.tex))
      left -= width
    } else if (!atStart && measure(startOf(piece)) <= rest) {
      rows.push('')
      left = rest
      waiting.unshift(piece)
    } else {
      const smaller = piece.split?.() ?? (piece.within && [piece.within(atStart ? left : rest)])
      if (smaller && (smaller.length > 1 || piece.within)) waiting.unshift(...smaller)
      else {
        if (!atStart) rows.push('')
        rows.push((rows.pop() ?? '') + startOf(piece))
        left = 0
      }
    }
  }
  return rows
}

function startOf(piece: Print): string {
  return piece.atStart ?? piece.tex
}
