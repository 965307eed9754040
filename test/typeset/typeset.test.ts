import type { Element } from 'hast'
import { fromHtml } from 'hast-util-from-html'
import { toHtml } from 'hast-util-to-html'
import { readdirSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { checksOf } from '../../src/verify/verify.ts'
import { elements, hasClass, isTag, only, pageOf, SAMPLES, sheetText, styleOf, words } from './page.ts'

const samples = readdirSync(SAMPLES).filter((file) => file.endsWith('.md'))
const shore = pageOf({ path: 'raking-shore.md' }, { digest: 'sha256:0123456789abcdef' })
const prop = pageOf({ path: 'prop-column.md' })

describe('a page of HTML', () => {
  it.each(samples)('loads nothing and runs nothing: %s', (path) => {
    const { tree } = pageOf({ path })
    expect(
      elements(tree, ({ tagName }) =>
        ['script', 'link', 'iframe', 'object', 'embed', 'base', 'form'].includes(tagName),
      ),
    ).toEqual([])
    const style = styleOf(tree)
    const [policy] = elements(tree, ({ properties }) => properties.httpEquiv !== undefined)
    expect(policy?.properties.content).toMatch(/^default-src 'none';/)
    for (const [, address = ''] of style.matchAll(/url\(([^)]{0,40})/g))
      expect(address).toMatch(/^data:font\/woff2;base64,/)
    expect(style).not.toContain('@import')
    for (const { properties } of elements(tree, () => true)) {
      expect(Object.keys(properties).filter((name) => /^on/i.test(name))).toEqual([])
      if (typeof properties.src === 'string') expect(properties.src).toMatch(/^data:/)
    }
  })

  it.each(samples)('is the same bytes each time: %s', (path) => {
    expect(pageOf({ path }).html === pageOf({ path }).html).toBe(true)
  })

  it.each(samples)('is written as any writer of HTML trees would write it: %s', (path) => {
    const { tree, html } = pageOf({ path })
    const read = (text: string) =>
      JSON.stringify(fromHtml(text), (key, value: unknown) => (key === 'position' ? undefined : value))
    expect(read(html.trimEnd()) === read(toHtml(tree))).toBe(true)
  })

  it('names its language and its title', () => {
    expect(only(elements(shore.tree, isTag('html'))).properties.lang).toBe('en-GB')
    expect(words(only(elements(shore.tree, isTag('title'))))).toBe('TW-110 Raking shore RS2, axial stability')
  })

  it.each(samples)('links only to places that are on it: %s', (path) => {
    const { tree } = pageOf({ path })
    const ids = new Set(
      elements(tree, ({ properties }) => properties.id !== undefined).map(
        ({ properties }) => `#${String(properties.id)}`,
      ),
    )
    const links = elements(tree, isTag('a'))
      .map(({ properties }) => String(properties.href))
      .filter((href) => href.startsWith('#'))
    expect(links.length).toBeGreaterThan(5)
    expect(links.filter((href) => !ids.has(href))).toEqual([])
  })

  it.each(samples)('has every id once: %s', (path) => {
    const ids = elements(pageOf({ path }).tree, ({ properties }) => properties.id !== undefined).map(
      ({ properties }) => properties.id,
    )
    expect(ids.length).toBe(new Set(ids).size)
  })

  it.each(samples)('heads every column of its tables, and ranks its headings without a gap: %s', (path) => {
    const { tree } = pageOf({ path })
    for (const cell of elements(tree, isTag('thead')).flatMap((head) => elements(head, isTag('th')))) {
      // A table of the author's has no scopes; its cells are heads by standing in the head.
      if (cell.properties.scope !== undefined) expect(cell.properties.scope).toBe('col')
    }
    const ranks = elements(tree, ({ tagName }) => /^h[1-6]$/.test(tagName)).map(({ tagName }) =>
      Number(tagName[1]),
    )
    expect(ranks.filter((rank) => rank === 1)).toHaveLength(1)
    for (const [i, rank] of ranks.entries())
      if (i > 0) expect(rank - (ranks[i - 1] ?? 0)).toBeLessThanOrEqual(1)
  })
})

describe('the first sheet', () => {
  it('carries every field of the title block', () => {
    const block = words(only(elements(shore.tree, hasClass('title-block'))))
    for (const field of [
      'Raking shore RS2, axial stability',
      'Tallow Yard basement',
      'TW-110',
      'B',
      'TY-2207',
      '2026-03-02',
      'Plot 7, Tallow Yard, north wall, grid lines B to E',
      'Temporary works',
      'draft – not checked, not issued',
    ])
      expect(block).toContain(field)
  })

  it('names the originator and leaves checker, approver and all initials blank', () => {
    const rows = elements(only(elements(shore.tree, hasClass('people'))), isTag('tr')).map((row) =>
      elements(row, ({ tagName }) => tagName === 'td' || tagName === 'th').map(words),
    )
    expect(rows.slice(1)).toEqual([
      ['Originator', 'A. Example', '', '2026-03-02'],
      ['Checker', '', '', ''],
      ['Approver', '', '', ''],
    ])
  })

  it('says the verdict in words and marks the one check that governs', () => {
    expect(words(only(elements(shore.tree, hasClass('verdict-sentence'))))).toMatch(/^All \d+ checks hold\.$/)
    expect(elements(shore.tree, hasClass('governs'))).toHaveLength(1)
  })

  it('lists every check of the sheet with its utilisation and its verdict', () => {
    const rows = elements(only(elements(shore.tree, hasClass('checks-table'))), isTag('tr')).map(words)
    const own = checksOf(shore.prepared.calculation).filter(({ validity }) => !validity)
    for (const { title, utilisation } of own) {
      const row = rows.find((text) => text.includes(title))
      expect(row).toContain((utilisation ?? 0).toFixed(3).slice(0, 4))
      expect(row).toMatch(/OK$/)
    }
    expect(rows.some((row) => row.includes('3 limits are kept'))).toBe(true)
  })

  it('names what a failed sheet fails in, and says so in the head of every page', () => {
    const { tree } = pageOf(sheetText('```check\n2 kN <= 1 kN # crushing\n1 kN <= 2 kN # tension\n```\n'))
    expect(words(only(elements(tree, hasClass('verdict-sentence'))))).toBe('1 of 2 checks does NOT hold.')
    expect(styleOf(tree)).toMatch(/--head-alarm:"NOT OK\\a 1 check failed"/)
    expect(elements(tree, hasClass('line', 'not-ok'))).toHaveLength(1)
    expect(elements(tree, hasClass('banner'))).toEqual([])
  })

  it('is headed by a banner when something is not calculated, and names what is not', () => {
    const { tree } = pageOf(sheetText('```working\na = 2 m + 3 s\nb = a\n```\n\n```check\na <= 4 m\n```\n'))
    expect(words(only(elements(tree, hasClass('banner'))))).toContain('1 error')
    expect(styleOf(tree)).toMatch(/--head-alarm:"NOT CALCULATED\\a 1 error"/)
    const failures = elements(tree, hasClass('failure')).map(words)
    expect(failures).toHaveLength(3)
    expect(failures[0]).toContain('a = 2 m + 3 s')
    expect(failures[0]).toContain('a length and a time')
    expect(words(only(elements(tree, hasClass('open-points'))))).toContain('Not calculated (3)')
  })

  it('has no alarm when all is well', () => {
    expect(styleOf(shore.tree)).toContain('--head-alarm:none')
  })

  it('lists open holds and limits that are not kept', () => {
    expect(words(only(elements(prop.tree, hasClass('open-points'))))).toContain(
      'test certificate of the hired base plates',
    )
    const { tree } = pageOf(sheetText(method('f_y = 500 MPa')))
    expect(words(only(elements(tree, hasClass('open-points'))))).toContain('Limits of use not kept (1)')
    expect(words(only(elements(tree, hasClass('checks-table'))))).toContain('NOT OK')
  })
})

const method = (yieldStrength: string, brief = '') =>
  `\`\`\`method en1993-1-1-2005/6.3.1 as strut${brief}\nA = 2000 mm^2\n${yieldStrength}\nN_cr = 900 kN\ncurve = "b"\n\`\`\`\n\n` +
  '```check\n100 kN <= strut.N_b_Rd # buckling\n```\n'

describe('the body', () => {
  it.each(samples)('numbers every line once, by section and place: %s', (path) => {
    const { tree } = pageOf({ path })
    const numbers = elements(tree, hasClass('line')).map(({ properties }) => String(properties.id))
    expect(numbers.every((id) => /^line-\d+\.\d\d+$/.test(id))).toBe(true)
    expect(numbers.length).toBe(new Set(numbers).size)
  })

  it('gives every line a reference lane and a square to tick', () => {
    for (const line of elements(shore.tree, hasClass('line'))) {
      expect(
        elements(
          line,
          ({ tagName, properties }) => tagName === 'span' && hasClass('tick')({ properties } as Element),
        ),
      ).toHaveLength(1)
      expect(elements(line, hasClass('evidence'))).toHaveLength(1)
    }
  })

  it('says where the values of a line come from, by line and by sheet', () => {
    const line = only(elements(shore.tree, ({ properties }) => properties.id === 'line-4.01'))
    expect(words(only(elements(line, hasClass('from'))))).toBe('from 3.01, 3.02, 3.03; TW-100 2.01, 2.02')
  })

  it('tells given, looked-up, calculated and carried values apart by their marks', () => {
    const given = only(elements(shore.tree, ({ properties }) => properties.id === 'line-3.01'))
    expect(words(only(elements(given, hasClass('value', 'given'))))).toBe('118\u00a0kN')
    const tube = only(elements(shore.tree, ({ properties }) => properties.id === 'line-3.05'))
    const looked = elements(tube, hasClass('value', 'looked-up')).map(words)
    expect(looked).toContain('CHS 139.7x6.3')
    expect(looked).toContain('589\u00a0cm⁴')
    const carried = only(elements(shore.tree, ({ properties }) => properties.id === 'line-2.01'))
    expect(words(only(elements(carried, hasClass('value', 'carried'))))).toBe('1.35')
    expect(words(only(elements(carried, hasClass('lender'))))).toBe('TW-100')
    const conclusion = elements(shore.tree, isTag('p')).find((p) => words(p).startsWith('RS2 carries'))
    expect(elements(conclusion as Element, hasClass('value', 'result')).map(words)).toContain('301.1\u00a0kN')
  })

  it('prints the steps of a method, and of a brief one its results only', () => {
    const full = words(pageOf(sheetText(method('f_y = 355 MPa'))).tree)
    expect(full).toContain('auxiliary value')
    expect(full).toContain('Not verified:')
    const brief = pageOf(sheetText(method('f_y = 355 MPa', ' brief'))).tree
    const main = words(only(elements(brief, isTag('main'))))
    expect(main).not.toContain('auxiliary value')
    expect(main).toContain('design buckling resistance')
    expect(main).toContain('steel grades up to S460')
  })

  it('reports both routes of a numerical result and how far they differ, under its line and in the record', () => {
    const { tree } = pageOf({ path: 'folding-mast.md' })
    const notes = elements(tree, hasClass('solver')).map(words)
    expect(notes.length).toBeGreaterThan(3)
    for (const note of notes) expect(note).toMatch(/Second route .* differs by .* allowed|No second route/)
    expect(elements(only(elements(tree, hasClass('solvers'))), isTag('tr')).length).toBe(notes.length + 1)
  })

  it('shows in place what in prose is not calculated or cannot be set, and reports the latter', () => {
    const { tree } = pageOf(
      sheetText(
        'The value :value[nothing] and $\\frac{1}{2$ and ![p](sketch.png).\n\n```check\n1 <= 2\n```\n',
      ),
    )
    const marks = elements(tree, hasClass('not-calculated')).map(words)
    expect(marks).toEqual([
      'nothing not calculated',
      '\\frac{1}{2 cannot be set as mathematics',
      'picture sketch.png is not on the page',
    ])
    expect(tree.data?.findings?.map(({ ruleId, line }) => [ruleId, line])).toEqual([
      ['bad-mathematics', 6],
      ['picture-left-out', 6],
    ])
  })

  it('puts values into prose, tables and headings', () => {
    const { tree } = pageOf(
      sheetText(
        '```given\nL = 4.60 m # length [A-1]\n```\n\n# Span :value[L]\n\n| a |\n|---|\n| :value[2*L] |\n',
      ),
    )
    expect(
      words(only(elements(tree, ({ tagName, properties }) => tagName === 'h2' && properties.id === 'span-'))),
    ).toBe('1 Span 4.60\u00a0m')
    expect(elements(tree, isTag('td')).map(words)).toContain('9.2\u00a0m')
  })
})

describe('the end matter', () => {
  it.each(samples)('explains every symbol of the sheet, with its unit and line: %s', (path) => {
    const { tree, prepared } = pageOf({ path })
    const table = only(elements(tree, hasClass('notation')))
    const written = elements(table, isTag('code')).map(words)
    for (const [name, line] of prepared.calculation.names) {
      expect(written).toContain(name)
      const row = elements(table, isTag('tr')).find((tr) =>
        elements(tr, isTag('code')).some((code) => words(code) === name),
      )
      expect(words(row as Element)).toContain(line.statement.meaning ?? '')
      expect(elements(row as Element, isTag('a'))).toHaveLength(1)
    }
  })

  it.each(samples)('lists every reference that a statement of the sheet gives: %s', (path) => {
    const { tree, prepared } = pageOf({ path })
    const listed = elements(only(elements(tree, hasClass('references'))), isTag('th')).map(words)
    for (const { block } of prepared.calculation.blocks) {
      if (block.kind === 'method') continue
      for (const { reference } of block.statements)
        if (reference !== undefined) expect(listed).toContain(reference)
    }
  })

  it('lists what the prose cites in square brackets, and takes no interval for a reference', () => {
    const { tree } = pageOf(
      sheetText(
        '# One\n\nAs in [EN 1990 Table A1.2], for x in [0, 1].\n\n```check\n1 <= 2 # so [B-2]\n```\n',
      ),
    )
    const rows = elements(only(elements(tree, hasClass('references'))), isTag('tr')).map(words)
    expect(rows).toContain('EN 1990 Table A1.2section 1')
    expect(rows.some((row) => row.includes('0, 1'))).toBe(false)
  })

  it('lists the findings with kind, place, message and hint', () => {
    const row = words(only(elements(only(elements(prop.tree, hasClass('findings'))), hasClass('warning'))))
    expect(row).toMatch(/^warningline \d+:1/)
    expect(row).toContain('awaits confirmation')
    expect(row).toContain('hold-open')
  })

  it('records program, digest, sheets and methods with their editions', () => {
    const end = words(only(elements(shore.tree, hasClass('end-matter'))))
    for (const text of [
      'Stanchion 1.2.3',
      'sha256:0123456789abcdef',
      'TW-100 revision C',
      'EN 1993-1-1:2005',
      '13 published values',
    ])
      expect(end).toContain(text)
  })

  it('asks for review and says what OK does not mean', () => {
    const text = words(shore.tree)
    expect(text).toContain('by an engineer licensed at the place of the works')
    expect(text).toContain('It does not say that the structure is safe')
    expect(text).not.toMatch(/\bapproved by\b|\bcertified\b/i)
  })
})

describe('text that means harm', () => {
  const harm = '</style><script>alert(1)</script><img src=x onerror=alert(2)>"\'\\'
  const quoted = JSON.stringify(harm)
  const { html, tree } = pageOf(
    `---\nsheet: ${quoted}\ntitle: ${quoted}\nproject: ${quoted}\nrevision: ${quoted}\noriginator: {name: ${quoted}}\n---\n\n` +
      `# ${harm}\n\n${harm} [x](javascript:alert(3)) <a href="javascript:alert(4)" onclick="alert(5)">y</a>\n\n` +
      `\`\`\`given\nL = 2 m # ${harm} [${harm}] @hold ${JSON.stringify(harm.replaceAll('"', ''))}\nt = ${JSON.stringify(harm.replaceAll('"', '').replaceAll('\\', ''))}\n\`\`\`\n\n` +
      '```check\n1 m <= L\n```\n\n<sheet-place n="0"></sheet-place><place></place>\n',
  )

  it('stays text wherever it stands', () => {
    expect(elements(tree, ({ tagName }) => ['script', 'img', 'iframe'].includes(tagName))).toEqual([])
    expect(html.includes('<script')).toBe(false)
    expect(/href="?javascript/.test(html)).toBe(false)
    expect(
      elements(tree, ({ properties }) => Object.keys(properties).some((name) => /^on/i.test(name))),
    ).toEqual([])
    expect(words(only(elements(tree, isTag('h1'))))).toBe(harm)
  })

  it('does not end the style, nor any text in it', () => {
    expect(styleOf(tree)).toMatch(/--foot-right:"[^"]*"}$/)
    expect(html.match(/<\/style>/g)).toHaveLength(1)
  })

  it('makes no place of the page’s own', () => {
    expect(elements(tree, isTag('sheet-place'))).toEqual([])
    expect(words(tree)).toContain('<sheet-place n="0">')
    expect(elements(tree, hasClass('value-table'))).toHaveLength(1)
  })
})

describe('paper and PDF', () => {
  it('takes the paper of the sheet, unless another is asked for', () => {
    expect(styleOf(shore.tree)).toContain('@page{size:210mm 297mm}')
    expect(styleOf(pageOf({ path: 'steel-column-us.md' }).tree)).toContain('@page{size:8.5in 11in}')
    expect(styleOf(pageOf({ path: 'raking-shore.md' }, { paper: 'Letter' }).tree)).toContain(
      '@page{size:8.5in 11in}',
    )
  })

  it('has MathML in HTML, and for the PDF formulas named in words', () => {
    expect(elements(shore.tree, isTag('math')).length).toBeGreaterThan(20)
    const { tree } = pageOf({ path: 'raking-shore.md' }, { forPdf: true })
    expect(elements(tree, isTag('math'))).toEqual([])
    const images = elements(tree, ({ properties }) => properties.role === 'img')
    expect(images.length).toBeGreaterThan(20)
    expect(images.filter(({ properties }) => !properties.ariaLabel)).toEqual([])
  })

  it('carries the identity, the status and the short digest in the margins', () => {
    expect(styleOf(shore.tree)).toContain(
      '--head-left:"Tallow Yard basement\\a Raking shore RS2, axial stability"',
    )
    expect(styleOf(shore.tree)).toMatch(
      /--head-right:"TW-110[^"]*revision B\\a draft – not checked, not issued\\a "/,
    )
    expect(styleOf(shore.tree)).toContain('--foot-right:"Stanchion 1.2.3\\a sha256 0123456789ab"')
    expect(styleOf(shore.tree)).toContain("'sheet ' counter(page) ' of ' counter(pages)")
  })
})
