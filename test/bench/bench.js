// Measures what a user waits for, as ratios within one run, so that they hold on a slow machine and a fast one.
// Usage: npm run bench [-- --json] [-- --rounds N]. Needs a build and, for the PDF, a browser. Ends with 1 when a limit is exceeded.
import { execFileSync } from 'node:child_process'
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { fileURLToPath, pathToFileURL } from 'node:url'
import { parseArgs } from 'node:util'
import katex from 'katex'
import { bundleSource, importSource } from '../../.config/import-source.js'
import { cpuTime, measure } from './measure.js'
import { displayEquations, plainMarkdown, sheetOf } from './sheets.js'

const ROOT = fileURLToPath(new URL('../..', import.meta.url))
const { values: options } = parseArgs({
  options: { json: { type: 'boolean', default: false }, rounds: { type: 'string', default: '7' } },
})
const rounds = Number(options.rounds)
const folder = mkdtempSync(join(tmpdir(), 'stanchion-bench-'))
process.on('exit', () => rmSync(folder, { recursive: true, force: true }))
const file = (name) => join(folder, name)
const node = (...args) => execFileSync(process.execPath, args, { cwd: folder, stdio: 'pipe' })

const entry = await bundleSource('test/bench/entry.ts')
const { prepareSheet, parseSheet, calculate, verify, typeset, htmlText, digestOf } = await import(
  pathToFileURL(entry).href
)
/** The sheets measured use no other. */
const ALONE = { loadSheet: (id) => ({ problem: { rule: 'method-unknown', message: id, hint: '' } }) }
const prepare = (text) => prepareSheet({ path: 'bench.md', text })
const page = (text, forPdf = false) => {
  const { calculation, findings, verdict } = prepare(text)
  const digest = digestOf(calculation)
  return htmlText(typeset(calculation, { findings, verdict, digest, programVersion: 'bench', forPdf }))
}

/** A line of the report: two times and their ratio against the limit that was set for it. */
const line = (name, ours, base, limit, divisor = 1) => {
  const ratio = ours.median / base.median / divisor
  return { name, ratio, limit, met: limit === undefined || ratio <= limit, ours, base }
}

const results = [await wholeProcess(), ...(await warm()), ...(await growth()), ...(await pdf())]
if (options.json)
  process.stdout.write(`${JSON.stringify({ node: process.version, rounds, results }, null, 2)}\n`)
else report(results)
process.exitCode = results.every(({ met }) => met) ? 0 : 1

/** The command from start to end against a plain script that typesets the same equations. */
async function wholeProcess() {
  writeFileSync(file('sheet.md'), sheetOf(40))
  const print = () => node(join(ROOT, 'dist/stanchion.js'), 'print', 'sheet.md', '-o', 'out')
  print()
  const equations = displayEquations(readFileSync(file('out/sheet.html'), 'utf8'))
  if (equations.length < 40) throw new Error(`the page has ${equations.length} equations, 40 were expected`)
  writeFileSync(file('plain.md'), plainMarkdown(equations.slice(0, 40)))
  const plain = () => node(join(ROOT, 'test/bench/plain.js'), file('plain.md'), file('plain.html'))
  const times = await measure(rounds, { ours: print, plain })
  return line('print 40 equations, whole process / plain script', times.ours, times.plain, 1)
}

/** What calculating and checking add to typesetting the same equations, in a warm process. */
async function warm() {
  const text = sheetOf(40)
  const equations = displayEquations(page(text))
  const settings = { displayMode: true, output: 'htmlAndMathml', throwOnError: true }
  const { sheet } = parseSheet(text, 'bench.md')
  const times = await measure(
    rounds * 3,
    {
      katex: () => equations.forEach((tex) => katex.renderToString(tex, settings)),
      check: () => verify(calculate(sheet, ALONE)),
      prepare: () => prepare(text),
      page: () => page(text),
    },
    cpuTime,
  )
  return [
    line('evaluating and checking 40 equations / typesetting them', times.check, times.katex, 0.3),
    line('reading, evaluating and checking / typesetting', times.prepare, times.katex),
    line('the whole page / typesetting its equations', times.page, times.katex),
  ]
}

/** Ten times the equations may cost ten times as much: 1 is linear and 10 quadratic; collecting more garbage costs something too. */
async function growth() {
  const [small, large] = [sheetOf(200), sheetOf(2000)]
  const [few, many] = [small, large].map((text) => parseSheet(text, 'bench.md').sheet)
  const times = await measure(
    rounds * 3,
    {
      few: () => verify(calculate(few, ALONE)),
      many: () => verify(calculate(many, ALONE)),
      small: () => parseSheet(small, 'bench.md'),
      large: () => parseSheet(large, 'bench.md'),
    },
    cpuTime,
  )
  const pages = await measure(
    Math.ceil(rounds / 2),
    { small: () => page(small), large: () => page(large) },
    cpuTime,
  )
  return [
    line('evaluating and checking 2000 equations / 200, by ten', times.many, times.few, 2, 10),
    line('reading 2000 equations / 200, by ten', times.large, times.small, undefined, 10),
    line('the whole page of 2000 equations / 200, by ten', pages.large, pages.small, 2, 10),
  ]
}

/** Printing in our process against the browser's own command on the same file; and five sheets in one browser against one. */
async function pdf() {
  const { findBrowser } = await importSource('src/publish/find-browser.ts')
  const browser = findBrowser()
  const html = file('for-pdf.html')
  writeFileSync(html, page(sheetOf(40), true))
  const sandbox = process.getuid?.() === 0 ? ['--no-sandbox'] : []
  const print = [
    `--print-to-pdf=${file('own.pdf')}`,
    '--no-pdf-header-footer',
    '--generate-pdf-document-outline',
  ]
  const inside = { one: [], five: [] }
  const ours = (name, count) => () => {
    inside[name].push(Number(node(join(ROOT, 'test/bench/pdf-once.js'), entry, html, String(count))))
  }
  const times = await measure(rounds, {
    own: () =>
      execFileSync(browser, ['--headless', ...sandbox, ...print, pathToFileURL(html).href], {
        stdio: 'ignore',
      }),
    one: ours('one', 1),
    five: ours('five', 5),
  })
  const spread = (list) => {
    const sorted = list.slice(1).sort((a, b) => a - b)
    return { min: sorted[0], median: sorted[sorted.length >> 1], max: sorted[sorted.length - 1] }
  }
  const [one, five] = [spread(inside.one), spread(inside.five)]
  return [
    line('PDF of a sheet / the browser’s own command', one, times.own, 1.15),
    line('PDF of five sheets in one browser / five times one', five, one, 1, 5),
  ]
}

function report(results) {
  const ms = ({ min, median, max }) => `${[min, median, max].map((time) => time.toFixed(1)).join(' / ')} ms`
  console.log(
    `Node ${process.version}, ${rounds} rounds; times are min / median / max, ratios are of medians\n`,
  )
  for (const { name, ratio, limit, met, ours, base } of results) {
    const allowed = limit === undefined ? '' : `, limit ${limit}: ${met ? 'met' : 'EXCEEDED'}`
    console.log(`${name}: ${ratio.toFixed(2)}${allowed}\n    ${ms(ours)}  against  ${ms(base)}`)
  }
}
