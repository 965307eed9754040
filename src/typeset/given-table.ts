import type { Element, ElementContent } from 'hast'
import { h } from 'hastscript'
import type { NamedLine, RecordValue } from '../calculate/types.ts'
import { isFailure, type Entry } from './entries.ts'
import { evidence, lineNumber, ofStatement, tick } from './evidence.ts'
import { failureWords } from './failure-line.ts'
import { lineMath, symbolMath } from './mathematics.ts'
import { pathsUsed } from './paths-used.ts'
import type { Scope } from './scope.ts'
import { solverNotes } from './solver-note.ts'
import { plainValue, valueText } from './value-text.ts'

/** Inputs as a table: symbol, value, meaning, and its source in the evidence lane. */
export function givenTable(entries: readonly Entry[], scope: Scope): Element[] {
  if (entries.length === 0) return []
  return [
    h('table', { className: 'given-table' }, [
      h('caption', 'Inputs'),
      h(
        'colgroup',
        ['number', 'symbol', 'amount', 'meaning', 'evidence', 'tick'].map((name) =>
          h('col', { className: name }),
        ),
      ),
      h('thead', [
        h(
          'tr',
          HEADS.map(([name, className]) => h('th', { scope: 'col', className }, name)),
        ),
      ]),
      h(
        'tbody',
        entries.map((entry) => row(entry, scope)),
      ),
    ]),
  ]
}

/** In em of the mathematics: the column of meanings. */
const FORMULA_WIDTH = 15

const HEADS = [
  ['Line', 'number'],
  ['Symbol', 'symbol'],
  ['Value', 'amount'],
  ['Meaning', 'meaning'],
  ['Source', 'evidence'],
  [h('span', { className: 'hidden' }, 'Checked'), 'tick'],
] as const

function row(entry: Entry, scope: Scope): Element {
  const { id, number } = lineNumber(entry, scope)
  const cells = isFailure(entry)
    ? [
        h('td', { colSpan: 3, className: 'failure' }, failureWords(entry)),
        h('td', { className: 'evidence' }, ofStatement(entry.statement)),
      ]
    : entry.kind === 'named'
      ? namedCells(entry, scope)
      : []
  return h('tr', { id, className: 'line' }, [
    h('td', { className: 'number' }, number),
    ...cells,
    h('td', { className: 'tick' }, [tick()]),
  ])
}

function namedCells(line: NamedLine, scope: Scope): Element[] {
  const { page } = scope
  return [
    h('th', { scope: 'row', className: 'symbol' }, symbolMath(line.name, page)),
    h('td', { className: 'amount' }, [amount(line, scope)]),
    h('td', { className: 'meaning' }, [
      ...words(line.statement.meaning),
      ...(isPlain(line) ? [] : [h('div', { className: 'formula' }, lineMath(line, page, FORMULA_WIDTH))]),
      ...propertiesUsed(line, scope),
      ...solverNotes(line.reports, page),
    ]),
    h('td', { className: 'evidence' }, evidence(line, scope)),
  ]
}

function amount(line: NamedLine, { page }: Scope): Element {
  const { value, origin, formula, unit } = line
  return valueText(value, origin, page, { asTyped: formula, ...(unit ? { unit } : {}) })
}

const words = (text: string | undefined): ElementContent[] =>
  text === undefined ? [] : [{ type: 'text', value: text }]

/** Typed in, or read from a table: there is no calculation to show. */
function isPlain({ formula, value }: NamedLine): boolean {
  const bare = formula.type === 'unary' ? formula.body : formula
  return ['number', 'quantity', 'text', 'truth', 'name'].includes(bare.type) || value.type === 'record'
}

/** The properties of a table's row that this sheet uses, so that each can be held against the table. */
function propertiesUsed(line: NamedLine, { calculation, page }: Scope): ElementContent[] {
  if (line.value.type !== 'record' || line.value.of === 'method') return []
  const { fields } = line.value as RecordValue
  const used = pathsUsed(calculation)
    .filter((path) => path.startsWith(`${line.name}.`))
    .map((path) => path.slice(line.name.length + 1))
  const shown = used.flatMap((key) => {
    const value = fields[key]
    return value === undefined ? [] : [{ key, value }]
  })
  if (shown.length === 0) return []
  return [
    h(
      'ul',
      { className: 'properties' },
      shown.map(({ key, value }) =>
        h('li', [
          ...symbolMath(`${line.name}.${key}`, page),
          ' = ',
          h('span', { className: ['value', 'looked-up'] }, plainValue(value, page)),
        ]),
      ),
    ),
  ]
}
