import type { Element, ElementContent } from 'hast'
import { h } from 'hastscript'
import type { CheckLine, Verdict } from '../calculate/types.ts'
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
      'Limits of use',
      limitUses(checks).flatMap((use) => limitRows(use, page)),
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

interface LimitUse {
  readonly method: string
  readonly kept: CheckLine[]
  readonly broken: CheckLine[]
}

function limitUses({ limits }: PageChecks): LimitUse[] {
  const uses = new Map<string, LimitUse>()
  for (const { method, check } of limits) {
    const use = uses.get(method) ?? { method, kept: [], broken: [] }
    uses.set(method, use)
    const side = check.verdict === 'pass' ? use.kept : use.broken
    side.push(check)
  }
  return [...uses.values()]
}

/** The limits that are kept in one row for each use of a method; each that is not in its own. */
function limitRows({ method, kept, broken }: LimitUse, page: Page): Element[] {
  const [first, last] = [kept[0], kept.at(-1)]
  const ends = [...new Set([first, last])].flatMap((check) => (check && page.numbers.of.get(check)) ?? [])
  const together =
    kept.length === 0
      ? []
      : [
          limitRow(
            ends,
            `${method}: ${kept.length === 1 ? 'its limit is' : `its ${String(kept.length)} limits are`} kept`,
            'pass',
          ),
        ]
  const each = broken.map((check) =>
    limitRow([page.numbers.of.get(check) ?? ''], `${method}: ${check.title}`, 'fail'),
  )
  return [...each, ...together]
}

function limitRow(ends: readonly string[], title: string, verdict: Verdict): Element {
  const numbers = ends.flatMap((number, i) => (i === 0 ? [lineLink(number)] : [' – ', lineLink(number)]))
  return h('tr', { className: verdict === 'pass' ? 'ok' : 'not-ok' }, [
    h('td', { className: 'number' }, numbers),
    h('th', { scope: 'row', className: 'title', colSpan: 5 }, title),
    h('td', { className: 'verdict' }, [verdictWord(verdict)]),
  ])
}

const GOVERNS: ElementContent[] = [
  { type: 'text', value: ' ' },
  h('span', { className: 'governs-word' }, 'governs'),
]

/** The demand must be this to the limit, whichever side of the sign it was written on. */
function relation({ statement }: CheckLine): string {
  return statement.relation.length === 2 ? '≤' : '<'
}
