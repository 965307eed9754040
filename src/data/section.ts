import { nearestDesignations, normalDesignation } from './designation.ts'
import type { Fields, Found } from './field.ts'
import { SECTION_TABLES, fieldsOf, type SectionTable } from './section-tables.ts'
import { cell, readTable, type TableRow } from './table.ts'

/** A row of a table of rolled or hollow sections. */
export interface SectionRow {
  /** As printed: `CHS 139.7x6.3`, `HE 200 B`, `W14X90`. */
  readonly designation: string
  readonly standard: string
  /** The file in this folder. */
  readonly table: string
  /** Properties under the standard's own symbols, in SI: what is tabulated is not recalculated. */
  readonly fields: Fields
  /** For the printed line: standard, file, how the row is known, what of it is calculated, what is odd about it. */
  readonly source: string
}

/**
 * The properties of a section. The designation may be written with or without blanks, in any case, with `x` or `×`,
 * and in the other usual order (`HEB 200`, `SHS 100x100x5`, `UC …`).
 *
 * European rows give A, I_y, I_z, i_y, i_z, W_el_y, W_el_z, I_t, I_w, h, b, t_w, t_f, r and the flat widths c_w, c_f;
 * hollow ones A, I, i, W_el, t and D (or b), with I_y = I_z = I; American ones the symbols of the AISC Manual.
 * A square hollow section is hot finished or cold formed (`-HF`, `-CF`): without it the answer is a problem, since the
 * two have different properties and buckling curves.
 */
export function findSection(designation: string): Found<SectionRow> {
  const wanted = normalDesignation(designation)
  const entries = allEntries()
  const entry = entries.find(({ key }) => key === wanted) ?? entries.find(({ key }) => key === usual(wanted))
  if (entry !== undefined) return { ok: sectionRow(entry) }
  const processes = entries.filter(({ key }) => key === `${usual(wanted)}HF` || key === `${usual(wanted)}CF`)
  if (processes.length > 0)
    return {
      problem: `\`${designation}\` does not say whether it is hot finished (-HF) or cold formed (-CF)`,
      suggestions: processes.map(({ title }) => title),
    }
  return {
    problem: `no section \`${designation}\` in the tables`,
    suggestions: nearestDesignations(
      usual(wanted),
      entries.map(({ title }) => title),
    ),
  }
}

/** Every section in the tables, as printed, in the order of the tables. */
export function sectionDesignations(): string[] {
  return allEntries().map(({ title }) => title)
}

interface Entry {
  readonly key: string
  readonly title: string
  readonly table: SectionTable
  readonly row: TableRow
}

function allEntries(): Entry[] {
  return SECTION_TABLES.flatMap((table) =>
    readTable(table.file)
      .filter(table.holds ?? (() => true))
      .map((row) => {
        const designation = cell(row, 'designation')
        return { key: normalDesignation(designation), title: table.title(designation), table, row }
      }),
  )
}

/** Other usual orders and letters, turned into those of the tables. */
function usual(key: string): string {
  return key
    .replace(/^HE([AB])(\d+)$/, 'HE$2$1')
    .replace(/^SHS([\d.]+)X\1X/, 'SHS$1X')
    .replace(/^U([BC])(?=\d)/, 'UK$1')
}

function sectionRow({ title, table, row }: Entry): SectionRow {
  const fields = fieldsOf(table, row)
  return {
    designation: title,
    standard: cell(row, 'standard'),
    table: table.file,
    fields,
    source: sourceText(table, row, fields),
  }
}

function sourceText(table: SectionTable, row: TableRow, fields: Fields): string {
  const note = cell(row, 'note')
  const calculated = Object.entries(fields)
    .filter(([, { basis }]) => basis !== 'tabulated' && fields[basis] === undefined)
    .filter(([, { basis }], i, all) => all.findIndex(([, other]) => other.basis === basis) === i)
    .map(([symbol]) => symbol)
  return [
    `${cell(row, 'standard')}, ${table.file}, ${provenance(row)}`,
    `${calculated.join(', ')} calculated from tabulated values`,
    ...(note === '' ? [] : [note]),
  ].join('; ')
}

/** How the numbers of a row are known: `from memory`, `printed source`, or the two for dimensions and properties. */
function provenance(row: TableRow): string {
  const { provenance, dims_provenance: dimensions, props_provenance: properties } = row
  if (provenance !== undefined) return provenance
  if (dimensions === properties) return dimensions ?? ''
  return `dimensions: ${dimensions ?? ''}, properties: ${properties ?? ''}`
}
