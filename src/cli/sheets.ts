import { prepareSheet, type Prepared } from '../pipeline.ts'
import { SheetLibrary } from '../sheet/library.ts'
import { finding } from '../finding.ts'
import { formatFinding, summaryLine } from './format-finding.ts'
import { UsageError, type ExitStatus, type Io } from './command.ts'

export const STDIN = '<standard input>'

const START = { start: { line: 1, column: 1, offset: 0 }, end: { line: 1, column: 1, offset: 0 } }

/** Prepares each sheet in turn (`-` is standard input), so that one bad sheet never stops the rest. */
export async function* prepareAll(paths: readonly string[], io: Io): AsyncGenerator<Prepared> {
  if (paths.filter((path) => path === '-').length > 1)
    throw new UsageError('`-` is given twice', 'standard input can be read once')
  const library = new SheetLibrary()
  for (const path of paths) {
    if (path !== '-') yield guarded(path, () => prepareSheet({ path }, { cwd: io.cwd, library }))
    else {
      const text = await io.readStdin()
      yield guarded(STDIN, () => prepareSheet({ path: STDIN, text }, { cwd: io.cwd, library }))
    }
  }
}

/** A failure of the program itself becomes a finding too; `--debug` shows where it happened. */
function guarded(path: string, prepare: () => Prepared): Prepared {
  try {
    return prepare()
  } catch (cause) {
    const message = cause instanceof Error ? cause.message : String(cause)
    const unforeseen = finding({
      rule: 'internal-error',
      message: `the program failed: ${message}`,
      hint: 'run again with `--debug`, and report what it prints',
      file: path,
      span: START,
      cause,
    })
    return { path, findings: [unforeseen], verdict: 'error', texts: new Map() }
  }
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
