import { existsSync, readdirSync, readFileSync } from 'node:fs'
import { join, resolve } from 'node:path'
import { packageRoot } from '../../package-root.ts'
import { PublishProblem } from '../../publish/publish-problem.ts'
import { writeAtomic } from '../../publish/write-atomic.ts'
import { nearestName } from '../../quantity/nearest-name.ts'
import { UsageError, type ExitStatus, type Io, type Options } from '../command.ts'

export function run(
  [starter = 'sheet']: readonly string[],
  { output }: Options,
  io: Io,
): Promise<ExitStatus> {
  const text = starterText(starter)
  if (typeof output === 'string') writeNew(output, text, io)
  else io.out(text)
  return Promise.resolve(0)
}

function starterText(starter: string): string {
  const folder = join(packageRoot(), 'templates', 'starters')
  const names = readdirSync(folder)
    .filter((file) => file.endsWith('.md'))
    .map((file) => file.slice(0, -'.md'.length))
    .sort()
  if (names.includes(starter)) return readFileSync(join(folder, `${starter}.md`), 'utf8')
  const near = nearestName(starter, names)
  throw new UsageError(
    `there is no starter \`${starter}\``,
    near ? `did you mean \`${near}\`?` : `the starters are ${names.join(', ')}`,
  )
}

function writeNew(output: string, text: string, io: Io): void {
  const path = resolve(io.cwd, output)
  if (existsSync(path))
    throw new UsageError(
      `\`${output}\` exists already`,
      'choose another name; an existing file is never written over',
    )
  try {
    writeAtomic(path, text)
  } catch (error) {
    if (!(error instanceof PublishProblem)) throw error
    throw new UsageError(error.message, error.hint, error)
  }
  io.out(`${path}\n`)
}
