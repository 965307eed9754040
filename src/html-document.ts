import type { VFileMessage } from 'vfile-message'
import type { Prepared } from './pipeline.ts'
import { htmlText } from './publish/html-text.ts'
import type { PdfJob } from './publish/print-pdf.ts'
import { digestOf } from './record/digest.ts'
import { typeset } from './typeset/typeset.ts'
import { programVersion } from './version.ts'

/** A sheet that has been calculated, and may be printed. */
export type Calculated = Prepared & Required<Pick<Prepared, 'calculation'>>

export interface DocumentOptions {
  /** In place of what the sheet says. */
  readonly paper?: 'A4' | 'Letter' | undefined
}

export interface HtmlDocument {
  /** The self-contained page. The same sheet gives the same bytes. */
  readonly html: string
  /** What could not be set as its author meant it; the page says so too. */
  readonly findings: readonly VFileMessage[]
}

/**
 * The printed calculation as one self-contained HTML page.
 *
 * @throws {Error} for a sheet that could not be calculated: it has no document
 */
export function htmlDocument(prepared: Prepared, options: DocumentOptions = {}): HtmlDocument {
  return documentOf(calculated(prepared), options, false)
}

/**
 * What `printPdf` needs to print the same calculation: the page made for the printer, and what the PDF says of itself.
 *
 * @throws {Error} for a sheet that could not be calculated: it has no document
 */
export function pdfJob(prepared: Prepared, options: DocumentOptions = {}): PdfJob {
  const sheet = calculated(prepared)
  const { meta } = sheet.calculation.sheet
  return {
    html: documentOf(sheet, options, true).html,
    metadata: {
      title: `${meta.sheet} ${meta.title}`,
      language: meta.language ?? 'en',
      subject: meta.project,
      author: meta.originator?.name,
      date: meta.date ?? meta.originator?.date,
      keywords: [digestOf(sheet.calculation)],
      creator: `Stanchion ${programVersion()}`,
    },
  }
}

export function isCalculated(prepared: Prepared): prepared is Calculated {
  return prepared.calculation !== undefined && prepared.verdict !== 'error'
}

function calculated(prepared: Prepared): Calculated {
  if (!isCalculated(prepared))
    throw new Error(`\`${prepared.path}\` could not be calculated, and has no document; see its findings`)
  return prepared
}

function documentOf(
  { calculation, findings, verdict }: Calculated,
  { paper }: DocumentOptions,
  forPdf: boolean,
): HtmlDocument {
  const tree = typeset(calculation, {
    findings,
    verdict,
    digest: digestOf(calculation),
    programVersion: programVersion(),
    forPdf,
    ...(paper ? { paper } : {}),
  })
  return { html: htmlText(tree), findings: tree.data?.findings ?? [] }
}
