// Prints one HTML file to PDF `count` times in one browser, in a process of its own; writes the milliseconds it took,
// with loading the browser's library, starting the browser and ending it. Usage: node pdf-once.js BUNDLE HTML COUNT
import { readFileSync } from 'node:fs'
import { pathToFileURL } from 'node:url'

const [bundle, file, count] = process.argv.slice(2)
const { printPdf } = await import(pathToFileURL(bundle).href)
const html = readFileSync(file, 'utf8')
const metadata = { title: 'Bench', language: 'en-GB', date: '2026-03-02', creator: 'Stanchion' }
const start = performance.now()
let pages = 0
for await (const result of printPdf(Array.from({ length: Number(count) }, () => ({ html, metadata })))) {
  if ('problem' in result) throw result.problem
  pages += result.pdf.length > 0 ? 1 : 0
}
if (pages !== Number(count)) throw new Error(`${pages} of ${count} were printed`)
process.stdout.write(String(performance.now() - start))
