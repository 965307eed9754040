import type { Element, ElementContent, Nodes as HastNodes, Root as HastRoot, Text } from 'hast'
import type { Code, Heading, Html, Nodes, Parents, Root } from 'mdast'
import type { InlineMath, Math } from 'mdast-util-math'
import rehypeRaw from 'rehype-raw'
import rehypeSanitize, { defaultSchema, type Options as Schema } from 'rehype-sanitize'
import rehypeSlug from 'rehype-slug'
import remarkRehype, { defaultHandlers, type Options as ToHast } from 'remark-rehype'
import { unified } from 'unified'
import { SKIP, visit } from 'unist-util-visit'
import { VFile } from 'vfile'
import type { SheetValueNode } from '../sheet/value-syntax.ts'

/** A node of the Markdown tree that the page may print in its own way. */
export type OwnNode = Code | Heading | Math | InlineMath | SheetValueNode

/**
 * What the page puts for a node, or nothing to leave it to Markdown. For a heading: what stands before its words. What is
 * given here is ours and is not sanitised.
 */
export type Fill = (node: OwnNode) => ElementContent[] | undefined

export interface ProseOptions {
  readonly fill?: Fill
  readonly document?: InDocument
}

/** Prose as a part of a document. */
export interface InDocument {
  /** Headings get ids, and stand this many ranks lower. */
  readonly ranks: number
  /** Ids, and links to them, begin so. */
  readonly prefix: string
  /** What stands for a picture that the page cannot show; nothing for one that it can. */
  readonly insteadOf: (picture: Element) => Element | undefined
}

/** A place kept for what `fill` gives, through the passes that must not see it. No author's markup can make one. */
interface Place {
  type: 'place'
  n: number
}

const PLACE = 'sheet-place'

/**
 * Markdown as HTML: what CommonMark and GFM say, without what could act on the page (scripts, styles, foreign addresses).
 * The tree given is not changed.
 */
export function proseToHast(tree: Root, options: ProseOptions = {}): HastRoot {
  const file = new VFile()
  const filled: ElementContent[][] = []
  const keep = (node: OwnNode): Place | undefined => {
    const content = options.fill?.(node)
    return content && { type: 'place', n: filled.push(content) - 1 }
  }
  file.data['keep'] = keep
  const result = processor.runSync(tree, file)
  if (options.document) inDocument(result, options.document)
  putInPlace(result, filled)
  return result
}

type Handler = NonNullable<NonNullable<ToHast['handlers']>['code']>
type State = Parameters<Handler>[0]
type Keep = (node: OwnNode) => Place | undefined

const keepOf = (state: State): Keep => (state.options.file as VFile).data['keep'] as Keep

const block =
  (otherwise: Handler): Handler =>
  (state: State, node: Nodes, parent) =>
    (keepOf(state)(node as OwnNode) as never) ?? otherwise(state, node, parent)

const heading: Handler = (state: State, node: Heading) => {
  const before = keepOf(state)(node)
  const element = defaultHandlers.heading(state, node)
  if (before) element.children.unshift(before as never)
  return element
}

/** Mathematics and values stay as their author wrote them when nothing is put for them. */
const source: Handler = (state: State, node: Math | InlineMath | SheetValueNode) => {
  const element: Element = {
    type: 'element',
    tagName: 'code',
    properties: {},
    children: [{ type: 'text', value: node.type === 'sheetValue' ? `:value[${node.value}]` : node.value }],
  }
  state.patch(node, element)
  return element
}

/**
 * HTML in the sheet that may not stand on the page is shown as written: `P <P_cr> Q` reads like a tag, and would otherwise
 * be gone without a trace.
 */
const html: Handler = (state: State, node: Html, parent: Parents | undefined) => {
  const tags = [...node.value.matchAll(/<\/?([A-Za-z][^\s/>]*)/g)].map(([, name = '']) => name.toLowerCase())
  if (tags.every((name) => ALLOWED.has(name))) return defaultHandlers.html(state, node)
  const text: Text = { type: 'text', value: node.value }
  state.patch(node, text)
  if (parent?.type !== 'root' && parent?.type !== 'blockquote' && parent?.type !== 'listItem') return text
  return { type: 'element', tagName: 'p', properties: {}, children: [text] } satisfies Element
}

/** Raw HTML in Markdown is read; without any, the tree is already what reading would give. */
function readRaw() {
  const read = rehypeRaw({ passThrough: ['place'] })
  return (tree: HastRoot, file: VFile): HastRoot => {
    let any = false
    visit(tree as HastNodes, 'raw', () => ((any = true), false))
    return any ? read(tree, file) : tree
  }
}

/** Makes our places elements that sanitising lets through, after whatever an author wrote as such has lost its name. */
function placesAsElements() {
  return (tree: HastRoot): void => {
    visit(tree as HastNodes, (node, index, parent) => {
      if (node.type === 'element' && node.tagName === PLACE) node.tagName = 'span'
      if ((node.type as string) !== 'place' || !parent || index === undefined) return
      const { n } = node as unknown as Place
      const place: Element = { type: 'element', tagName: PLACE, properties: { n: String(n) }, children: [] }
      parent.children[index] = place
      return SKIP
    })
  }
}

const ALLOWED = new Set(defaultSchema.tagNames)

/** What an author’s HTML may hold; the rest is left out. */
export const SCHEMA: Schema = {
  ...defaultSchema,
  clobberPrefix: '',
  strip: ['script', 'style'],
  tagNames: [...(defaultSchema.tagNames ?? []), PLACE],
  attributes: { ...defaultSchema.attributes, [PLACE]: ['n'] },
  protocols: { ...defaultSchema.protocols, src: ['http', 'https', 'data'] },
}

const processor = unified()
  .use(remarkRehype, {
    allowDangerousHtml: true,
    clobberPrefix: '',
    footnoteBackContent: '↑',
    handlers: {
      code: block(defaultHandlers.code as Handler),
      heading,
      html,
      inlineMath: block(source),
      math: block(source),
      sheetValue: block(source),
    },
  })
  .use(readRaw)
  .use(placesAsElements)
  .use(rehypeSanitize, SCHEMA)
  .freeze()

const addSlugs = rehypeSlug()

function inDocument(tree: HastRoot, { ranks, prefix, insteadOf }: InDocument): void {
  addSlugs(tree)
  visit(tree as HastNodes, 'element', (element, index, parent) => {
    const other = element.tagName === 'img' ? insteadOf(element) : undefined
    if (other && parent && index !== undefined) parent.children[index] = other
    breakLongWords(element)
    const rank = /^h([1-6])$/.exec(element.tagName)?.[1]
    if (rank !== undefined) element.tagName = `h${String(Math.min(6, Number(rank) + ranks))}`
    if (prefix === '') return
    const { id, href } = element.properties
    if (typeof id === 'string') element.properties.id = prefix + id
    if (typeof href === 'string' && href.startsWith('#'))
      element.properties.href = `#${prefix}${href.slice(1)}`
  })
}

/** A word longer than a line, such as a hash, would run out of its lane. */
const LONG_WORD = /\S{41,}/
const PIECES = /.{1,20}/gsu

function breakLongWords(element: Element): void {
  if (!element.children.some((child) => child.type === 'text' && LONG_WORD.test(child.value))) return
  element.children = element.children.flatMap((child) =>
    child.type === 'text' ? broken(child.value) : child,
  )
}

/** The text with a place for a break every so often in its long words; copied, it is the same text. */
function broken(text: string): ElementContent[] {
  const pieces = LONG_WORD.test(text) ? (text.match(PIECES) ?? []) : [text]
  return pieces.flatMap((value, i): ElementContent[] => {
    const piece: Text = { type: 'text', value }
    return i === 0 ? [piece] : [{ type: 'element', tagName: 'wbr', properties: {}, children: [] }, piece]
  })
}

function putInPlace(tree: HastRoot, filled: readonly ElementContent[][]): void {
  visit(tree as HastNodes, 'element', (element, index, parent) => {
    if (element.tagName !== PLACE || !parent || index === undefined) return
    const content = filled[Number(element.properties.n)] ?? []
    parent.children.splice(index, 1, ...content)
    return [SKIP, index + content.length]
  })
}
