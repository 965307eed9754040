import { basename } from 'node:path'
import type { HtmlDocument } from '../../html-document.ts'
import type { Prepared } from '../../pipeline.ts'
import type { PdfJob } from '../../publish/print-pdf.ts'
import { PublishProblem } from '../../publish/publish-problem.ts'
import { UsageError, type ExitStatus, type Io, type Options } from '../command.ts'
import { failedAt } from '../internal-error.ts'
import { claimOutputs, outputsOf, sayProblem, type Outputs } from '../outputs.ts'
import { exitStatus, prepareAll, reportFindings, worst } from '../sheets.ts'

interface Job extends PdfJob {
  readonly path: string
}

export async function run(args: readonly string[], options: Options, io: Io): Promise<ExitStatus> {
  const paper = paperOf(options)
  if (options['browser'] !== undefined && !options['pdf'])
    throw new UsageError('`--browser` is given, and no PDF is asked for', 'add `--pdf`')
  claimOutputs(args, options, io)
  const prepared: Prepared[] = []
  const jobs: Job[] = []
  const statuses: ExitStatus[] = []
  const outputs = outputsOf(options, io)
  for await (const sheet of prepareAll(args, io)) {
    const made = await documentOf(sheet, paper, options['pdf'] === true)
    prepared.push(made.sheet)
    statuses.push(exitStatus(made.sheet))
    if (!made.document) continue
    const isWritten = outputs.write(sheet.path, 'html', made.document.html)
    statuses.push(isWritten ? 0 : 2)
    if (isWritten && made.job) jobs.push(made.job)
  }
  if (jobs.length > 0) statuses.push(await writePdfs(jobs, options, outputs, io))
  reportFindings(prepared, io, options['debug'] === true)
  for (const sheet of prepared) sayWhatIsOld(sheet, outputs, io)
  return worst(statuses)
}

function paperOf(options: Options): 'A4' | 'Letter' | undefined {
  const { paper } = options
  if (paper === undefined || paper === 'A4' || paper === 'Letter') return paper
  throw new UsageError(`\`--paper ${String(paper)}\` is not a size that is known`, 'use A4 or Letter')
}

interface Made {
  readonly sheet: Prepared
  readonly document?: HtmlDocument
  readonly job?: Job
}

/** The sheet with its document, if it has one, and with what was met in making it. */
async function documentOf(
  sheet: Prepared,
  paper: 'A4' | 'Letter' | undefined,
  withPdf: boolean,
): Promise<Made> {
  if (!sheet.calculation || sheet.verdict === 'error') return { sheet }
  const { htmlDocument, pdfJob } = await import('../../html-document.ts')
  try {
    const document = htmlDocument(sheet, { paper })
    return {
      sheet: { ...sheet, findings: [...sheet.findings, ...document.findings] },
      document,
      ...(withPdf ? { job: { path: sheet.path, ...pdfJob(sheet, { paper }) } } : {}),
    }
  } catch (cause) {
    return { sheet: failedAt(sheet, cause) }
  }
}

async function writePdfs(
  jobs: readonly Job[],
  options: Options,
  outputs: Outputs,
  io: Io,
): Promise<ExitStatus> {
  const { printPdf } = await import('../../publish/print-pdf.ts')
  const browser = typeof options['browser'] === 'string' ? options['browser'] : undefined
  const notes = new Set<string>()
  let done = 0
  try {
    for await (const result of printPdf(jobs, { browser })) {
      const { path } = result.job
      if ('problem' in result) {
        sayProblem(result.problem, path, io)
        continue
      }
      for (const note of result.notes) notes.add(note)
      if (outputs.write(path, 'pdf', result.pdf)) done++
    }
  } catch (error) {
    if (!(error instanceof PublishProblem)) throw error
    sayProblem(error, jobs[0]?.path ?? '', io)
  }
  for (const note of notes) io.err(`note: ${note}\n`)
  return done === jobs.length ? 0 : 2
}

/** A document of an earlier state of the sheet could be taken for the present one. */
function sayWhatIsOld({ path, verdict }: Prepared, outputs: Outputs, io: Io): void {
  const old = outputs.notWrittenNow(path).map((target) => `\`${basename(target)}\``)
  const earlier = old.length === 0 ? '' : `${old.join(' and ')} there may show an earlier state of the sheet`
  if (verdict === 'error')
    io.err(`${path}: not written, since it could not be calculated${earlier && `; ${earlier}`}\n`)
  else if (earlier) io.err(`${path}: ${earlier}; \`--pdf\` writes both\n`)
}
