import type { Element, ElementContent } from 'hast'
import { h } from 'hastscript'
import type { NamedLine } from '../calculate/types.ts'
import { isFailure, type Entry } from './entries.ts'
import { evidence, ofStatement } from './evidence.ts'
import { failureWords } from './failure-line.ts'
import { lineMath, symbolMath } from './mathematics.ts'
import { pathsUsed } from './paths-used.ts'
import type { Scope } from './scope.ts'
import { solverNotes } from './solver-note.ts'
import { numbered, valueRow, valueTable } from './value-table.ts'
import { plainValue, valueText } from './value-text.ts'

/** In em of the mathematics: the column of meanings. */
const FORMULA_WIDTH = 15

/** Inputs as a table: symbol, value, meaning, and its source in the evidence lane. */
export function givenTable(entries: readonly Entry[], scope: Scope): Element[] {
  return entries.length === 0
    ? []
    : [
        valueTable(
          'Inputs',
          entries.flatMap((entry) => row(entry, scope)),
          entries,
        ),
      ]
}

function row(entry: Entry, scope: Scope): Element[] {
  if (isFailure(entry)) {
    return [
      numbered(entry, scope, [
        h('td', { colSpan: 3, className: 'failure' }, failureWords(entry)),
        h('td', { className: 'evidence' }, ofStatement(entry.statement)),
      ]),
    ]
  }
  return entry.kind === 'named' ? [namedRow(entry, scope)] : []
}

function namedRow(line: NamedLine, scope: Scope): Element {
  const { page } = scope
  const { value, origin, formula, unit, statement } = line
  return valueRow(line, scope, {
    symbol: symbolMath(line.name, page),
    amount: valueText(value, origin, page, { asTyped: formula, ...(unit ? { unit } : {}) }),
    meaning: [
      ...(statement.meaning === undefined ? [] : [{ type: 'text', value: statement.meaning } as const]),
      ...(isPlain(line) ? [] : [h('div', { className: 'formula' }, lineMath(line, page, FORMULA_WIDTH))]),
      ...propertiesUsed(line, scope),
      ...solverNotes(line.reports, page),
    ],
    evidence: evidence(line, scope),
  })
}

/** Typed in, or read from a table: there is no calculation to show. */
function isPlain({ formula, value }: NamedLine): boolean {
  const bare = formula.type === 'unary' ? formula.body : formula
  return ['number', 'quantity', 'text', 'truth', 'name'].includes(bare.type) || value.type === 'record'
}

/** The properties of a table's row that this sheet uses, so that each can be held against the table. */
function propertiesUsed({ name, value }: NamedLine, { calculation, page }: Scope): ElementContent[] {
  if (value.type !== 'record' || value.of === 'method') return []
  const used = pathsUsed(calculation).flatMap((path) => {
    const [owner, key = ''] = path.split('.')
    const property = owner === name ? value.fields[key] : undefined
    return property === undefined ? [] : [{ path, property }]
  })
  if (used.length === 0) return []
  const items = used.map(({ path, property }) =>
    h('li', [
      ...symbolMath(path, page),
      ' = ',
      h('span', { className: ['value', 'looked-up'] }, plainValue(property, page)),
    ]),
  )
  return [h('ul', { className: 'properties' }, items)]
}
