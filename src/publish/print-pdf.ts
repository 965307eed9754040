import { openBrowser, type BrowserSession } from './browser-session.ts'
import { findBrowser } from './find-browser.ts'
import type { PdfMetadata } from './finish-pdf.ts'
import { printPage } from './print-page.ts'
import { PublishProblem } from './publish-problem.ts'

/** One sheet to print: a self-contained page, and what its PDF says of itself. */
export interface PdfJob {
  readonly html: string
  readonly metadata: PdfMetadata
}

/** A printed sheet with what its reader should know of the printing, or why it could not be printed. */
export type PdfResult<Job extends PdfJob = PdfJob> =
  | { readonly job: Job; readonly pdf: Uint8Array; readonly notes: readonly string[] }
  | { readonly job: Job; readonly problem: PublishProblem }

export interface PrintOptions {
  /** The browser's program; looked for when left out. */
  readonly browser?: string | undefined
  /** Milliseconds one sheet may take; 5 minutes when left out. */
  readonly limit?: number
  /** Milliseconds the browser may take to start; 30 s when left out. */
  readonly startLimit?: number
}

/**
 * Prints sheets to PDF, in order, in one browser with a new tab for each. The browser is started with the first sheet,
 * and again if it ends before the last; it is closed when the last is done or the caller stops asking.
 *
 * @returns one result a sheet: a sheet that cannot be printed does not stop the rest
 * @throws {PublishProblem} when there is no browser, or it does not start
 */
export async function* printPdf<Job extends PdfJob>(
  jobs: Iterable<Job> | AsyncIterable<Job>,
  options: PrintOptions = {},
): AsyncGenerator<PdfResult<Job>, void, void> {
  let session: BrowserSession | undefined
  let path: string | undefined
  try {
    for await (const job of jobs) {
      path ??= findBrowser(options.browser)
      session ??= await openBrowser(path, options.startLimit ?? 30_000)
      const result = await printJob(session, job, options.limit ?? 300_000)
      if ('problem' in result) {
        await session.close()
        session = undefined
      }
      yield result
    }
  } finally {
    await session?.close()
  }
}

async function printJob<Job extends PdfJob>(
  session: BrowserSession,
  job: Job,
  limit: number,
): Promise<PdfResult<Job>> {
  try {
    // The PDF library is read while the browser works.
    const [{ pdf, refused }, { finishPdf }] = await within(
      limit,
      Promise.all([printPage(session.browser, job.html), import('./finish-pdf.ts')]),
    )
    return { job, pdf: await finishPdf(pdf, job.metadata), notes: notes(session, refused) }
  } catch (error) {
    return { job, problem: failed(error) }
  }
}

class Late extends Error {}

async function within<T>(limit: number, work: Promise<T>): Promise<T> {
  let timer: NodeJS.Timeout | undefined
  const late = new Promise<never>((_, reject) => {
    timer = setTimeout(() => reject(new Late(`longer than ${limit / 1000} s`)), limit)
  })
  try {
    return await Promise.race([work, late])
  } finally {
    clearTimeout(timer)
  }
}

function failed(error: unknown): PublishProblem {
  if (error instanceof PublishProblem) return error
  const text = error instanceof Error ? (error.message.split('\n')[0] ?? '') : String(error)
  const [message, hint] =
    error instanceof Late
      ? [`printing took ${text}, which is the limit`, 'split the sheet, or allow more time']
      : [
          `the browser ended while printing: ${text}`,
          'print once more; if it ends again, print fewer sheets at once',
        ]
  return new PublishProblem('browser-failed', message, hint, error)
}

function notes(session: BrowserSession, refused: readonly string[]): string[] {
  const sandbox =
    "the browser's sandbox is off because it runs as root; print as an ordinary user to have it on"
  const loads = refused.map(
    (url) => `the page asked for \`${url.slice(0, 200)}\`; nothing is loaded from outside`,
  )
  return session.sandboxed ? loads : [sandbox, ...loads]
}
