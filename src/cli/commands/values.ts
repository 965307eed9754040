import { basename, isAbsolute, join, relative, resolve } from 'node:path'
import type { Prepared } from '../../pipeline.ts'
import { valuesText } from '../../record/values-text.ts'
import { SheetLibrary } from '../../sheet/library.ts'
import { readText } from '../../sheet/read-text.ts'
import { severityOf } from '../../finding.ts'
import { cleanText } from '../clean-text.ts'
import { UsageError, type ExitStatus, type Io, type Options } from '../command.ts'
import { exitStatus, prepareAll, prepareText, reportFindings, worst } from '../sheets.ts'

export async function run(args: readonly string[], options: Options, io: Io): Promise<ExitStatus> {
  const { textconv } = options
  if (typeof textconv === 'string') return convert(args, textconv, io)
  const prepared: Prepared[] = []
  for await (const sheet of prepareAll(args, io)) {
    prepared.push(sheet)
    if (args.length > 1) io.out(cleanText(`${prepared.length > 1 ? '\n' : ''}sheet ${sheet.path}\n`))
    if (sheet.calculation) io.out(cleanText(valuesText(sheet.calculation)))
  }
  reportFindings(prepared, io, options['debug'] === true)
  return worst(prepared.map(exitStatus))
}

/**
 * The lines that version control compares. It hands over the sheet itself or a copy of some revision, far from the sheets
 * that it uses, so these are then taken from `folder`; it gives up at any exit status but 0, so errors are lines like the
 * values.
 */
function convert(args: readonly string[], folder: string, io: Io): ExitStatus {
  const [path = '', ...more] = args
  if (more.length > 0 || path === '-')
    throw new UsageError('`--textconv` takes one file', 'version control calls it with one file at a time')
  const place = isInside(path, io.cwd) ? path : join(folder, basename(path))
  const read = readText(resolve(io.cwd, path))
  const { calculation, findings } = prepareText(place, read, new SheetLibrary(), io)
  if (calculation) io.out(cleanText(valuesText(calculation)))
  const errors = findings.filter((message) => severityOf(message) === 'error')
  for (const { reason, ruleId } of errors) io.out(cleanText(`error ${ruleId ?? ''}: ${reason}\n`))
  return 0
}

function isInside(path: string, folder: string): boolean {
  const way = relative(folder, resolve(folder, path))
  return !way.startsWith('..') && !isAbsolute(way)
}
