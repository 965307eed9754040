import type { Heading } from 'mdast'
import type { Calculation } from '../calculate/types.ts'
import { entriesOf, type Entry } from './entries.ts'

export interface Section {
  readonly number: number
  readonly heading?: Heading
  /** The numbers of its first and last line, when it has lines. */
  first?: string
  last?: string
}

/** The number of every printed line, `4.07` for the seventh of section 4, and the sections themselves. */
export interface LineNumbers {
  readonly of: ReadonlyMap<Entry, string>
  readonly sections: readonly Section[]
  /** The section that each heading of the sheet's top rank begins. */
  readonly begun: ReadonlyMap<Heading, Section>
}

/** Sections begin at the headings of the sheet's highest rank; lines above the first of them are in section 0. */
export function numberLines(calculation: Calculation): LineNumbers {
  const { sheet, blocks } = calculation
  const top = sheet.tree.children.filter((node): node is Heading => node.type === 'heading')
  const rank = Math.min(...top.map(({ depth }) => depth))
  const blockOf = new Map(blocks.map((block) => [block.block.node as unknown, block]))
  const sections: Section[] = [{ number: 0 }]
  const begun = new Map<Heading, Section>()
  const of = new Map<Entry, string>()
  let line = 0
  for (const node of sheet.tree.children) {
    if (node.type === 'heading' && node.depth === rank) {
      const section = { number: sections.length, heading: node }
      begun.set(node, section)
      sections.push(section)
      line = 0
    }
    const block = blockOf.get(node)
    const section = sections.at(-1)
    if (!block || !section) continue
    for (const entry of entriesOf(block, calculation)) {
      const number = `${String(section.number)}.${String(++line).padStart(2, '0')}`
      of.set(entry, number)
      section.first ??= number
      section.last = number
    }
  }
  return { of, sections, begun }
}
