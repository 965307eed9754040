import { getDocument } from 'pdfjs-dist/legacy/build/pdf.mjs'
import { beforeAll, describe, expect, it } from 'vitest'
import { printPdf } from '../../src/publish/print-pdf.ts'
import { readPdf, type ReadPdf } from '../publish/read-pdf.ts'
import { elements, pageOf, sheetText, words } from './page.ts'

const CHECK = '```check\n1 <= 2 # so it is [B-2]\n```\n'
const LETTERS =
  'a + b + c + d + e + f + g + h + i + j + k + l + m + n + o + p + q + r + s + t + u + v + w + x + y + z'

/** What would run over the edge of the paper, were it not broken or cut. */
const WIDE = [
  `$$\n\\begin{aligned} x &= ${LETTERS} + ${LETTERS} \\end{aligned}\n$$`,
  `$$\n${LETTERS} + ${LETTERS}\n$$`,
  `| ${'a'.repeat(200)} | b |\n|---|---|\n| 1 | 2 |`,
  `\`${'c'.repeat(300)}\``,
  `\`\`\`given\n${'long_'.repeat(12)}name = 123456789.123456 kN # m [x]\nt = "${'no_blank_'.repeat(12)}" # text [y]\n\`\`\``,
].join('\n\n')

const PAGES = {
  plain: pageOf(sheetText(CHECK), { forPdf: true }),
  wide: pageOf(sheetText(`${WIDE}\n\n${CHECK}`), { forPdf: true }),
  failed: pageOf(sheetText('```check\n3 <= 2 # too much [B-2]\n```\n'), { forPdf: true }),
  shore: pageOf({ path: 'raking-shore.md' }, { forPdf: true, digest: 'sha256:0123456789abcdef' }),
  letter: pageOf({ path: 'steel-column-us.md' }, { forPdf: true }),
}

const printed = new Map<string, Uint8Array>()
const read = new Map<string, ReadPdf>()
const pdf = (name: keyof typeof PAGES): ReadPdf => read.get(name) as ReadPdf

beforeAll(async () => {
  const jobs = Object.entries(PAGES).map(([name, { html }]) => ({
    name,
    html,
    metadata: { title: name, language: 'en', creator: 'test' },
  }))
  for await (const result of printPdf(jobs)) {
    if ('problem' in result) throw result.problem
    printed.set(result.job.name, result.pdf)
    read.set(result.job.name, await readPdf(result.pdf))
  }
}, 240_000)

/** The size in points in which the first text that contains `words` is set. */
async function sizeOf(name: keyof typeof PAGES, words: string): Promise<number> {
  const task = getDocument({ data: Uint8Array.from(printed.get(name) as Uint8Array), verbosity: 0 })
  const page = await (await task.promise).getPage(1)
  const { items } = await page.getTextContent()
  const found = items.find((item) => 'str' in item && item.str.includes(words))
  await task.destroy()
  return found && 'transform' in found ? Math.abs((found.transform as number[])[3] ?? 0) : 0
}

describe('the printed sheet', () => {
  it('is not shrunk by what would run over its edge', async () => {
    const plain = await sizeOf('plain', 'Result')
    expect(plain).toBeCloseTo(12.5, 1)
    expect(await sizeOf('wide', 'Result')).toBeCloseTo(plain, 3)
  })

  it('carries identity, status, count and review notice on every page', () => {
    const { pages } = pdf('shore')
    expect(pages.length).toBeGreaterThan(4)
    for (const [i, text] of pages.entries()) {
      for (const part of [
        'Tallow Yard basement',
        'Raking shore RS2, axial stability',
        'TW-110',
        'revision B',
        'draft – not checked, not issued',
        `sheet ${String(i + 1)} of ${String(pages.length)}`,
        'Originator A. Example, 2026-03-02',
        'Checker',
        'Approver',
        'Not for use until reviewed by a licensed engineer',
        'sha256 0123456789ab',
      ])
        expect(text).toContain(part)
    }
  })

  it('warns at the head of every page when a check fails', () => {
    const { pages } = pdf('failed')
    expect(pages.filter((text) => !text.includes('1 check failed'))).toEqual([])
    expect(pdf('plain').pages.filter((text) => text.includes('failed'))).toEqual([])
  })

  it('has the paper that the sheet asks for', () => {
    const points = (millimetres: number) => (millimetres / 25.4) * 72
    expect(pdf('shore').size.width).toBeCloseTo(points(210), 0)
    expect(pdf('shore').size.height).toBeCloseTo(points(297), 0)
    expect(pdf('letter').size).toEqual({ width: 612, height: 792 })
  })

  it('embeds every face, and takes none from the system', () => {
    for (const name of ['wide', 'shore', 'letter'] as const) {
      const { fonts } = pdf(name)
      expect(fonts.length).toBeGreaterThan(3)
      expect(fonts.filter((font) => !font.embedded || !/SourceSans3|Roboto|KaTeX/.test(font.name))).toEqual(
        [],
      )
    }
  })

  it('is tagged by the types of PDF 1.7, with every formula in words', () => {
    const { tagged, roles, alternatives } = pdf('shore')
    expect(tagged).toBe(true)
    for (const role of ['H1', 'H2', 'Table', 'TH', 'TD', 'L', 'LI', 'Figure', 'Link'])
      expect(roles).toContain(role)
    // Types that came with PDF 2.0 (ISO 32000-2, 14.8.4).
    for (const role of ['Strong', 'Em', 'Aside', 'Title']) expect(roles).not.toContain(role)
    expect(alternatives.some((words) => words.includes('lambda bar'))).toBe(true)
  })

  it.each(['shore', 'letter', 'wide', 'failed'] as const)(
    'has one bookmark for each heading, in its words: %s',
    (name) => {
      const headings = elements(PAGES[name].tree, ({ tagName }) => /^h[1-6]$/.test(tagName)).map(words)
      expect(pdf(name).outline.map((line) => line.trim())).toEqual(headings)
    },
  )
})
