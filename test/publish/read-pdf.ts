import { getDocument, type PDFDocumentProxy, type PDFPageProxy } from 'pdfjs-dist/legacy/build/pdf.mjs'

/** What a PDF reader finds in a file: read with pdf.js, which shares no code with what wrote it. */
export interface ReadPdf {
  /** The text of each page, pieces joined by a space, in reading order. */
  readonly pages: readonly string[]
  readonly size: { readonly width: number; readonly height: number }
  /** Bookmarks, indented by two spaces a level. */
  readonly outline: readonly string[]
  readonly info: Readonly<Record<string, unknown>>
  readonly tagged: boolean
  readonly language: string | undefined
  readonly showsTitle: boolean
  /** The roles of the structure tree over all pages, each once. */
  readonly roles: readonly string[]
  /** The alternative texts in the structure tree. */
  readonly alternatives: readonly string[]
  readonly fonts: readonly { readonly name: string; readonly embedded: boolean }[]
}

export async function readPdf(bytes: Uint8Array): Promise<ReadPdf> {
  const task = getDocument({ data: Uint8Array.from(bytes), useSystemFonts: false, verbosity: 0 })
  const document = await task.promise
  try {
    return await readDocument(document)
  } finally {
    await task.destroy()
  }
}

async function readDocument(document: PDFDocumentProxy): Promise<ReadPdf> {
  const { info } = await document.getMetadata()
  const preferences: { DisplayDocTitle?: boolean } | null = await document.getViewerPreferences()
  const marks = (await document.getMarkInfo()) as { Marked?: boolean } | null
  const facts = { pages: [] as string[], roles: new Set<string>(), alternatives: [] as string[] }
  const fonts = new Map<string, boolean>()
  for (let n = 1; n <= document.numPages; n++) {
    const page = await document.getPage(n)
    facts.pages.push(await textOf(page))
    walk((await page.getStructTree()) as Tag | null, facts)
    await fontsOf(page, fonts)
  }
  const [, , width = 0, height = 0] = (await document.getPage(1)).view
  const entries = info as Record<string, unknown>
  return {
    pages: facts.pages,
    size: { width, height },
    outline: bookmarks(await document.getOutline()),
    info: entries,
    tagged: marks?.Marked === true,
    language: entries['Language'] as string | undefined,
    showsTitle: preferences?.DisplayDocTitle === true,
    roles: [...facts.roles].sort(),
    alternatives: facts.alternatives,
    fonts: [...fonts].map(([name, embedded]) => ({ name, embedded })),
  }
}

async function textOf(page: PDFPageProxy): Promise<string> {
  const { items } = await page.getTextContent()
  return items.map((item) => ('str' in item ? item.str + (item.hasEOL ? '\n' : '') : '')).join('')
}

interface Tag {
  readonly role?: string
  readonly alt?: string
  readonly children?: readonly Tag[]
}

function walk(tag: Tag | null, facts: { roles: Set<string>; alternatives: string[] }): void {
  if (!tag) return
  if (tag.role) facts.roles.add(tag.role)
  if (tag.alt) facts.alternatives.push(tag.alt)
  for (const child of tag.children ?? []) walk(child, facts)
}

interface Bookmark {
  readonly title: string
  readonly items: readonly Bookmark[]
}

function bookmarks(items: readonly Bookmark[] | null, indent = ''): string[] {
  return (items ?? []).flatMap(({ title, items }) => [indent + title, ...bookmarks(items, `${indent}  `)])
}

async function fontsOf(page: PDFPageProxy, fonts: Map<string, boolean>): Promise<void> {
  // The fonts of a page are known once its drawing operations have been read.
  const operations = await page.getOperatorList()
  for (const args of operations.argsArray as unknown[]) {
    const id = Array.isArray(args) ? (args as unknown[])[0] : undefined
    if (typeof id !== 'string' || !/^g_d\d+_f\d+$/.test(id)) continue
    const font = page.commonObjs.get(id) as { name: string; missingFile?: boolean }
    fonts.set(font.name, font.missingFile !== true)
  }
}
