import { PDFArray, PDFDict, PDFDocument, PDFName, PDFString } from '@cantoo/pdf-lib'
import { beforeAll, describe, expect, it } from 'vitest'
import { openBrowser } from '../../src/publish/browser-session.ts'
import { findBrowser } from '../../src/publish/find-browser.ts'
import { finishPdf } from '../../src/publish/finish-pdf.ts'
import { printPage } from '../../src/publish/print-page.ts'
import { readPdf } from './read-pdf.ts'

const METADATA = { title: 'A', language: 'en', creator: 'Stanchion 0.1.0' }

describe('the identifiers of tags', () => {
  let printed: Buffer
  beforeAll(async () => {
    const session = await openBrowser(findBrowser(), 30_000)
    const rows = '<tr><th>demand</th><th>capacity</th></tr><tr><td>285</td><td>301</td></tr>'
    const html = `<title>t</title><h1 id="node00000099">node00000099</h1><table>${rows}</table>`
    printed = Buffer.from((await printPage(session.browser, html)).pdf)
    await session.close()
  })

  /** The same file as from a browser that has counted further. */
  function countedFurther(): Buffer {
    const text = printed.toString('latin1')
    const ids = [...new Set(text.match(/node\d{8}/g))].filter((id) => id !== 'node00000099')
    expect(ids.length).toBeGreaterThanOrEqual(2)
    const further = (id: string) => `node${String(Number(id.slice(4)) + 7000).padStart(8, '0')}`
    const moved = text.replace(/node\d{8}/g, (id) => (ids.includes(id) ? further(id) : id))
    return Buffer.from(moved, 'latin1')
  }

  it('do not depend on how far the browser has counted', async () => {
    const [once, again] = [await finishPdf(printed, METADATA), await finishPdf(countedFurther(), METADATA)]
    expect(Buffer.from(once).equals(again)).toBe(true)
  })

  it('still lead from each cell to its header, and from the table of identifiers to the element', async () => {
    const document = await PDFDocument.load(await finishPdf(printed, METADATA))
    const elements = document.context.enumerateIndirectObjects().flatMap(([, object]) => {
      return object instanceof PDFDict && object.get(PDFName.of('S')) ? [object] : []
    })
    const role = (element: PDFDict) => element.lookup(PDFName.of('S'), PDFName).decodeText()
    const idOf = (element: PDFDict) => element.lookup(PDFName.of('ID'), PDFString).asString()
    const headings = elements.filter((element) => role(element) === 'TH').map(idOf)
    const cells = elements.filter((element) => role(element) === 'TD')
    expect(headings).toEqual(['node00000001', 'node00000002'])
    expect(cells.flatMap((cell) => headersOf(cell)).sort()).toEqual(headings)
    const tree = document.catalog
      .lookup(PDFName.of('StructTreeRoot'), PDFDict)
      .lookup(PDFName.of('IDTree'), PDFDict)
    const found = namesOf(tree).map(([id, element]) => [id, idOf(element)])
    expect(found).toEqual(headings.map((id) => [id, id]))
  })

  it('are not confused with what the sheet says', async () => {
    const { pages, outline } = await readPdf(await finishPdf(printed, METADATA))
    expect(outline).toEqual(['node00000099'])
    expect(pages[0]).toContain('node00000099')
  })
})

function headersOf(cell: PDFDict): string[] {
  const attributes = cell.lookup(PDFName.of('A'))
  const list = attributes instanceof PDFArray ? attributes.asArray() : [attributes]
  return list.flatMap((item) => {
    const headers = item instanceof PDFDict ? item.lookupMaybe(PDFName.of('Headers'), PDFArray) : undefined
    return (headers?.asArray() ?? []).map((id) => (id as PDFString).asString())
  })
}

function namesOf(node: PDFDict): [string, PDFDict][] {
  const kids = node.lookupMaybe(PDFName.of('Kids'), PDFArray)
  const below = Array.from({ length: kids?.size() ?? 0 }, (_, i) =>
    namesOf((kids as PDFArray).lookup(i, PDFDict)),
  )
  const names = node.lookupMaybe(PDFName.of('Names'), PDFArray)
  const here = Array.from({ length: (names?.size() ?? 0) / 2 }, (_, i): [string, PDFDict] => [
    (names as PDFArray).lookup(2 * i, PDFString).asString(),
    (names as PDFArray).lookup(2 * i + 1, PDFDict),
  ])
  return [...here, ...below.flat()]
}
