import type { Element, Nodes, Root, RootContent, Text } from 'hast'
import { fromHtml } from 'hast-util-from-html'
import { toHtml } from 'hast-util-to-html'
import rehypeSanitize from 'rehype-sanitize'
import { parseSheet } from '../../src/sheet/parse-sheet.ts'
import { proseToHast, SCHEMA } from '../../src/typeset/prose.ts'

/** An example of a Markdown specification. */
export interface Example {
  readonly number: number
  readonly section: string
  readonly markdown: string
  readonly html: string
}

/** The example as prose of a sheet, below its front matter. */
export function printed(markdown: string): string {
  const { sheet } = parseSheet(`---\nsheet: X\ntitle: X\n---\n\n${markdown}`, 'x.md')
  if (!sheet) throw new Error('the example took the front matter apart')
  return text(proseToHast(sheet.tree))
}

/** What the specification says. */
export const specified = (html: string): string => text(read(html))

/** The same without what a sheet may not hold. */
export const sanitised = (html: string): string => text(sanitise(read(html)))

/** Without the line feed at its end, into which an element that is not closed would reach. */
const read = (html: string): Root => fromHtml(html.trimEnd(), { fragment: true })

const sanitise = rehypeSanitize(SCHEMA)

/** Tags in the Markdown that may not stand on the page. */
export function foreignTags(markdown: string): string[] {
  const tags = markdown.match(/<\/?[a-zA-Z][^\s/>]*/g) ?? []
  return tags.filter((tag) => !SCHEMA.tagNames?.includes(tag.replace(/<\/?/, '').toLowerCase()))
}

const BLOCKS = new Set(
  'address blockquote br dd details div dl dt h1 h2 h3 h4 h5 h6 hr li ol p pre section table tbody td tfoot th thead tr ul'.split(
    ' ',
  ),
)

/** Classes that our Markdown adds for styling; the specifications have none but those of fenced code. */
const OURS = new Set(['contains-task-list', 'task-list-item'])

/** HTML in which white space that says nothing, the order of attributes and classes for styling cannot differ. */
function text(tree: Root): string {
  tidy(tree, false)
  return toHtml(tree)
}

function tidy(node: Root | Element, inPre: boolean): void {
  if (node.type === 'element') tidyAttributes(node)
  const isPre = inPre || (node.type === 'element' && node.tagName === 'pre')
  const { children } = node
  const edge = isBlock(node)
  children.forEach((child, i) => {
    if (child.type === 'element') tidy(child, isPre)
    if (child.type === 'text' && !isPre) trim(child, children[i - 1], children[i + 1], edge)
  })
  node.children = children.filter((child) => child.type !== 'text' || child.value !== '')
}

function trim(child: Text, before: RootContent | undefined, after: RootContent | undefined, edge: boolean) {
  if (before ? isBlock(before) : edge) child.value = child.value.trimStart()
  if (after ? isBlock(after) : edge) child.value = child.value.trimEnd()
}

function isBlock(node: Nodes): boolean {
  return node.type === 'root' || (node.type === 'element' && BLOCKS.has(node.tagName))
}

function tidyAttributes(element: Element): void {
  const { className, ...others } = element.properties
  const classes = Array.isArray(className) ? className.filter((name) => !OURS.has(String(name))) : []
  const entries = Object.entries({ ...others, ...(classes.length > 0 ? { className: classes } : {}) })
  element.properties = Object.fromEntries(entries.sort(([a], [b]) => (a < b ? -1 : 1)))
}
