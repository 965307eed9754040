import { measure } from './measure.ts'
import type { Print } from './print.ts'
import { rowsOf } from './rows.ts'

/** A part of a chain of equalities: what stands after `=`, or after another relation. */
export interface Link {
  readonly sign: string
  readonly print: Print
  /** It begins a row of its own when the chain takes more than one. */
  readonly startsRow: boolean
}

/**
 * The width of the calculation lane, in em of the mathematics: 118 mm, where mathematics is set at KaTeX's own 1.21 times a
 * text of 10 pt, is 27.6 em; less what a measured width may fall short.
 */
export const LANE = 27

const RELATION = 1.33
/** Rows that go on are set in by this much. */
const INDENT = 1
/** A left side wider than this part of the lane stands above the rest. */
const WIDEST_LEFT = 0.3

/**
 * A chain `left = a = b ≤ c` on one line where it fits, else in rows aligned at their signs, and those broken at operators.
 *
 * @param width of the lane, in em of the mathematics
 */
export function layChain(left: string, links: readonly Link[], width = LANE): string {
  const line = left + links.map(({ sign, print }) => sign + print.tex).join('')
  const fitsOneLine = links.every(({ print }, i) => !print.ownRow || i === links.length - 1)
  if (fitsOneLine && measure(line) <= width) return line
  const leftWidth = measure(left)
  const isNarrow = leftWidth <= WIDEST_LEFT * width
  const offset = isNarrow ? leftWidth : INDENT
  const rows: string[] = []
  let used = 0
  for (const [i, { sign, print, startsRow }] of links.entries()) {
    const needed = measure(print.tex) + RELATION
    const last = rows.length - 1
    if (i > 0 && !startsRow && used + needed <= width) {
      rows[last] = `${rows[last] ?? ''}${sign}${print.tex}`
      used += needed
      continue
    }
    const before = i === 0 && !isNarrow ? leftWidth : offset
    const broken = rowsOf(print, width - before - RELATION, width - offset - 2 * INDENT)
    rows.push(...broken.map((row, j) => (j === 0 ? `${sign}${row}` : `\\quad ${'\\;'}${row}`)))
    const lastRow = broken.at(-1) ?? ''
    used = measure(lastRow) + (broken.length === 1 ? before + RELATION : offset + 2 * INDENT)
  }
  const [first = '', ...others] = rows
  const lines = isNarrow
    ? [`${left}&${first}`, ...others.map((row) => `&${row}`)]
    : [`&${left}${first}`, ...others.map((row) => `&\\quad ${row}`)]
  return lines.length === 1 ? `${left}${first}` : `\\begin{aligned}${lines.join('\\\\')}\\end{aligned}`
}
