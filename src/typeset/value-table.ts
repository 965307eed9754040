import type { Element, ElementContent } from 'hast'
import { h } from 'hastscript'
import type { Failure } from '../calculate/types.ts'
import { isFailure, type Entry } from './entries.ts'
import { lineNumber, tick } from './evidence.ts'
import type { Scope } from './scope.ts'

const COLUMNS = ['number', 'symbol', 'amount', 'meaning', 'evidence', 'tick']
const HEADS: readonly (readonly [name: string | Element, className: string])[] = [
  ['Line', 'number'],
  ['Symbol', 'symbol'],
  ['Value', 'amount'],
  ['Meaning', 'meaning'],
  ['Source', 'evidence'],
  [h('span', { className: 'hidden' }, 'Checked'), 'tick'],
]

/** A longer name gets a wider column. */
const LONG = 7

const nameLength = (entry: Exclude<Entry, Failure>): number =>
  entry.kind === 'named' ? entry.name.length : 0

/** A table over both lanes: symbol, value, meaning, and its source in the evidence lane. */
export function valueTable(caption: string, rows: readonly Element[], entries: readonly Entry[]): Element {
  const wide = entries.some((entry) => (isFailure(entry) ? 0 : nameLength(entry)) > LONG)
  return h('table', { className: ['value-table', ...(wide ? ['wide'] : [])] }, [
    h('caption', { className: 'hidden' }, caption),
    h(
      'colgroup',
      COLUMNS.map((name) => h('col', { className: name })),
    ),
    h('thead', [
      h(
        'tr',
        HEADS.map(([name, className]) => h('th', { scope: 'col', className }, name)),
      ),
    ]),
    h('tbody', [...rows]),
  ])
}

/** The parts of a row between its number and its tick square. */
export interface Cells {
  readonly symbol: readonly ElementContent[]
  readonly amount: ElementContent
  readonly meaning: readonly ElementContent[]
  readonly evidence: readonly ElementContent[]
}

export function valueRow(entry: Entry, scope: Scope, cells: Cells): Element {
  return numbered(entry, scope, [
    h('th', { scope: 'row', className: 'symbol' }, [...cells.symbol]),
    h('td', { className: 'amount' }, [cells.amount]),
    h('td', { className: 'meaning' }, [...cells.meaning]),
    h('td', { className: 'evidence' }, [...cells.evidence]),
  ])
}

/** A row whose cells run from the second column to the evidence lane. */
export function numbered(entry: Entry, scope: Scope, cells: readonly Element[]): Element {
  const { id, number } = lineNumber(entry, scope)
  return h('tr', { id, className: 'line' }, [
    h('td', { className: 'number' }, number),
    ...cells,
    h('td', { className: 'tick' }, [tick()]),
  ])
}
