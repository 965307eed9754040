// Builds the command, finds or installs a browser, prints the samples into out/ and says where they are.
import { spawnSync } from 'node:child_process'
import { readFileSync, readdirSync } from 'node:fs'
import { join, relative } from 'node:path'
import { fileURLToPath } from 'node:url'
import { importSource } from './import-source.js'

const ROOT = fileURLToPath(new URL('..', import.meta.url))
const OUT = join(ROOT, 'out')

run(process.execPath, [join(ROOT, '.config/build.js')])
const pdf = await browserThere()
const { status, written } = print(sheetsUnder(join(ROOT, 'samples')), pdf)
tell(status, written, pdf)
// A sample whose check does not pass is a result too; only a sheet that was not calculated is a fault.
process.exitCode = status > 1 ? status : 0

/** Whether there is a browser, after installing one where that needs no one's leave. */
async function browserThere() {
  const { findBrowser } = await importSource('src/publish/find-browser.ts')
  const look = () => {
    try {
      return { found: findBrowser() }
    } catch (problem) {
      if (problem.rule !== 'browser-missing') throw problem
      return { problem }
    }
  }
  let { found, problem } = look()
  const debian = /run `(apt-get install [^`]+)`/.exec(problem?.hint ?? '')?.[1]
  if (!found && debian) {
    console.log(`No browser here; installing one: ${debian}`)
    run('sh', ['-c', `apt-get update && ${debian}`])
    ;({ found, problem } = look())
  }
  if (found) console.log(`Printing with ${found}`)
  else
    console.log(
      `${problem.message}: only the HTML is written.\nFor the PDF too: ${problem.hint}; then \`npm run demo\` again.`,
    )
  return Boolean(found)
}

/** The Markdown files that are sheets: they begin with front matter that has a sheet number. */
function sheetsUnder(folder) {
  const files = readdirSync(folder, { recursive: true, encoding: 'utf8' }).filter((name) =>
    name.endsWith('.md'),
  )
  const isSheet = (file) =>
    /^---\r?\n(?:.*\r?\n)*?sheet:/.test(readFileSync(file, 'utf8').split(/\r?\n---/)[0])
  return files
    .sort()
    .map((name) => join(folder, name))
    .filter(isSheet)
}

/** Prints the sheets; the command says on standard output which files it wrote. */
function print(sheets, pdf) {
  const args = [join(ROOT, 'dist/stanchion.js'), 'print', ...sheets, '-o', OUT, ...(pdf ? ['--pdf'] : [])]
  const printed = spawnSync(process.execPath, args, {
    stdio: ['ignore', 'pipe', 'inherit'],
    encoding: 'utf8',
  })
  if (printed.error) throw printed.error
  return { status: printed.status ?? 2, written: printed.stdout.split('\n').filter(Boolean) }
}

function tell(status, written, pdf) {
  const verdict = ['every check passes', 'a check does not pass'][status] ?? 'something went wrong, see above'
  console.log(`\nThe samples are in ${OUT} (${pdf ? 'HTML and PDF' : 'HTML'}; ${verdict}):`)
  for (const file of written) console.log(`  ${relative(process.cwd(), file)}`)
}

function run(command, args) {
  const { status, error } = spawnSync(command, args, { stdio: 'inherit', cwd: ROOT })
  if (error) throw error
  if (status !== 0) process.exit(status ?? 2)
}
