import type { Element, ElementContent } from 'hast'
import { h } from 'hastscript'
import type { CheckLine } from '../calculate/types.ts'
import { showComparison } from '../quantity/show-comparison.ts'
import { utilisationText, verdictWord } from './check-row.ts'
import type { PageChecks } from './checks-of-page.ts'
import { lineLink } from './cross-references.ts'
import type { Page } from './scope.ts'
import { utilisationBar } from './utilisation-bar.ts'
import { shownText } from './value-text.ts'

/** All checks in one table: the sheet's own, those of other sheets it stands on, and the limits of use of its methods. */
export function checksTable(checks: PageChecks, page: Page): Element[] {
  const groups = [
    group(
      'Checks of this sheet',
      checks.own.map((check) => row(check, check.title, checks, page)),
    ),
    group(
      'Checks of sheets used',
      checks.others.map(({ sheet, check }) => row(check, `${sheet}: ${check.title}`, checks, page)),
    ),
    group(
      'Limits of use of methods',
      checks.limits.map(({ method, check }) => row(check, `${check.title} (${method})`, checks, page)),
    ),
  ].flat()
  if (groups.length === 0) return []
  return [
    h('table', { className: 'checks-table' }, [
      h('caption', { className: 'hidden' }, 'All checks'),
      h('thead', [
        h(
          'tr',
          HEADS.map(([name, className]) => h('th', { scope: 'col', className }, name)),
        ),
      ]),
      ...groups,
    ]),
  ]
}

const HEADS = [
  ['Line', 'number'],
  ['Check', 'title'],
  ['Demand', 'demand'],
  ['', 'relation'],
  ['Limit', 'capacity'],
  ['Utilisation', 'utilisation'],
  ['Verdict', 'verdict'],
] as const

function group(title: string, rows: Element[]): Element[] {
  if (rows.length === 0) return []
  return [
    h('tbody', [
      h('tr', { className: 'group' }, [h('th', { colSpan: 7, scope: 'rowgroup' }, title)]),
      ...rows,
    ]),
  ]
}

function row(check: CheckLine, title: string, { governing }: PageChecks, page: Page): Element {
  const [demand, capacity] = showComparison(check.demand, check.capacity, page.profile)
  const number = page.numbers.of.get(check)
  const governs = check === governing
  return h(
    'tr',
    { className: [check.verdict === 'pass' ? 'ok' : 'not-ok', ...(governs ? ['governs'] : [])] },
    [
      h('td', { className: 'number' }, number === undefined ? [] : [lineLink(number)]),
      h('th', { scope: 'row', className: 'title' }, [title, ...(governs ? GOVERNS : [])]),
      h('td', { className: 'demand' }, shownText(demand)),
      h('td', { className: 'relation' }, relation(check)),
      h('td', { className: 'capacity' }, shownText(capacity)),
      h('td', { className: 'utilisation' }, [
        h('span', { className: 'figure' }, utilisationText(check)),
        utilisationBar(check),
      ]),
      h('td', { className: 'verdict' }, [verdictWord(check.verdict)]),
    ],
  )
}

const GOVERNS: ElementContent[] = [
  { type: 'text', value: ' ' },
  h('span', { className: 'governs-word' }, 'governs'),
]

/** The demand must be this to the limit, whichever side of the sign it was written on. */
function relation({ statement }: CheckLine): string {
  return statement.relation.length === 2 ? '≤' : '<'
}
