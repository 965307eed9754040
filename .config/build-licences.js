import { readFileSync, readdirSync } from 'node:fs'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'

const ROOT = fileURLToPath(new URL('..', import.meta.url))

/** Licences that allow what a bundle does: copying, on condition of keeping the notice. */
const PERMISSIVE = [
  '0BSD',
  'Apache-2.0',
  'BSD-2-Clause',
  'BSD-3-Clause',
  'ISC',
  'MIT',
  'OFL-1.1',
  'Unlicense',
]

/** Packages whose manifest has no licence, with the file that states it. */
const STATED_ELSEWHERE = { format: { licence: 'MIT', file: 'Readme.md' } }

/**
 * The licence notices of all packages that files come from.
 * @param {readonly string[]} files paths of bundled modules and copied assets
 * @throws when a package has no licence text or one that is not on the list
 */
export function licenceNotices(files) {
  const folders = new Set(files.flatMap((file) => packageFolder(file) ?? []))
  const notices = [...folders].map(notice)
  const byName = (a, b) => (a.name < b.name ? -1 : a.name > b.name ? 1 : 0)
  const text = notices.sort(byName).map(({ name, version, licence, text }) => {
    return `${'='.repeat(80)}\n${name} ${version} (${licence})\n${'='.repeat(80)}\n\n${text.trim()}\n`
  })
  return `This package contains parts of the packages below, under these licences.\n\n${text.join('\n')}`
}

/** `…/node_modules/@scope/name` of a file in it; undefined for our own files. */
function packageFolder(file) {
  return /^.*[\\/]node_modules[\\/](?:@[^\\/]+[\\/])?[^\\/]+/.exec(file.replace(/^\0/, ''))?.[0]
}

function notice(folder) {
  const { name, version, license, author } = JSON.parse(readFileSync(join(folder, 'package.json'), 'utf8'))
  const stated = STATED_ELSEWHERE[name]
  const licence = stated?.licence ?? String(typeof license === 'string' ? license : license?.type)
  const chosen = licence
    .replace(/[()]/g, '')
    .split(' OR ')
    .find((choice) => PERMISSIVE.includes(choice))
  if (!chosen) {
    const wanted = PERMISSIVE.join(', ')
    throw new Error(`${name} ${version} has the licence ${licence}; a bundled package needs one of ${wanted}`)
  }
  const texts = stated ? [readFileSync(join(folder, stated.file), 'utf8')] : licenceFiles(folder)
  const holder = (typeof author === 'string' ? author : author?.name) ?? `the authors of ${name}`
  return {
    name,
    version,
    licence,
    text: texts.length > 0 ? texts.join('\n\n') : standardText(chosen, holder),
  }
}

function licenceFiles(folder) {
  const names = readdirSync(folder).filter((name) => /^(licen[cs]e|notice|copying)([.-].*)?$/i.test(name))
  return names.sort().map((name) => readFileSync(join(folder, name), 'utf8'))
}

/** The text of a licence for a package that names it but does not carry it. */
function standardText(licence, holder) {
  const copyright = `Copyright (c) ${holder}`
  if (licence === 'MIT')
    return readFileSync(join(ROOT, 'LICENSE'), 'utf8').replace(/^Copyright.*$/m, copyright)
  // TypeScript, which builds this package, carries the Apache licence in full.
  const apache = join(ROOT, 'node_modules/typescript/LICENSE.txt')
  if (licence === 'Apache-2.0') return `${copyright}\n\n${readFileSync(apache, 'utf8')}`
  throw new Error(`a bundled package of ${holder} carries no text of its licence ${licence}`)
}
