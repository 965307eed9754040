import type { Element } from 'hast'
import { h } from 'hastscript'
import type { Nodes, Root } from 'mdast'
import { visit } from 'unist-util-visit'
import type { Calculation, UsedSheet } from '../calculate/types.ts'
import { usedBy } from './checks-of-page.ts'
import { lineLink } from './cross-references.ts'
import { allEntries, isFailure, type Entry } from './entries.ts'
import { sourceOf } from './evidence.ts'
import type { LineNumbers } from './line-numbers.ts'
import type { Page } from './scope.ts'

/** A source, and the lines and sections that cite it. */
export interface Cited {
  readonly lines: Set<string>
  readonly sections: Set<number>
}

type Citations = ReadonlyMap<string, Cited>

/** Every source that a line or the prose cites, with where; those of a method sheet apart, since they leave its standard unsaid. */
export function references(calculation: Calculation, page: Page): Element[] {
  const own = citations(calculation, page.numbers)
  const builtIn = usedBy(calculation).filter((used) => used.builtIn)
  const methods = [...new Set(builtIn.map(({ id }) => id))]
    .map((id) => builtIn.filter((used) => used.id === id))
    .map((uses) => ({
      uses,
      cited: entryCitations(
        uses.flatMap((used) => linesOf(used, page)),
        page.numbers,
      ),
    }))
    .filter(({ cited }) => cited.size > 0)
  if (own.size === 0 && methods.length === 0) return []
  return [
    h('h2', 'References'),
    h('table', { className: 'references' }, [
      h('caption', { className: 'hidden' }, 'References'),
      h('thead', [h('tr', [h('th', { scope: 'col' }, 'Source'), h('th', { scope: 'col' }, 'Cited in')])]),
      ...(own.size > 0 ? [h('tbody', rows(own))] : []),
      ...methods.map(({ uses, cited }) => h('tbody', [...groupHead(uses), ...rows(cited)])),
    ]),
  ]
}

function rows(cited: Citations): Element[] {
  const sorted = [...cited].sort(([a], [b]) => (a < b ? -1 : a > b ? 1 : 0))
  return sorted.map(([source, where]) => h('tr', [h('th', { scope: 'row' }, source), h('td', places(where))]))
}

function groupHead(uses: readonly UsedSheet[]): Element[] {
  return uses.slice(0, 1).map(({ id, calculation }) => {
    const { source } = calculation.sheet.meta
    const title = [`In the method sheet `, h('code', id), ...(source === undefined ? [] : [`: ${source}`])]
    return h('tr', { className: 'group' }, [h('th', { colSpan: 2, scope: 'rowgroup' }, title)])
  })
}

function places({ lines, sections }: Cited) {
  const all = [
    ...[...lines].map((number) => lineLink(number)),
    ...[...sections].map((section) => h('span', `section ${String(section)}`)),
  ]
  return all.flatMap((place, i) => (i === 0 ? [place] : [', ', place]))
}

/** What the sheet itself cites, and the sheets of the project that it uses. */
export function citations(calculation: Calculation, numbers: LineNumbers): Citations {
  const methods = new Set(
    usedBy(calculation)
      .filter(({ builtIn }) => builtIn)
      .flatMap(({ calculation: inner }) => allEntries(inner)),
  )
  const cited = entryCitations(allEntries(calculation), numbers, methods)
  for (const { text, section } of proseSources(calculation.sheet.tree, numbers))
    placesOf(text, cited).sections.add(section)
  return cited
}

const linesOf = ({ calculation }: UsedSheet, { numbers }: Page): readonly Entry[] =>
  allEntries(calculation).filter((entry) => numbers.of.has(entry))

function entryCitations(
  entries: readonly Entry[],
  numbers: LineNumbers,
  methods: ReadonlySet<Entry> = new Set(),
): Map<string, Cited> {
  const cited = new Map<string, Cited>()
  for (const entry of entries) {
    const number = numbers.of.get(entry)
    if (number === undefined) continue
    for (const source of methods.has(entry) ? bindingSources(entry) : sourcesOf(entry))
      placesOf(source, cited).lines.add(number)
  }
  return cited
}

function placesOf(source: string, cited: Map<string, Cited>): Cited {
  let found = cited.get(source)
  if (!found) cited.set(source, (found = { lines: new Set(), sections: new Set() }))
  return found
}

function sourcesOf(entry: Entry): string[] {
  const table =
    !isFailure(entry) && entry.kind === 'named' && !entry.boundBy ? sourceOf(entry.value) : undefined
  return [entry.statement.reference, table].filter((source) => source !== undefined)
}

/** What the using sheet cites where it binds an input. */
function bindingSources(entry: Entry): string[] {
  const reference = !isFailure(entry) && entry.kind === 'named' ? entry.boundBy?.reference : undefined
  return reference === undefined ? [] : [reference]
}

/** `[EN 1993-1-1 Table 6.2]` in prose: in square brackets, with a capital letter and a digit, so that an interval is none. */
const IN_PROSE = /\[([^[\]]*)\]/g

function proseSources(tree: Root, numbers: LineNumbers): readonly { text: string; section: number }[] {
  const found: { text: string; section: number }[] = []
  let section = 0
  visit(tree as Nodes, (node) => {
    if (node.type === 'heading') section = numbers.begun.get(node)?.number ?? section
    if (node.type !== 'text') return
    for (const [, text = ''] of node.value.matchAll(IN_PROSE)) {
      if (/\p{Lu}/u.test(text) && /\d/.test(text)) found.push({ text, section })
    }
  })
  return found
}
