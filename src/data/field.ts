import type { Dimension } from '../quantity/dimension.ts'
import { isUnitProblem, parseUnit, toSi, unitFactor } from '../quantity/units.ts'

/** One property of a table row, in coherent SI units. */
export interface Field {
  readonly si: number
  readonly dimension: Dimension
  /** `tabulated`, or how it is calculated from the tabulated ones, as `sqrt(I/A)`. */
  readonly basis: string
}

export type Fields = Readonly<Record<string, Field>>

/** A number of a table with the unit of its column. */
export function tabulated(value: number, unit: string): Field {
  const parsed = unit === '' ? [] : parseUnit(unit)
  if (isUnitProblem(parsed)) throw new Error(`the table's unit "${unit}" is unknown`)
  return { si: toSi(value, parsed), dimension: unitFactor(parsed).dimension, basis: 'tabulated' }
}

/** The answer to a question for a row: the row, or what is wrong and what is near. */
export type Found<Row> = { readonly ok: Row } | Miss

export interface Miss {
  /** What was asked for and what there is, in lower case without a full stop. */
  readonly problem: string
  /** Designations to try, nearest first. */
  readonly suggestions: readonly string[]
}
