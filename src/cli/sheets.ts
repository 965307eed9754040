import { prepareSheet, type Prepared } from '../pipeline.ts'
import { SheetLibrary } from '../sheet/library.ts'
import { decodeText, unreadable, type ReadText } from '../sheet/read-text.ts'
import { UsageError, type ExitStatus, type Io } from './command.ts'
import { formatFinding, summaryLine } from './format-finding.ts'
import { aboutFile, failedAt } from './internal-error.ts'

export const STDIN = '<standard input>'

/** Prepares each sheet in turn (`-` is standard input), so that one bad sheet never stops the rest. */
export async function* prepareAll(paths: readonly string[], io: Io): AsyncGenerator<Prepared> {
  if (paths.filter((path) => path === '-').length > 1)
    throw new UsageError('`-` is given twice', 'standard input can be read once')
  const library = new SheetLibrary()
  for (const path of paths) {
    if (path === '-') yield prepareText(STDIN, await readStdin(io), library, io)
    else yield guarded(path, () => prepareSheet({ path }, { cwd: io.cwd, library }))
  }
}

/** Prepares a sheet whose text came another way than from the file `path`. */
export function prepareText(path: string, read: ReadText, library: SheetLibrary, io: Io): Prepared {
  if ('problem' in read) {
    const { problem: message, hint } = read
    return unknown(path, [aboutFile({ rule: 'file-unreadable', message, hint, file: path })])
  }
  return guarded(path, () => prepareSheet({ path, text: read.text }, { cwd: io.cwd, library }))
}

async function readStdin(io: Io): Promise<ReadText> {
  try {
    return decodeText(await io.readStdin())
  } catch (error) {
    return unreadable(error)
  }
}

/** A failure of the program itself is a finding of the sheet it was at. */
function guarded(path: string, prepare: () => Prepared): Prepared {
  try {
    return prepare()
  } catch (cause) {
    return failedAt(unknown(path), cause)
  }
}

function unknown(path: string, findings: Prepared['findings'] = []): Prepared {
  return { path, findings, verdict: 'error', texts: new Map() }
}

/** Prints all findings of the sheets with their excerpts, and the summary, as messages. */
export function reportFindings(prepared: readonly Prepared[], io: Io, debug: boolean): void {
  const all = prepared.flatMap(({ findings, texts }) =>
    findings.map((message) => ({ message, text: texts.get(message.file ?? '') })),
  )
  for (const { message, text } of all) {
    io.err(`${formatFinding(message, text)}\n`)
    if (debug && message.cause instanceof Error && message.cause.stack) io.err(`${message.cause.stack}\n`)
    io.err('\n')
  }
  const summary = summaryLine(
    all.map(({ message }) => message),
    prepared.length,
  )
  if (summary) io.err(`${summary}\n`)
}

export function exitStatus({ verdict }: Pick<Prepared, 'verdict'>): ExitStatus {
  return verdict === 'pass' ? 0 : verdict === 'fail' ? 1 : 2
}

export function worst(statuses: readonly ExitStatus[]): ExitStatus {
  return statuses.reduce<ExitStatus>((a, b) => (b > a ? b : a), 0)
}
