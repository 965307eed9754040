import { findMaterial } from '../../data/material.ts'
import { findSection } from '../../data/section.ts'
import type { Fields, Miss } from '../../data/field.ts'
import { quantity } from '../describe.ts'
import type { FormulaError } from '../formula-error.ts'
import type { Formula, RecordValue, Value } from '../types.ts'
import { argumentAt, expectCount, misused, quantityOf, recordOf, textOf } from './arguments.ts'
import type { SheetFunction } from './types.ts'

function record(
  of: 'section' | 'material',
  row: { designation: string; source: string; fields: Fields },
): RecordValue {
  const fields = Object.fromEntries(
    Object.entries(row.fields).map(([key, { si, dimension }]) => [key, quantity(si, dimension)]),
  )
  return { type: 'record', of, title: row.designation, source: row.source, fields }
}

function notFound({ problem, suggestions }: Miss, part: Formula): FormulaError {
  const near = suggestions.slice(0, 5)
  const hint =
    near.length > 0
      ? `did you mean ${near.map((name) => `\`${name}\``).join(' or ')}?`
      : 'give the values as inputs with their source'
  return misused(part, problem, hint)
}

export const section: SheetFunction = {
  name: 'section',
  signature: 'section("CHS 139.7x6.3")',
  summary: 'properties of a rolled or hollow section from the tables',
  explain:
    'designation: a text, in any case, with or without blanks. Gives a record of the properties under their standard’s own symbols (European sections A, I_y, I_z, i_y, W_el_y …; hollow sections A, I, i, W_el; American shapes A, I_x, I_y, r_x, S_x, Z_x, J, C_w …), reached as `tube.A`. The printed line names the table, its standard and whether the row is from memory.',
  group: 'table',
  looksUp: true,
  call(args, context) {
    expectCount(args, 1, 1, context, this.signature)
    const part = argumentAt(context, 0)
    const found = findSection(textOf(args[0] as Value, part, 'the designation'))
    if ('problem' in found) throw notFound(found, part)
    return record('section', found.ok)
  },
}

export const material: SheetFunction = {
  name: 'material',
  signature: 'material("S355") or material("S355", 20 mm)',
  summary: 'strengths and elastic constants of a grade from the tables',
  explain:
    'grade: a text; thickness: a length above zero, which chooses the standard’s thickness band. Without it the thinnest band is given and its limit is `t_max`. Gives a record (European steels f_y, f_u, E, G, nu; American grades F_y, F_u, E, G, nu), reached as `steel.f_y`.',
  group: 'table',
  looksUp: true,
  call(args, context) {
    expectCount(args, 1, 2, context, this.signature)
    const part = argumentAt(context, 0)
    const grade = textOf(args[0] as Value, part, 'the grade')
    const thickness = args[1]
      ? quantityOf(args[1], [0, 1, 0, 0], argumentAt(context, 1), 'the thickness', context)
      : undefined
    const found = findMaterial(grade, thickness)
    if ('problem' in found)
      throw notFound(found, found.problem.includes('thickness is') ? argumentAt(context, 1) : part)
    return record('material', found.ok)
  },
}

export const lookup: SheetFunction = {
  name: 'lookup',
  signature: 'lookup(key, {a: 0.21, b: 0.34})',
  summary: 'the entry of a table written in the sheet',
  explain:
    'key: a text; the table: a record. Gives the entry of that name; a key that is not in the table is an error, never a default.',
  group: 'table',
  looksUp: true,
  call(args, context) {
    expectCount(args, 2, 2, context, this.signature)
    const key = textOf(args[0] as Value, argumentAt(context, 0), 'the key')
    const table = recordOf(args[1] as Value, argumentAt(context, 1), 'the table')
    if (Object.hasOwn(table.fields, key)) return table.fields[key] as Value
    throw misused(
      argumentAt(context, 0),
      `the table has no entry \`${key}\``,
      `its entries are ${Object.keys(table.fields).join(', ')}`,
    )
  },
}
