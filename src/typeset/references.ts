import type { Element } from 'hast'
import { h } from 'hastscript'
import type { Heading, Nodes, Root } from 'mdast'
import { visit } from 'unist-util-visit'
import type { Calculation } from '../calculate/types.ts'
import { lineLink } from './cross-references.ts'
import { entriesOf, isFailure, type Entry } from './entries.ts'
import { sourceOf } from './evidence.ts'
import type { LineNumbers } from './line-numbers.ts'
import type { Page } from './scope.ts'

interface Cited {
  readonly lines: Set<string>
  readonly sections: Set<number>
}

/** Every source that a line or the prose cites, with where it is cited; like sources stand together. */
export function references(calculation: Calculation, page: Page): Element[] {
  const cited = citations(calculation, page.numbers)
  if (cited.size === 0) return []
  const sorted = [...cited].sort(([a], [b]) => (a < b ? -1 : a > b ? 1 : 0))
  return [
    h('h2', 'References'),
    h('table', { className: 'references' }, [
      h('caption', { className: 'hidden' }, 'References'),
      h('thead', [h('tr', [h('th', { scope: 'col' }, 'Source'), h('th', { scope: 'col' }, 'Cited in')])]),
      h(
        'tbody',
        sorted.map(([source, where]) => h('tr', [h('th', { scope: 'row' }, source), h('td', places(where))])),
      ),
    ]),
  ]
}

function places({ lines, sections }: Cited) {
  const all = [
    ...[...lines].map((number) => lineLink(number)),
    ...[...sections].map((section) => h('span', `section ${String(section)}`)),
  ]
  return all.flatMap((place, i) => (i === 0 ? [place] : [', ', place]))
}

export function citations(calculation: Calculation, numbers: LineNumbers): ReadonlyMap<string, Cited> {
  const cited = new Map<string, Cited>()
  const at = (source: string): Cited => {
    let found = cited.get(source)
    if (!found) cited.set(source, (found = { lines: new Set(), sections: new Set() }))
    return found
  }
  for (const entry of calculation.blocks.flatMap(entriesOf)) {
    const number = numbers.of.get(entry)
    if (number === undefined) continue
    for (const source of sourcesOf(entry)) at(source).lines.add(number)
  }
  for (const { text, section } of proseSources(calculation.sheet.tree, numbers))
    at(text).sections.add(section)
  return cited
}

function sourcesOf(entry: Entry): string[] {
  const bound = !isFailure(entry) && entry.kind === 'named' ? entry.boundBy : undefined
  const table = !isFailure(entry) && entry.kind === 'named' && !bound ? sourceOf(entry.value) : undefined
  return [entry.statement.reference, bound?.reference, table].filter((source) => source !== undefined)
}

/** `[EN 1993-1-1 Table 6.2]` in prose: in square brackets, with a capital letter and a digit, so that an interval is none. */
const IN_PROSE = /\[([^[\]]*)\]/g

function* proseSources(tree: Root, numbers: LineNumbers): Generator<{ text: string; section: number }> {
  const found: { text: string; section: number }[] = []
  let section = 0
  visit(tree as Nodes, (node) => {
    if (node.type === 'heading') section = numbers.begun.get(node as Heading)?.number ?? section
    if (node.type !== 'text') return
    for (const [, text = ''] of node.value.matchAll(IN_PROSE)) {
      if (/\p{Lu}/u.test(text) && /\d/.test(text)) found.push({ text, section })
    }
  })
  yield* found
}
