import { readFileSync } from 'node:fs'
import { join } from 'node:path'
import { parse } from 'csv-parse/sync'
import { packageRoot } from '../package-root.ts'

/** A row as printed in the file: column heading → text. */
export type TableRow = Readonly<Record<string, string>>

const read = new Map<string, readonly TableRow[]>()

/**
 * The rows of a table in this folder. Each table is read once, when first asked for.
 * Throws when the file is missing or a row has another number of cells than the heading: that is a fault of the installation.
 */
export function readTable(name: string): readonly TableRow[] {
  const known = read.get(name)
  if (known !== undefined) return known
  const rows: readonly TableRow[] = parse(readFileSync(join(packageRoot(), 'src', 'data', name), 'utf8'), {
    bom: true,
    columns: true,
  })
  read.set(name, rows)
  return rows
}

/** The cell of a column that the table must have. */
export function cell(row: TableRow, column: string): string {
  const text = row[column]
  if (text === undefined) throw new Error(`the table has no column "${column}"`)
  return text
}

/** The number in a cell; throws when the cell holds none, so that a damaged table is never used. */
export function numberIn(row: TableRow, column: string): number {
  const text = cell(row, column)
  const value = Number(text)
  if (text.trim() === '' || !Number.isFinite(value))
    throw new Error(`"${text}" in column "${column}" is not a number`)
  return value
}
