import { basename, dirname, join, resolve } from 'node:path'
import type { VFileMessage } from 'vfile-message'
import type { Calculation } from '../../calculate/types.ts'
import type { Prepared } from '../../pipeline.ts'
import { PublishProblem } from '../../publish/publish-problem.ts'
import type { PdfJob } from '../../publish/print-pdf.ts'
import { writeAtomic } from '../../publish/write-atomic.ts'
import { digestOf } from '../../record/digest.ts'
import { programVersion } from '../../version.ts'
import type { Command, ExitStatus, Io, Options } from '../command.ts'
import { UsageError } from '../command.ts'
import { exitStatus, prepareAll, reportFindings, STDIN, worst } from '../sheets.ts'

export const print: Command = {
  name: 'print',
  args: '<sheet...>',
  summary: 'write each sheet as a self-contained HTML document, and as PDF',
  details:
    'The document is written beside the sheet, or under the folder that `-o` names. A sheet that cannot be calculated is not written. `-` reads a sheet from standard input and needs `-o`.',
  flags: [
    { flags: '--pdf', summary: 'write the PDF too (needs Chromium, Chrome or Edge)' },
    { flags: '-o, --output <dir>', summary: 'folder to write to; made when it does not exist' },
    { flags: '--paper <size>', summary: 'A4 or Letter, in place of what the sheet says' },
    {
      flags: '--browser <path>',
      summary: 'the browser to print with; otherwise STANCHION_BROWSER, then the usual places',
    },
  ],
  async run(args, options, io) {
    const paper = paperOf(options)
    const taken = new Map<string, string>()
    for (const path of args) claimOutput(path, options, io, taken)
    const prepared: Prepared[] = []
    const jobs: Job[] = []
    const statuses: ExitStatus[] = []
    for await (const sheet of prepareAll(args, io)) {
      prepared.push(sheet)
      statuses.push(exitStatus(sheet))
      if (!sheet.calculation || sheet.verdict === 'error') continue
      const written = await writeHtml(sheet, sheet.calculation, options, io, paper, jobs)
      statuses.push(written.status)
      // What could not be set as its author meant it is known only now.
      prepared[prepared.length - 1] = { ...sheet, findings: [...sheet.findings, ...written.met] }
    }
    if (options['pdf']) statuses.push(await writePdf(jobs, options, io))
    reportFindings(prepared, io, options['debug'] === true)
    const unwritten = prepared.filter(({ verdict }) => verdict === 'error')
    for (const { path } of unwritten) io.err(`${path}: not written, since it could not be calculated\n`)
    return worst(statuses)
  },
}

interface Job extends PdfJob {
  readonly path: string
}

function paperOf(options: Options): 'A4' | 'Letter' | undefined {
  const { paper } = options
  if (paper === undefined || paper === 'A4' || paper === 'Letter') return paper
  throw new UsageError(`\`--paper ${String(paper)}\` is not a size that is known`, 'use A4 or Letter')
}

function outputPath(path: string, extension: string, options: Options, io: Io): string {
  const { output } = options
  const name = `${path === '-' || path === STDIN ? 'sheet' : basename(path).replace(/\.(md|markdown)$/i, '')}.${extension}`
  const folder = typeof output === 'string' ? resolve(io.cwd, output) : dirname(resolve(io.cwd, path))
  return join(folder, name)
}

/** Two sheets must not write to one file, and a sheet must not be written over. */
function claimOutput(path: string, options: Options, io: Io, taken: Map<string, string>): void {
  if (path === '-' && options['output'] === undefined)
    throw new UsageError('`-` needs a folder to write to', 'add `-o DIR`')
  const target = outputPath(path, 'html', options, io)
  const other = taken.get(target)
  if (other !== undefined)
    throw new UsageError(
      `\`${other}\` and \`${path}\` would both be written to \`${target}\``,
      'print them in two runs, with two folders',
    )
  if (resolve(io.cwd, path) === target)
    throw new UsageError(`\`${path}\` would be written over`, 'name a Markdown sheet')
  taken.set(target, path)
}

async function writeHtml(
  { findings, verdict, path }: Prepared,
  calculation: Calculation,
  options: Options,
  io: Io,
  paper: 'A4' | 'Letter' | undefined,
  jobs: Job[],
): Promise<{ status: ExitStatus; met: readonly VFileMessage[] }> {
  const [{ typeset }, { htmlText }] = await Promise.all([
    import('../../typeset/typeset.ts'),
    import('../../publish/html-text.ts'),
  ])
  const digest = digestOf(calculation)
  const version = programVersion()
  const page = (forPdf: boolean) =>
    typeset(calculation, {
      findings,
      verdict,
      digest,
      programVersion: version,
      forPdf,
      ...(paper ? { paper } : {}),
    })
  const tree = page(false)
  const met = tree.data?.findings ?? []
  const target = outputPath(path, 'html', options, io)
  try {
    writeAtomic(target, htmlText(tree), { createFolder: options['output'] !== undefined })
  } catch (error) {
    return { status: problem(error, path, io), met }
  }
  io.out(`${target}\n`)
  if (options['pdf']) {
    const { meta } = calculation.sheet
    jobs.push({
      path,
      html: htmlText(page(true)),
      metadata: {
        title: `${meta.sheet} ${meta.title}`,
        language: meta.language ?? 'en',
        subject: meta.project,
        author: meta.originator?.name,
        date: meta.date ?? meta.originator?.date,
        keywords: [digest],
        creator: `Stanchion ${version}`,
      },
    })
  }
  return { status: 0, met }
}

async function writePdf(jobs: readonly Job[], options: Options, io: Io): Promise<ExitStatus> {
  if (jobs.length === 0) return 0
  const { printPdf } = await import('../../publish/print-pdf.ts')
  const statuses: ExitStatus[] = []
  const notes = new Set<string>()
  try {
    for await (const result of printPdf(jobs, { browser: options['browser'] as string | undefined })) {
      const { path } = result.job
      if ('problem' in result) {
        statuses.push(problem(result.problem, path, io))
        continue
      }
      for (const note of result.notes) notes.add(note)
      const target = outputPath(path, 'pdf', options, io)
      try {
        writeAtomic(target, result.pdf, { createFolder: options['output'] !== undefined })
        io.out(`${target}\n`)
      } catch (error) {
        statuses.push(problem(error, path, io))
      }
    }
  } catch (error) {
    statuses.push(problem(error, jobs[0]?.path ?? '', io))
  }
  for (const note of notes) io.err(`note: ${note}\n`)
  return worst(statuses)
}

function problem(error: unknown, path: string, io: Io): ExitStatus {
  if (!(error instanceof PublishProblem)) throw error
  io.err(`${path}: error: ${error.message}  ${error.rule}\nhint: ${error.hint}\n`)
  return 2
}
