import { existsSync, readdirSync, readFileSync } from 'node:fs'
import { join, resolve } from 'node:path'
import { packageRoot } from '../../package-root.ts'
import { nearestName } from '../../quantity/nearest-name.ts'
import { PublishProblem } from '../../publish/publish-problem.ts'
import { writeAtomic } from '../../publish/write-atomic.ts'
import { UsageError, type Command } from '../command.ts'

export const newSheet: Command = {
  name: 'new',
  args: '[starter]',
  summary: 'start a sheet from a starter',
  details:
    'Starters: `sheet` (the default), `us-sheet`, `mechanism`, `basis`, `method`. Written to standard output, or to the file that `-o` names; an existing file is never written over.',
  flags: [{ flags: '-o, --output <file>', summary: 'file to write' }],
  run([starter = 'sheet'], options, io) {
    const folder = join(packageRoot(), 'templates', 'starters')
    const names = readdirSync(folder)
      .filter((file) => file.endsWith('.md'))
      .map((file) => file.slice(0, -'.md'.length))
      .sort()
    if (!names.includes(starter)) {
      const near = nearestName(starter, names)
      throw new UsageError(
        `there is no starter \`${starter}\``,
        near ? `did you mean \`${near}\`?` : `the starters are ${names.join(', ')}`,
      )
    }
    const text = readFileSync(join(folder, `${starter}.md`), 'utf8')
    const { output } = options
    if (typeof output !== 'string') {
      io.out(text)
      return Promise.resolve(0)
    }
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
    return Promise.resolve(0)
  },
}
