import { existsSync } from 'node:fs'
import { basename, dirname, join, resolve } from 'node:path'
import { PublishProblem } from '../publish/publish-problem.ts'
import { writeAtomic } from '../publish/write-atomic.ts'
import { UsageError, type Io, type Options } from './command.ts'
import { STDIN } from './sheets.ts'

type Extension = 'html' | 'pdf'

/** Where a sheet's document goes: beside the sheet, or in the folder that `-o` names. */
function outputPath(path: string, extension: Extension, { output }: Options, io: Io): string {
  const isStdin = path === '-' || path === STDIN
  const name = isStdin ? 'sheet' : basename(path).replace(/\.(md|markdown)$/i, '')
  const folder = typeof output === 'string' ? resolve(io.cwd, output) : dirname(resolve(io.cwd, path))
  return join(folder, `${name}.${extension}`)
}

/**
 * Refuses before anything is calculated: two sheets that would be written to one file, and a sheet that would be written
 * over.
 *
 * @throws {UsageError}
 */
export function claimOutputs(paths: readonly string[], options: Options, io: Io): void {
  if (paths.includes('-') && options['output'] === undefined)
    throw new UsageError('`-` needs a folder to write to', 'add `-o DIR`')
  const sheets = new Map(paths.filter((path) => path !== '-').map((path) => [resolve(io.cwd, path), path]))
  const claimed = new Map<string, string>()
  for (const path of paths) {
    for (const extension of ['html', 'pdf'] as const) {
      const target = outputPath(path, extension, options, io)
      const other = claimed.get(target)
      if (other === path) throw new UsageError(`\`${path}\` is given twice`, 'name each sheet once')
      if (other !== undefined)
        throw new UsageError(
          `\`${other}\` and \`${path}\` would both be written to \`${target}\``,
          'print them in two runs, with two folders',
        )
      const over = sheets.get(target)
      if (over !== undefined)
        throw new UsageError(
          `\`${path}\` would be written over \`${over}\``,
          'give the sheet a name that ends in `.md`, or another folder with `-o DIR`',
        )
      claimed.set(target, path)
    }
  }
}

export interface Outputs {
  /** Writes a document and names it; tells why when it cannot, and then gives false. */
  write(path: string, extension: Extension, content: string | Uint8Array): boolean
  /** The documents of a sheet that are there, but not from this run. */
  notWrittenNow(path: string): string[]
}

export function outputsOf(options: Options, io: Io): Outputs {
  const written = new Set<string>()
  return {
    write(path, extension, content) {
      const target = outputPath(path, extension, options, io)
      try {
        writeAtomic(target, content, { createFolder: options['output'] !== undefined })
      } catch (error) {
        if (!(error instanceof PublishProblem)) throw error
        sayProblem(error, path, io)
        return false
      }
      written.add(target)
      io.out(`${target}\n`)
      return true
    },
    notWrittenNow: (path) =>
      (['html', 'pdf'] as const)
        .map((extension) => outputPath(path, extension, options, io))
        .filter((target) => existsSync(target) && !written.has(target)),
  }
}

export function sayProblem({ message, rule, hint }: PublishProblem, path: string, io: Io): void {
  io.err(`${path}: error: ${message}  ${rule}\nhint: ${hint}\n`)
}
