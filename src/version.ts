import { readFileSync } from 'node:fs'
import { join } from 'node:path'
import { packageRoot } from './package-root.ts'

let version: string | undefined

/** The version of this program, as its package says. */
export function programVersion(): string {
  version ??= (JSON.parse(readFileSync(join(packageRoot(), 'package.json'), 'utf8')) as { version: string })
    .version
  return version
}
