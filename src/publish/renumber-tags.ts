import type { PDFDocument } from '@cantoo/pdf-lib'
import { PDFArray, PDFDict, PDFName, PDFString, type PDFObject } from '@cantoo/pdf-lib'

const name = (text: string) => PDFName.of(text)
const [A, HEADERS, ID, ID_TREE, KIDS, LIMITS, NAMES, TREE, TYPE] = [
  ...['A', 'Headers', 'ID', 'IDTree', 'Kids', 'Limits', 'Names', 'StructTreeRoot', 'Type'].map(name),
] as [PDFName, PDFName, PDFName, PDFName, PDFName, PDFName, PDFName, PDFName, PDFName]
const ELEMENT = name('StructElem')

/**
 * Numbers the identifiers of tags anew, from 1 in their own order. The browser takes them from a count that it goes on
 * with from page to page (`node00000015`), so that the same page would not always give the same bytes. They stand at the
 * elements, in the table that finds elements by them, and where a table cell names its headers
 * (ISO 32000-1, 14.7.2 and 14.8.5.7).
 */
export function renumberTags(document: PDFDocument): void {
  const strings = [...places(document)]
  const old = [...new Set(strings.map(({ text }) => text))].sort()
  const renumbered = new Map(
    old.map((text, i) => [text, PDFString.of(`node${String(i + 1).padStart(8, '0')}`)]),
  )
  for (const { text, put } of strings) put(renumbered.get(text) as PDFString)
}

/** A place where an identifier stands, and the way to put another there. */
interface Place {
  readonly text: string
  readonly put: (value: PDFString) => void
}

function* places(document: PDFDocument): Generator<Place> {
  for (const [, object] of document.context.enumerateIndirectObjects()) {
    if (!(object instanceof PDFDict) || object.get(TYPE) !== ELEMENT) continue
    const id = object.get(ID)
    if (id instanceof PDFString) yield { text: id.asString(), put: (value) => object.set(ID, value) }
    yield* headers(object.lookup(A))
  }
  const tree = document.catalog.lookupMaybe(TREE, PDFDict)
  yield* table(tree?.lookupMaybe(ID_TREE, PDFDict))
}

function* headers(attributes: PDFObject | undefined): Generator<Place> {
  if (attributes instanceof PDFArray) {
    for (let i = 0; i < attributes.size(); i++) yield* headers(attributes.lookup(i))
  } else if (attributes instanceof PDFDict) {
    yield* inArray(attributes.lookupMaybe(HEADERS, PDFArray))
  }
}

function* table(node: PDFDict | undefined): Generator<Place> {
  yield* inArray(node?.lookupMaybe(LIMITS, PDFArray))
  yield* inArray(node?.lookupMaybe(NAMES, PDFArray))
  const kids = node?.lookupMaybe(KIDS, PDFArray)
  for (let i = 0; kids && i < kids.size(); i++) yield* table(kids.lookup(i, PDFDict))
}

/** The strings of an array; what else is in it, such as a reference to the element, stays. */
function* inArray(array: PDFArray | undefined): Generator<Place> {
  for (let i = 0; array && i < array.size(); i++) {
    const item = array.get(i)
    if (item instanceof PDFString) yield { text: item.asString(), put: (value) => array.set(i, value) }
  }
}
