import type { Element, ElementContent } from 'hast'
import { h } from 'hastscript'
import type { Calculation } from '../calculate/types.ts'
import type { PageChecks } from './checks-of-page.ts'
import { usedBy } from './checks-of-page.ts'
import { lineLink } from './cross-references.ts'
import { allEntries, isFailure, type Entry } from './entries.ts'
import { messageText } from './message-text.ts'
import type { Page } from './scope.ts'

type Point = readonly (ElementContent | string)[]

/** What stands against relying on the sheet as it is: holds, limits not kept, lines not calculated, what is not verified. */
export function openPoints(calculation: Calculation, checks: PageChecks, page: Page): Element[] {
  const entries = allEntries(calculation)
  const at = (entry: (typeof entries)[number]): Point => {
    const number = page.numbers.of.get(entry)
    return number === undefined ? [] : ['Line ', lineLink(number), ': ']
  }
  const holds = entries.flatMap((entry): Point[] => {
    const hold =
      entry.statement.hold ?? (!isFailure(entry) && entry.kind === 'named' ? entry.boundBy?.hold : undefined)
    return hold === undefined ? [] : [[...at(entry), ...nameOf(entry), hold]]
  })
  const failures = entries
    .filter(isFailure)
    .map((entry): Point => [
      ...at(entry),
      h('code', entry.statement.text),
      ': ',
      ...messageText(entry.because),
    ])
  const limits = checks.limits
    .filter(({ check }) => check.verdict === 'fail')
    .map(({ method, check }): Point => [...at(check), `${check.title} (${method})`])
  const unverified = usedBy(calculation).flatMap(({ id, calculation: { sheet } }): Point[] =>
    sheet.meta.unverified === undefined ? [] : [[h('code', id), `: ${sheet.meta.unverified}`]],
  )
  const parts = [
    list('Not calculated', failures),
    list('Limits of use not kept', limits),
    list('Open holds', holds),
    list('Not verified', distinct(unverified)),
  ].flat()
  return [
    h(
      'div',
      { className: 'open-points' },
      parts.length > 0 ? parts : [h('p', 'No hold is open, and every line is calculated.')],
    ),
  ]
}

function nameOf({ statement }: Entry): Point {
  return statement.kind === 'acceptance' ? [] : [h('code', statement.name), ', ']
}

function list(title: string, points: readonly Point[]): Element[] {
  if (points.length === 0) return []
  return [
    h('h3', `${title} (${String(points.length)})`),
    h(
      'ul',
      points.map((point) => h('li', [...point])),
    ),
  ]
}

/** A method used twice says once what of it is not verified. */
function distinct(points: readonly Point[]): Point[] {
  return [...new Map(points.map((point) => [JSON.stringify(point), point])).values()]
}
