import { tabulated, type Field, type Fields } from './field.ts'
import { cell, numberIn, type TableRow } from './table.ts'

/** One kind of section: which rows of which file it holds, and how a row becomes properties under the standard's symbols. */
export interface SectionTable {
  readonly file: string
  /** Tells the kind's rows apart where a file holds several kinds. */
  readonly holds?: (row: TableRow) => boolean
  readonly title: (designation: string) => string
  readonly columns: readonly Column[]
  readonly calculated: readonly Calculated[]
}

/** Symbol, column heading, unit of the column, and the power of ten the heading carries. */
type Column = readonly [symbol: string, heading: string, unit: string, multiple?: number]

/** Symbol, how it is calculated, a field of the same dimension (or `[field, power]`), the calculation in SI. */
type Calculated = readonly [
  symbol: string,
  basis: string,
  like: string | readonly [string, number],
  calculate: (value: (symbol: string) => number) => number,
]

const spaced = (designation: string) => designation.replace(/^([A-Z]+)(?=\d)/, '$1 ')
const asPrinted = (designation: string) => designation

const I_SECTION: readonly Calculated[] = [
  ['i_y', 'sqrt(I_y/A)', 'h', (v) => Math.sqrt(v('I_y') / v('A'))],
  ['i_z', 'sqrt(I_z/A)', 'h', (v) => Math.sqrt(v('I_z') / v('A'))],
  ['W_el_y', '2*I_y/h', ['h', 3], (v) => (2 * v('I_y')) / v('h')],
  ['W_el_z', '2*I_z/b', ['h', 3], (v) => (2 * v('I_z')) / v('b')],
  ['c_w', 'h - 2*t_f - 2*r', 'h', (v) => v('h') - 2 * v('t_f') - 2 * v('r')],
  ['c_f', '(b - t_w - 2*r)/2', 'h', (v) => (v('b') - v('t_w') - 2 * v('r')) / 2],
]

const I_COLUMNS: readonly Column[] = [
  ['h', 'h_mm', 'mm'],
  ['b', 'b_mm', 'mm'],
  ['t_w', 'tw_mm', 'mm'],
  ['t_f', 'tf_mm', 'mm'],
  ['r', 'r_mm', 'mm'],
  ['A', 'A_pub_cm2', 'cm^2'],
  ['I_y', 'Iy_pub_cm4', 'cm^4'],
  ['I_z', 'Iz_pub_cm4', 'cm^4'],
  ['I_t', 'It_pub_cm4', 'cm^4'],
]

const EUROPEAN_I: Omit<SectionTable, 'file'> = {
  title: spaced,
  columns: [...I_COLUMNS, ['I_w', 'Iw_pub_1e3cm6', 'cm^6', 1e3]],
  calculated: I_SECTION,
}

/** Both principal axes of a tube or a square hollow section are alike. */
function alike(size: string): readonly Calculated[] {
  return [
    ['I_y', 'I', 'I', (v) => v('I')],
    ['I_z', 'I', 'I', (v) => v('I')],
    ['i', 'sqrt(I/A)', 't', (v) => Math.sqrt(v('I') / v('A'))],
    ['i_y', 'sqrt(I/A)', 't', (v) => v('i')],
    ['i_z', 'sqrt(I/A)', 't', (v) => v('i')],
    ['W_el', `2*I/${size}`, ['t', 3], (v) => (2 * v('I')) / v(size)],
  ]
}

const US_RADII: readonly Calculated[] = [
  ['r_x', 'sqrt(I_x/A)', 't', (v) => Math.sqrt(v('I_x') / v('A'))],
  ['r_y', 'sqrt(I_y/A)', 't', (v) => Math.sqrt(v('I_y') / v('A'))],
]

const US_HOLLOW: readonly Column[] = [
  ['t', 'tdes_in', 'in'],
  ['A', 'A_pub_in2', 'in^2'],
  ['I_x', 'Ix_pub_in4', 'in^4'],
  ['I_y', 'Iy_pub_in4', 'in^4'],
]

const isPipe = (row: TableRow) => cell(row, 'designation').startsWith('Pipe')

/** Every table of sections, in the order in which suggestions are made. */
export const SECTION_TABLES: readonly SectionTable[] = [
  {
    file: 'sections-chs-en.csv',
    title: spaced,
    columns: [
      ['D', 'D_mm', 'mm'],
      ['t', 't_mm', 'mm'],
      ['A', 'A_pub_cm2', 'cm^2'],
      ['I', 'I_pub_cm4', 'cm^4'],
    ],
    calculated: [['d', 'D', 'D', (v) => v('D')], ...alike('D')],
  },
  { file: 'sections-he.csv', ...EUROPEAN_I, title: (d) => d.replace(/^HE(\d+)([A-Z])$/, 'HE $1 $2') },
  {
    file: 'sections-hss-pipe-us.csv',
    holds: (row) => !isPipe(row),
    title: asPrinted,
    columns: [['H', 'H_in', 'in'], ['B', 'B_or_D_in', 'in'], ...US_HOLLOW],
    calculated: [
      ...US_RADII,
      ['S_x', '2*I_x/H', ['t', 3], (v) => (2 * v('I_x')) / v('H')],
      ['S_y', '2*I_y/B', ['t', 3], (v) => (2 * v('I_y')) / v('B')],
      ['h', 'H - 3*t', 't', (v) => v('H') - 3 * v('t')],
      ['b', 'B - 3*t', 't', (v) => v('B') - 3 * v('t')],
    ],
  },
  {
    file: 'sections-hss-pipe-us.csv',
    holds: isPipe,
    title: asPrinted,
    columns: [['D', 'B_or_D_in', 'in'], ...US_HOLLOW],
    calculated: [
      ...US_RADII,
      ['I', 'I_x', 'I_x', (v) => v('I_x')],
      ['r', 'sqrt(I/A)', 't', (v) => v('r_x')],
      ['S', '2*I/D', ['t', 3], (v) => (2 * v('I_x')) / v('D')],
    ],
  },
  { file: 'sections-ipe.csv', ...EUROPEAN_I },
  {
    file: 'sections-shs-en.csv',
    title: spaced,
    columns: [
      ['b', 'B_mm', 'mm'],
      ['t', 't_mm', 'mm'],
      ['A', 'A_pub_cm2', 'cm^2'],
      ['I', 'I_pub_cm4', 'cm^4'],
    ],
    calculated: [
      ['h', 'b', 'b', (v) => v('b')],
      ...alike('b'),
      ['c', 'b - 3*t', 'b', (v) => v('b') - 3 * v('t')],
    ],
  },
  {
    file: 'sections-uk.csv',
    title: spaced,
    columns: [...I_COLUMNS, ['I_w', 'Iw_pub_dm6', 'dm^6']],
    calculated: I_SECTION,
  },
  {
    file: 'sections-w-us.csv',
    title: asPrinted,
    columns: [
      ['d', 'd_in_units', 'in'],
      ['b_f', 'bf_in_units', 'in'],
      ['t_w', 'tw_in_units', 'in'],
      ['t_f', 'tf_in_units', 'in'],
      ['k_des', 'kdes_in_units', 'in'],
      ['A', 'A_in_units', 'in^2'],
      ['I_x', 'Ix_in_units', 'in^4'],
      ['Z_x', 'Zx_in_units', 'in^3'],
      ['S_x', 'Sx_in_units', 'in^3'],
      ['r_x', 'rx_in_units', 'in'],
      ['I_y', 'Iy_in_units', 'in^4'],
      ['Z_y', 'Zy_in_units', 'in^3'],
      ['S_y', 'Sy_in_units', 'in^3'],
      ['r_y', 'ry_in_units', 'in'],
      ['J', 'J_in_units', 'in^4'],
      ['C_w', 'Cw_in_units', 'in^6'],
      ['r_ts', 'rts_in_units', 'in'],
      ['h_o', 'ho_in_units', 'in'],
    ],
    calculated: [['h', 'd - 2*k_des', 'd', (v) => v('d') - 2 * v('k_des')]],
  },
]

/** A row's properties: what is tabulated as tabulated, then what is calculated from it. */
export function fieldsOf(table: SectionTable, row: TableRow): Fields {
  const fields: Record<string, Field> = {}
  for (const [symbol, heading, unit, multiple = 1] of table.columns)
    fields[symbol] = tabulated(numberIn(row, heading) * multiple, unit)
  const named = (symbol: string): Field => {
    const field = fields[symbol]
    if (field === undefined) throw new Error(`the table ${table.file} has no property ${symbol}`)
    return field
  }
  for (const [symbol, basis, like, calculate] of table.calculated) {
    const [of, power] = typeof like === 'string' ? [like, 1] : like
    const [mass, length, time, temperature] = named(of).dimension
    fields[symbol] = {
      si: calculate((name) => named(name).si),
      dimension: [mass * power, length * power, time * power, temperature * power],
      basis,
    }
  }
  return fields
}
