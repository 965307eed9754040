import { execFileSync, spawn } from 'node:child_process'
import { chmodSync, mkdtempSync, readFileSync, readdirSync, rmSync, writeFileSync } from 'node:fs'
import { createServer } from 'node:http'
import type { AddressInfo } from 'node:net'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { rolldown } from 'rolldown'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { PdfMetadata } from '../../src/publish/finish-pdf.ts'
import { printPdf, type PdfJob, type PdfResult, type PrintOptions } from '../../src/publish/print-pdf.ts'
import { PublishProblem } from '../../src/publish/publish-problem.ts'
import { readPdf } from './read-pdf.ts'

const METADATA: PdfMetadata = {
  title: 'TW-014 Raking shore – λ̄ check',
  language: 'en-GB',
  subject: 'Axial stability',
  keywords: ['flexural buckling', 'shore'],
  author: 'A. Example',
  date: '2026-03-02',
  creator: 'Stanchion 0.1.0',
}

/** A page in the manner of a sheet: an embedded face, headings, a table, an equation with its words, sheet numbers. */
const katex = (name: string) =>
  readFileSync(new URL(`../../node_modules/katex/dist/fonts/${name}.woff2`, import.meta.url)).toString(
    'base64',
  )
const STYLE = `
  @font-face { font-family: face; src: url(data:font/woff2;base64,${katex('KaTeX_Main-Regular')}) format("woff2") }
  @page { size: A4; margin: 20mm; @bottom-right { font-family: face; content: "sheet " counter(page) " of " counter(pages) } }
  * { font-family: face; font-weight: normal }
  h2 { break-before: page; white-space: pre-wrap }`
const SHEET = page(`<h1>Raking shore</h1><p>The shore carries 285 kN.</p>
  <span role="img" aria-label="N sub cr equals pi squared E I over L squared">N = 5</span>
  <h2>Flexural buckling</h2><table><thead><tr><th>check</th></tr></thead><tbody><tr><td>0.94</td></tr></tbody></table>`)

function page(body: string, head = ''): string {
  return `<!doctype html><html lang="en-GB"><head><meta charset="utf-8"><title>t</title><style>${STYLE}</style>${head}</head><body>${body}</body></html>`
}

const job = (html: string): PdfJob => ({ html, metadata: METADATA })

async function print(jobs: readonly PdfJob[], options?: PrintOptions): Promise<PdfResult[]> {
  const results: PdfResult[] = []
  for await (const result of printPdf(jobs, options)) results.push(result)
  return results
}

async function printOne(
  html: string,
  options?: PrintOptions,
): Promise<{ pdf: Uint8Array; notes: readonly string[] }> {
  const [result] = await print([job(html)], options)
  if (!result || 'problem' in result) throw result?.problem ?? new Error('no result')
  return result
}

async function problemOf(work: Promise<unknown>): Promise<PublishProblem> {
  const problem: unknown = await work.then(
    () => undefined,
    (error: unknown) => error,
  )
  expect(problem).toBeInstanceOf(PublishProblem)
  return problem as PublishProblem
}

// Everything temporary of these tests is under one folder, so that what is left behind can be seen.
let temporary: string
const before = process.env['TMPDIR']
beforeAll(() => {
  temporary = mkdtempSync(join(tmpdir(), 'stanchion-print-'))
  process.env['TMPDIR'] = temporary
})
afterAll(() => {
  if (before === undefined) delete process.env['TMPDIR']
  else process.env['TMPDIR'] = before
  rmSync(temporary, { recursive: true, force: true })
})

const profiles = () => readdirSync(temporary).filter((name) => name.startsWith('stanchion-browser-'))
/** Processes whose command line names our folder: browsers of these tests. */
const browsers = () =>
  readdirSync('/proc').filter(
    (id) => /^\d+$/.test(id) && commandLine(id).includes(`--user-data-dir=${temporary}`),
  )

function commandLine(id: string): string {
  try {
    return readFileSync(`/proc/${id}/cmdline`, 'utf8')
  } catch {
    return '' // it has ended since
  }
}

async function until(condition: () => boolean, what: string): Promise<void> {
  for (let n = 0; n < 200; n++) {
    if (condition()) return
    await new Promise((resolve) => setTimeout(resolve, 50))
  }
  throw new Error(`waited 10 s for ${what}`)
}

describe('a printed sheet, read back', () => {
  let pdf: Uint8Array
  beforeAll(async () => {
    ;({ pdf } = await printOne(SHEET))
  })

  it('has its text, on as many sheets as it says, on A4', async () => {
    const read = await readPdf(pdf)
    expect(read.pages).toHaveLength(2)
    expect(read.pages[0]).toContain('The shore carries 285 kN.')
    expect(read.pages[0]).toContain('sheet 1 of 2')
    expect(read.pages[1]).toContain('sheet 2 of 2')
    // A4 is 210 mm by 297 mm (ISO 216); a point is 1/72 in.
    expect(Math.abs(read.size.width - (210 / 25.4) * 72)).toBeLessThan(0.5)
    expect(Math.abs(read.size.height - (297 / 25.4) * 72)).toBeLessThan(0.5)
  })

  it('keeps the browser’s bookmarks and tags', async () => {
    const read = await readPdf(pdf)
    expect(read.outline).toEqual(['Raking shore', '  Flexural buckling'])
    expect(read.tagged).toBe(true)
    expect(read.roles).toEqual(expect.arrayContaining(['Document', 'H1', 'H2', 'P', 'TH', 'TD', 'Figure']))
    expect(read.alternatives).toEqual(['N sub cr equals pi squared E I over L squared'])
  })

  it('has every font embedded', async () => {
    const { fonts } = await readPdf(pdf)
    expect(fonts.length).toBeGreaterThan(0)
    expect(fonts.filter((font) => !font.embedded)).toEqual([])
    expect(fonts.map((font) => font.name).join()).toContain('KaTeX_Main')
  })

  it('says what it is: title shown by the reader, language, subject, keywords, author, program and the record’s date', async () => {
    const { info, language, showsTitle } = await readPdf(pdf)
    expect(info).toMatchObject({
      Title: METADATA.title,
      Subject: 'Axial stability',
      Keywords: 'flexural buckling, shore',
      Author: 'A. Example',
      Creator: 'Stanchion 0.1.0',
      CreationDate: 'D:20260302000000Z',
      ModDate: 'D:20260302000000Z',
    })
    expect(info['Producer']).toMatch(/^Stanchion 0\.1\.0 with Skia\/PDF m\d+$/)
    expect(language).toBe('en-GB')
    expect(showsTitle).toBe(true)
  })

  it('is accepted by qpdf where that is installed', () => {
    const file = join(temporary, 'sheet.pdf')
    writeFileSync(file, pdf)
    if (installed('qpdf')) execFileSync('qpdf', ['--check', file])
  })

  it('has the same bytes when printed again later, and no date without a record’s', async () => {
    const undated = { html: SHEET, metadata: { ...METADATA, date: undefined } }
    const [again, without, later] = (await print([job(SHEET), undated, undated])).map((result) => {
      if ('problem' in result) throw result.problem
      return Buffer.from(result.pdf)
    })
    expect(again?.equals(pdf)).toBe(true)
    expect(without && later?.equals(without)).toBe(true)
    const { info } = await readPdf(without ?? pdf)
    expect(info).not.toHaveProperty('CreationDate')
    expect(info).not.toHaveProperty('ModDate')
  })
})

function installed(program: string): boolean {
  try {
    execFileSync(program, ['--version'], { stdio: 'ignore' })
    return true
  } catch {
    return false
  }
}

describe('a page that is not trusted', () => {
  it('reaches neither the network nor a file, runs no script and stays where it is', async () => {
    let asked = 0
    const server = createServer((_, response) => {
      asked++
      response.end('FETCHED')
    })
    await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve))
    const web = `http://127.0.0.1:${(server.address() as AddressInfo).port}`
    const secret = join(temporary, 'secret.html')
    writeFileSync(secret, 'SECRET')
    const head = `<meta http-equiv="refresh" content="0;url=${web}/away"><link rel="stylesheet" href="${web}/a.css">
      <link rel="preconnect" href="${web}"><link rel="prefetch" href="${web}/p"><style>@import url("${web}/b.css");</style>`
    const body = `<p>STAYS</p><img src="${web}/a.png"><iframe src="${web}/frame"></iframe><object data="${web}/o"></object>
      <iframe src="file://${secret}"></iframe><embed src="file://${secret}"><img src="file://${secret}">
      <p id="s"></p><script>document.getElementById('s').textContent = 'SCRIPT RAN'</script>
      <p style="background: url(${web}/c.png)">x</p><svg><image href="${web}/d.png"/><use href="file://${secret}#a"/></svg>`
    const { pdf, notes } = await printOne(page(body, head))
    const text = (await readPdf(pdf)).pages.join('\n')
    expect(text).toContain('STAYS')
    expect(text).not.toMatch(/SECRET|FETCHED|SCRIPT RAN/)
    expect(asked).toBe(0)
    expect(notes.some((note) => note.includes(`asked for \`${web}/a.png\``))).toBe(true)
    server.close()
  })
})

describe('several sheets', () => {
  it('share one browser, which is gone afterwards with its profile', async () => {
    const seen = new Set<string>()
    for await (const result of printPdf([job(SHEET), job(SHEET), job(SHEET)])) {
      expect(result).toHaveProperty('pdf')
      for (const name of profiles()) seen.add(name)
    }
    expect(seen.size).toBe(1)
    expect(profiles()).toEqual([])
    if (process.platform === 'linux') await until(() => browsers().length === 0, 'the browser to end')
  })

  it('leave nothing behind when the caller stops early', async () => {
    for await (const result of printPdf([job(SHEET), job(SHEET)])) {
      expect(result).toHaveProperty('pdf')
      break
    }
    expect(profiles()).toEqual([])
  })

  it('start no browser when there is none to print', async () => {
    expect(await print([], { browser: '/missing' })).toEqual([])
  })

  it('go on after one that takes too long', async () => {
    const slow = page('<table>' + '<tr><td><b>1</b><i>2</i></td></tr>'.repeat(60_000) + '</table>')
    const [late] = await print([job(slow)], { limit: 300 })
    expect(late).toMatchObject({ problem: { rule: 'browser-failed' } })
    expect(late && 'problem' in late && late.problem.message).toBe(
      'printing took longer than 0.3 s, which is the limit',
    )
    expect(profiles()).toEqual([])
  })

  it.runIf(process.platform === 'linux')('go on after the browser is killed', async () => {
    function* jobs() {
      yield job(SHEET)
      setTimeout(() => browsers().forEach((id) => process.kill(Number(id), 'SIGKILL')), 20)
      yield job(SHEET)
      yield job(SHEET)
    }
    const results: PdfResult[] = []
    for await (const result of printPdf(jobs())) results.push(result)
    expect(results.map((result) => 'pdf' in result)).toEqual([true, false, true])
    const killed = results[1]
    expect(killed && 'problem' in killed && killed.problem.message).toMatch(
      /^the browser ended while printing/,
    )
    expect(profiles()).toEqual([])
  })
})

describe('a browser that does not start', () => {
  function program(text: string): string {
    const path = join(temporary, 'browser')
    writeFileSync(path, text)
    chmodSync(path, 0o755)
    return path
  }

  it('is told with what it says, and nothing is left behind', async () => {
    const path = program('#!/bin/sh\necho "this needs another package" >&2\nexit 3\n')
    const problem = await problemOf(print([job(SHEET)], { browser: path }))
    expect(problem.rule).toBe('browser-failed')
    expect(problem.message).toBe(
      `the browser \`${path}\` does not start: it ended with status 3, saying \`this needs another package\``,
    )
    expect(problem.hint).toContain('STANCHION_BROWSER')
    expect(profiles()).toEqual([])
  })

  it('is not waited for longer than is allowed', async () => {
    const path = program('#!/bin/sh\nexec sleep 60\n')
    const problem = await problemOf(print([job(SHEET)], { browser: path, startLimit: 500 }))
    expect(problem.message).toBe(`the browser \`${path}\` does not start: it did not answer in 0.5 s`)
    expect(profiles()).toEqual([])
  })

  it('is told when it is not a program at all', async () => {
    const problem = await problemOf(print([job(SHEET)], { browser: temporary }))
    expect(problem.rule).toBe('browser-missing')
  })
})

describe.runIf(process.platform === 'linux')('an interrupted print', () => {
  let script: string
  beforeAll(async () => {
    const source = new URL('../../src/publish/print-pdf.ts', import.meta.url).pathname
    const bundle = await rolldown({ input: source, platform: 'node', logLevel: 'silent' })
    await bundle.write({ dir: join(temporary, 'bundle'), format: 'esm' })
    script = join(temporary, 'bundle', 'run.mjs')
    writeFileSync(
      script,
      `import { printPdf } from './print-pdf.js'
       const job = ${JSON.stringify(job(SHEET))}
       function* jobs() { for (;;) yield job }
       for await (const result of printPdf(jobs())) console.log('pdf' in result)`,
    )
  })

  it.each(['SIGINT', 'SIGTERM', 'SIGKILL'] as const)('by %s leaves no browser running', async (signal) => {
    const child = spawn(process.execPath, [script], { stdio: ['ignore', 'pipe', 'inherit'] })
    const ended = new Promise((resolve) => child.once('exit', (_, by) => resolve(by)))
    await new Promise((resolve) => child.stdout.once('data', resolve))
    expect(browsers().length).toBeGreaterThan(0)
    child.kill(signal)
    expect(await ended).toBe(signal)
    await until(() => browsers().length === 0, 'the browser to end')
    // A process that is killed outright cannot tidy up; every other end removes the profile too.
    if (signal !== 'SIGKILL') expect(profiles()).toEqual([])
  })

  it('while the browser starts leaves nothing either', async () => {
    for (const name of profiles()) rmSync(join(temporary, name), { recursive: true })
    const child = spawn(process.execPath, [script], { stdio: ['ignore', 'pipe', 'inherit'] })
    const ended = new Promise((resolve) => child.once('exit', (_, by) => resolve(by)))
    await until(() => browsers().length > 0, 'the browser to start')
    child.kill('SIGTERM')
    expect(await ended).toBe('SIGTERM')
    await until(() => browsers().length === 0, 'the browser to end')
    expect(profiles()).toEqual([])
  })
})
