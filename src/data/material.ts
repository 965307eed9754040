import { nearestDesignations, normalDesignation } from './designation.ts'
import { tabulated, type Field, type Fields, type Found } from './field.ts'
import { cell, numberIn, readTable, type TableRow } from './table.ts'

/** A grade of a material, in one band of thickness where the standard has bands. */
export interface MaterialRow {
  /** As printed: `S355`, `A992`. */
  readonly designation: string
  readonly standard: string
  readonly table: string
  /** Strengths under the standard's own symbols, elastic constants, and `t_max`, the largest thickness they hold for. */
  readonly fields: Fields
  /** For the printed line: standard, product, file, band of thickness, what was chosen from a range. */
  readonly source: string
}

/**
 * The strengths of a grade. EN steels give f_y, f_u, E, G, nu; EN aluminium f_o, f_u, E, G, nu; US grades F_y, F_u, E, G, nu,
 * exactly the US customary values.
 *
 * @param grade as `S355`, or with its standard where a grade stands in several, as `S355H EN 10210-1`
 * @param thickness in metres, above zero; chooses the band. Without it the thinnest band is given, whose upper limit is
 * the field `t_max` (and in the source), for the sheet to check the thickness against.
 */
export function findMaterial(grade: string, thickness?: number): Found<MaterialRow> {
  const wanted = withoutQuality(normalDesignation(grade))
  const grades = allGrades()
  const inFull = withStandard(grades, wanted)
  const byName = grades.filter(({ name }) => name === wanted)
  const usual = byName.find(({ usual }) => usual) ?? (byName.length === 1 ? byName[0] : undefined)
  const chosen = inFull ?? usual
  if (chosen !== undefined) return band(chosen, thickness)
  if (byName.length > 1)
    return {
      problem: `\`${grade}\` stands in ${byName.length} standards with different values`,
      suggestions: byName.map(({ title, standard }) => `${title} ${standard}`),
    }
  if (/^(C|D|GL)\d\d[CH]?$/.test(wanted))
    return {
      problem: `\`${grade}\` is a timber grade, and the tables carry metals only; give its strength and stiffness as inputs with their source`,
      suggestions: [],
    }
  const titles = [...new Set(grades.map(({ title }) => title))]
  return {
    problem: `no material \`${grade}\` in the tables`,
    suggestions: nearestDesignations(wanted, titles),
  }
}

/** Every grade in the tables, with its standard where it stands in several. */
export function materialGrades(): string[] {
  const grades = allGrades()
  return grades.map(({ title, name, standard }) =>
    grades.filter((grade) => grade.name === name).length > 1 ? `${title} ${standard}` : title,
  )
}

interface Grade {
  readonly name: string
  readonly full: string
  readonly title: string
  readonly standard: string
  readonly product: string
  readonly file: string
  /** Meant when the grade is given without a standard: structural steel by its product standard. */
  readonly usual: boolean
  readonly rows: TableRow[]
}

function allGrades(): Grade[] {
  const grades = new Map<string, Grade>()
  for (const file of ['materials-en.csv', 'materials-us.csv'])
    for (const row of readTable(file)) {
      const title = cell(row, 'material')
      const standard = cell(row, 'standard')
      const full = normalDesignation(`${title} ${standard}`)
      const known = grades.get(full)
      if (known !== undefined) known.rows.push(row)
      else
        grades.set(full, {
          name: normalDesignation(title),
          full,
          title,
          standard,
          product: cell(row, 'product_or_condition'),
          file,
          usual: standard === 'EN 10025-2',
          rows: [row],
        })
    }
  return [...grades.values()]
}

/** A grade named with its standard, which may be cut short: `S355 EN 1993-1-1`. */
function withStandard(grades: readonly Grade[], wanted: string): Grade | undefined {
  const matching = grades.filter(
    ({ name, full }) => wanted.length > name.length && wanted.startsWith(name) && full.startsWith(wanted),
  )
  return grades.find(({ full }) => full === wanted) ?? (matching.length === 1 ? matching[0] : undefined)
}

/** The quality letters of EN 10025-2 and EN 10025-3 and -4 do not alter the strengths: `S355J2` is `S355`, `S460NL` is `S460N`. */
function withoutQuality(key: string): string {
  return key.replace(/^(S235|S275|S355)(JR|J0|J2|K2)(?=EN|$)/, '$1').replace(/^(S\d{3}[NM])L(?=EN|$)/, '$1')
}

function band(grade: Grade, thickness: number | undefined): Found<MaterialRow> {
  const row = thickness === undefined ? grade.rows[0] : grade.rows.find((row) => within(row, thickness))
  if (row !== undefined) return { ok: materialRow(grade, row, thickness === undefined) }
  const inMillimetres = (thickness ?? NaN) * 1000
  const last = grade.rows.at(-1)
  const limits = `${cell(grade.rows[0] ?? {}, 't_over_mm')} mm < t ≤ ${cell(last ?? {}, 't_upto_mm')} mm`
  return {
    problem: `${grade.title} (${grade.standard}) is tabulated for ${limits}; the thickness is ${inMillimetres} mm`,
    suggestions: [],
  }
}

function within(row: TableRow, thickness: number): boolean {
  if (!Number.isFinite(thickness) || thickness <= 0) return false
  if (!hasBand(row)) return true
  const inMetres = (heading: string) => tabulated(numberIn(row, heading), 'mm').si
  return thickness > inMetres('t_over_mm') && thickness <= inMetres('t_upto_mm')
}

const hasBand = (row: TableRow) => (row['t_upto_mm'] ?? '') !== ''

function materialRow(grade: Grade, row: TableRow, thinnest: boolean): MaterialRow {
  return {
    designation: grade.title,
    standard: grade.standard,
    table: grade.file,
    fields: strengths(grade, row),
    source: sourceText(grade, row, thinnest),
  }
}

function strengths(grade: Grade, row: TableRow): Fields {
  const us = grade.file === 'materials-us.csv'
  const unit = us ? 'ksi' : 'MPa'
  const [yielding, ultimate] = us
    ? ['F_y', 'F_u']
    : [grade.product.includes('xtruded') || grade.product.includes('aluminium') ? 'f_o' : 'f_y', 'f_u']
  const fields: Record<string, Field> = {
    [yielding]: tabulated(numberIn(row, `yield_${unit}`), unit),
    E: tabulated(numberIn(row, `E_${unit}`), unit),
    G: tabulated(numberIn(row, `G_${unit}`), unit),
    nu: tabulated(numberIn(row, 'nu'), ''),
  }
  const lower = lowerBound(cell(row, `ultimate_${unit}`))
  if (lower !== undefined) fields[ultimate] = tabulated(lower, unit)
  if (hasBand(row)) fields['t_max'] = tabulated(numberIn(row, 't_upto_mm'), 'mm')
  return fields
}

/** `470-630` is a range: the lower end counts. Empty where the standard gives no value in the table. */
function lowerBound(text: string): number | undefined {
  if (text === '') return undefined
  const lower = Number(text.split('-')[0])
  if (!Number.isFinite(lower)) throw new Error(`"${text}" is not a strength`)
  return lower
}

function sourceText(grade: Grade, row: TableRow, thinnest: boolean): string {
  const range = row['ultimate_MPa'] ?? ''
  const note = cell(row, 'note')
  const parts = [`${grade.standard}, ${grade.product}, ${grade.file}`]
  const more = grade.rows.length > 1 && thinnest ? ', the thinnest band, as no thickness is given' : ''
  if (hasBand(row)) parts.push(`for ${cell(row, 't_over_mm')} mm < t ≤ ${cell(row, 't_upto_mm')} mm${more}`)
  if (range.includes('-')) parts.push(`f_u is the lower end of ${range.replace('-', ' to ')} MPa`)
  if (cell(row, 'source').includes('from memory')) parts.push('row from memory')
  else parts.push(`row from ${cell(row, 'source')}`)
  if (note !== '') parts.push(note)
  return parts.join('; ')
}
