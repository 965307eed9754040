import type { Formula, QuantityArray, RecordValue, Value } from '../../calculate/types.ts'
import { displayUnit, type Profile } from '../../quantity/profile.ts'
import { show } from '../../quantity/show.ts'
import { unitTex, type UnitExpression } from '../../quantity/units.ts'
import { shownTex, showOperand } from './quantity-tex.ts'
import { symbolTex } from './symbol.ts'
import { quotedTex, textTex } from './text-tex.ts'

export interface ValueOptions {
  /** The unit asked for by `to`. */
  readonly unit?: UnitExpression | undefined
  /** The formula by which the value was typed in. */
  readonly asTyped?: Formula | undefined
}

/** More rows or columns, or entries of a list, than these are cut, with dots in their place and their number told. */
const MOST_ROWS = 6
const MOST_COLUMNS = 6

/** A value in TeX: a quantity with its unit, a text in quotation marks, a table row by its designation, an array as a matrix. */
export function valueTex(value: Value, profile: Profile, options: ValueOptions = {}): string {
  switch (value.type) {
    case 'quantity':
      return shownTex(showOperand(options, value, profile))
    case 'array':
      return arrayTex(value, profile, options.unit)
    case 'text':
      return quotedTex(value.value)
    case 'truth':
      return textTex(String(value.value))
    case 'record':
      return recordTex(value, profile)
    case 'function':
      return `${symbolTex(value.name)}(${value.parameters.map(symbolTex).join(',\\,')})`
    case 'model':
      return textTex(value.description)
    case 'list':
      return listTex(value.items, profile)
  }
}

function recordTex(record: RecordValue, profile: Profile): string {
  if (record.of !== 'record') return textTex(record.title)
  const entries = Object.entries(record.fields).map(
    ([key, value]) => `${keyTex(key)}=${valueTex(value, profile)}`,
  )
  const shown = entries.slice(0, MOST_COLUMNS)
  return `\\{${[...shown, ...(entries.length > shown.length ? ['\\ldots'] : [])].join(';\\,')}\\}`
}

const NAME = /^[A-Za-z][A-Za-z0-9_]*$/

/** The name of an entry: a symbol where it can be one, else the text. */
export function keyTex(key: string): string {
  return NAME.test(key) ? symbolTex(key) : quotedTex(key)
}

/** The entries in one unit, that of the largest, which stands once behind the brackets. */
function arrayTex(array: QuantityArray, profile: Profile, asked: UnitExpression | undefined): string {
  const rows = (array.si as readonly (number | readonly number[])[]).map((row) =>
    typeof row === 'number' ? [row] : row,
  )
  const largest = rows.flat().reduce((a, b) => (Math.abs(b) > Math.abs(a) ? b : a), 0)
  const unit = asked ?? displayUnit({ si: largest, dimension: array.dimension }, profile)
  const entry = (si: number) => {
    const shown = show({ si, dimension: array.dimension }, profile, { unit })
    return shownTex({ ...shown, unit: [] })
  }
  const behind = unit.length === 0 ? '' : `\\,${unitTex(unit)}`
  return `${matrixTex(rows.map((row) => row.map(entry)))}${behind}`
}

/** Rows of entries in brackets; a large matrix keeps its first rows and columns and its last. */
export function matrixTex(rows: readonly (readonly string[])[]): string {
  const columns = Math.max(0, ...rows.map((row) => row.length))
  const wide = rows.map((row) => cut(row, MOST_COLUMNS, '\\cdots'))
  const dots = Array.from({ length: Math.min(columns, MOST_COLUMNS) }, () => '\\vdots')
  const all = cut(wide, MOST_ROWS, dots)
  return `\\begin{pmatrix}${all.map((row) => row.join('&')).join('\\\\')}\\end{pmatrix}`
}

function cut<T>(items: readonly T[], most: number, dots: T): readonly T[] {
  const last = items.at(-1)
  return items.length <= most || last === undefined ? items : [...items.slice(0, most - 2), dots, last]
}

/** Records of one make, such as states of equilibrium, are a table with their names at its head; anything else a row of values. */
function listTex(items: readonly Value[], profile: Profile): string {
  if (items.length === 0) return textTex('none')
  const keys = commonKeys(items)
  const shown = items.slice(0, MOST_ROWS)
  const left = items.length - shown.length
  const more = left === 0 ? '' : `\\quad${textTex(`and ${String(left)} more`)}`
  if (keys === undefined)
    return `\\left[${shown.map((item) => valueTex(item, profile)).join(';\\,')}\\right]${more}`
  const head = keys.map(keyTex).join('&')
  const rows = shown.map((item) =>
    keys.map((key) => valueTex((item as RecordValue).fields[key] as Value, profile)).join('&'),
  )
  return `\\begin{array}{${'l'.repeat(keys.length)}}${head}\\\\\\hline ${rows.join('\\\\')}\\end{array}${more}`
}

function commonKeys(items: readonly Value[]): readonly string[] | undefined {
  const keysOf = (value: Value | undefined) =>
    value?.type === 'record' && value.of === 'record' ? Object.keys(value.fields) : undefined
  const keys = keysOf(items[0])
  const key = keys?.join('|')
  return keys && keys.length > 0 && items.every((item) => keysOf(item)?.join('|') === key) ? keys : undefined
}
