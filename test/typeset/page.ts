import type { Element, Nodes, Root } from 'hast'
import { fileURLToPath } from 'node:url'
import { visit } from 'unist-util-visit'
import { prepareSheet, type Prepared } from '../../src/pipeline.ts'
import { htmlText } from '../../src/publish/html-text.ts'
import { typeset, type TypesetOptions } from '../../src/typeset/typeset.ts'

export const SAMPLES = fileURLToPath(new URL('../../samples/', import.meta.url))

export interface MadePage {
  readonly tree: Root
  readonly html: string
  readonly prepared: Prepared & { readonly calculation: NonNullable<Prepared['calculation']> }
}

/** A sheet of the samples, or a text with its own front matter, as the page. */
export function pageOf(source: { path: string } | string, options: Partial<TypesetOptions> = {}): MadePage {
  const prepared =
    typeof source === 'string'
      ? prepareSheet({ path: 'sheet.md', text: source }, { cwd: SAMPLES })
      : prepareSheet(source, { cwd: SAMPLES })
  const { calculation, findings, verdict } = prepared
  if (!calculation) throw new Error(`no calculation: ${findings.map(String).join('; ')}`)
  const tree = typeset(calculation, { findings, verdict, programVersion: '1.2.3', ...options })
  return { tree, html: htmlText(tree), prepared: { ...prepared, calculation } }
}

/** A sheet's text with the least front matter. */
export const sheetText = (body: string, head = ''): string =>
  `---\nsheet: T-1\ntitle: Test\n${head}---\n\n${body}`

/** All elements for which `wanted` is true, in document order. */
export function elements(tree: Nodes, wanted: (element: Element) => boolean): Element[] {
  const found: Element[] = []
  visit(tree, 'element', (element) => void (wanted(element) && found.push(element)))
  return found
}

export const hasClass =
  (...names: string[]) =>
  ({ properties }: Element): boolean =>
    names.every((name) => classesOf(properties.className).includes(name))

const classesOf = (value: unknown): readonly unknown[] => (Array.isArray(value) ? value : [value])

export const isTag =
  (name: string) =>
  ({ tagName }: Element): boolean =>
    tagName === name

/** The words of an element, without the hidden mathematics that repeats the visible one. */
export function words(node: Nodes): string {
  if (node.type === 'text') return node.value
  if (node.type === 'element' && (node.tagName === 'math' || node.tagName === 'style')) return ''
  return 'children' in node ? node.children.map(words).join('') : ''
}

/** The style of a page, with what is encoded in it left out. */
export function styleOf(tree: Root): string {
  const [style] = only(elements(tree, isTag('style'))).children
  return style?.type === 'text' ? style.value.replaceAll(/base64,[A-Za-z0-9+/=]+/g, 'base64,') : ''
}

export function only(found: readonly Element[]): Element {
  const [first, second] = found
  if (!first || second) throw new Error(`${String(found.length)} elements were found, and one was expected`)
  return first
}
