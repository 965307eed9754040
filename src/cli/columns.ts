import { cleanText } from './clean-text.ts'
import { displayWidth } from './display-width.ts'

/** Rows of cells as lines of text, safe on a terminal, with the columns aligned. */
export function columns(rows: readonly (readonly string[])[]): string[] {
  const clean = rows.map((row) => row.map((cell) => cleanText(cell)))
  const widths: number[] = []
  for (const row of clean)
    row.forEach((cell, i) => (widths[i] = Math.max(widths[i] ?? 0, displayWidth(cell))))
  const padded = (cell: string, i: number) => cell + ' '.repeat((widths[i] ?? 0) - displayWidth(cell))
  return clean.map((row) => row.map(padded).join('  ').trimEnd())
}
