import { existsSync, readFileSync } from 'node:fs'
import { dirname, join } from 'node:path'
import { fileURLToPath } from 'node:url'

let found: string | undefined

/**
 * The folder of this package, where `templates/`, `src/methods/` and `src/data/` are: the checkout, or where the packed
 * package was installed. Works from the sources and from the bundle in `dist/`.
 *
 * @throws {Error} when the program has been moved out of its package
 */
export function packageRoot(): string {
  found ??= search(dirname(fileURLToPath(import.meta.url)))
  return found
}

function search(start: string): string {
  for (let folder = start; ; folder = dirname(folder)) {
    if (isOurs(join(folder, 'package.json'))) return folder
    if (folder === dirname(folder)) {
      throw new Error(
        `the package folder of stanchion was not found above \`${start}\`; install the package anew`,
      )
    }
  }
}

function isOurs(file: string): boolean {
  if (!existsSync(file)) return false
  return (JSON.parse(readFileSync(file, 'utf8')) as { name?: unknown }).name === 'stanchion'
}
