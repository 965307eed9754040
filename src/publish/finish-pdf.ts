import { PDFDict, PDFDocument, PDFHeader, PDFName } from '@cantoo/pdf-lib'
import { renumberTags } from './renumber-tags.ts'

/** What a PDF says of itself. */
export interface PdfMetadata {
  readonly title: string
  /** BCP 47, as `en-GB`. */
  readonly language: string
  readonly subject?: string | undefined
  readonly keywords?: readonly string[] | undefined
  readonly author?: string | undefined
  /** The record's date, `2026-03-02`; without one the PDF carries no date, since the clock's would change its bytes. */
  readonly date?: string | undefined
  /** Program and version, `Stanchion 0.1.0`. */
  readonly creator: string
}

/**
 * Gives a PDF from the browser its title, language and the other entries of its information dictionary, and takes out
 * what would differ between two prints of the same page. Tags, bookmarks and pages stay as they are.
 */
export async function finishPdf(pdf: Uint8Array, metadata: PdfMetadata): Promise<Uint8Array> {
  const document = await PDFDocument.load(pdf, { updateMetadata: false })
  describe(document, metadata)
  date(document, metadata.date)
  renumberTags(document)
  // Object streams came with PDF 1.5; the browser writes 1.4.
  document.context.header = PDFHeader.forVersion(1, 7)
  return document.save({ useObjectStreams: true, updateFieldAppearances: false })
}

function describe(document: PDFDocument, metadata: PdfMetadata): void {
  const printer = document.getProducer()
  document.setTitle(metadata.title, { showInWindowTitleBar: true })
  document.setLanguage(metadata.language)
  document.setCreator(metadata.creator)
  document.setProducer(printer ? `${metadata.creator} with ${printer}` : metadata.creator)
  if (metadata.subject) document.setSubject(metadata.subject)
  if (metadata.keywords?.length) document.setKeywords([metadata.keywords.join(', ')])
  if (metadata.author) document.setAuthor(metadata.author)
}

/** Puts the record's date in place of the clock's. */
function date(document: PDFDocument, day: string | undefined): void {
  const information = document.context.lookupMaybe(document.context.trailerInfo.Info, PDFDict)
  for (const key of ['CreationDate', 'ModDate']) information?.delete(PDFName.of(key))
  const time = new Date(`${day?.slice(0, 10)}T00:00:00Z`)
  if (Number.isNaN(time.getTime())) return
  document.setCreationDate(time)
  document.setModificationDate(time)
}
