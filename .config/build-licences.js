import { existsSync, readFileSync, readdirSync } from 'node:fs'
import { join } from 'node:path'

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
  const { name, version, license, author, homepage } = JSON.parse(
    readFileSync(join(folder, 'package.json'), 'utf8'),
  )
  const licence = typeof license === 'string' ? license : license?.type
  const choices = String(licence).replace(/[()]/g, '').split(' OR ')
  if (!choices.some((choice) => PERMISSIVE.includes(choice))) {
    throw new Error(
      `${name} ${version} has the licence ${licence}; a bundled package needs one of ${PERMISSIVE.join(', ')}`,
    )
  }
  const holder = typeof author === 'string' ? author : author?.name
  const texts = licenceFiles(folder)
  const text =
    texts.length > 0 ? texts.join('\n\n') : `${licence}, by ${holder ?? 'its authors'}, ${homepage ?? ''}`
  return { name, version, licence, text }
}

function licenceFiles(folder) {
  const names = readdirSync(folder).filter((name) => /^(licen[cs]e|notice|copying)([.-].*)?$/i.test(name))
  return names
    .sort()
    .flatMap((name) => (existsSync(join(folder, name)) ? readFileSync(join(folder, name), 'utf8') : []))
}
