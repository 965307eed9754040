import type { Heading, Nodes, Root } from 'mdast'
import type { Position } from 'unist'
import { visit } from 'unist-util-visit'
import type { VFileMessage } from 'vfile-message'
import { finding } from '../finding.ts'
import { BLOCK_KINDS, RESERVED_KINDS, readBlock } from './block.ts'
import { readFrontMatter } from './front-matter.ts'
import { parseMarkdown } from './markdown.ts'
import { Places } from './places.ts'
import type { Problem } from './statement.ts'
import type { Block, FrontMatter, InlineValue, Sheet, Span } from './types.ts'
import type { SheetValueNode } from './value-syntax.ts'

export interface ParsedSheet {
  /** Absent when the front matter cannot be used: such a sheet has no identity. */
  readonly sheet?: Sheet
  readonly findings: readonly VFileMessage[]
  /** The text with `\n` line endings and no byte order mark: what places refer to. */
  readonly text: string
}

/** Longest sheet that is read, in characters. */
const MAX_LENGTH = 5_000_000

/**
 * Reads a sheet's text into its Markdown tree, blocks and statements. Never throws for any text.
 *
 * @param path the path as the user gave it, for messages
 */
export function parseSheet(source: string, path: string): ParsedSheet {
  const text = source.replace(/^\uFEFF/, '').replace(/\r\n?/g, '\n')
  const places = new Places(text)
  const problems: Problem[] = []
  const done = (sheet?: Sheet): ParsedSheet => {
    const findings = problems.map((problem) => finding({ ...problem, file: path }))
    return { text, findings, ...(sheet ? { sheet } : {}) }
  }
  if (text.length > MAX_LENGTH) {
    problems.push({
      rule: 'limit-exceeded',
      message: `the sheet has ${text.length} characters, and ${MAX_LENGTH} are allowed`,
      hint: 'divide it into several sheets',
      span: places.span(0, 0),
    })
    return done()
  }
  const deep = deepNesting(text, places)
  if (deep) {
    problems.push(deep)
    return done()
  }
  const tree = parseMarkdown(text)
  const front = readHead(tree, places)
  problems.push(...front.problems)
  const { blocks, problems: blockProblems } = readBlocks(tree, places)
  problems.push(...blockProblems)
  if (!front.meta) return done()
  return done({
    path,
    text,
    meta: front.meta,
    metaPlaces: front.places,
    tree,
    blocks,
    inlineValues: readInlineValues(tree, blocks, places),
  })
}

/** Block quotes and lists may stand inside each other this deep; beyond it, reading Markdown gets slow. */
const MAX_CONTAINERS = 60

function deepNesting(text: string, places: Places): Problem | undefined {
  const markers = new RegExp(`^(?:[ \\t]*(?:>|[-+*]|\\d{1,9}[.)])){${MAX_CONTAINERS},}`, 'm')
  const found = markers.exec(text)
  if (!found) return undefined
  return {
    rule: 'limit-exceeded',
    message: `lists or quotations stand inside each other more than ${MAX_CONTAINERS} deep`,
    hint: 'use headings to structure the sheet',
    span: places.span(found.index, found.index + 1),
  }
}

function readHead(
  tree: Root,
  places: Places,
): { meta?: FrontMatter; places: ReadonlyMap<string, Span>; problems: readonly Problem[] } {
  const [first] = tree.children
  if (first?.type !== 'yaml') {
    const hint =
      'begin the sheet with `---`, `sheet: …`, `title: …`, `---`; `stanchion new` writes one to start from'
    return {
      places: new Map(),
      problems: [
        { rule: 'bad-front-matter', message: 'the sheet has no front matter', hint, span: places.span(0, 0) },
      ],
    }
  }
  const start = (first.position?.start.offset ?? 0) + '---\n'.length
  return readFrontMatter(first.value, start, places)
}

function readBlocks(tree: Root, places: Places): { blocks: Block[]; problems: Problem[] } {
  const blocks: Block[] = []
  const problems: Problem[] = []
  let heading: string | undefined
  visit(tree, (node, _index, parent) => {
    if (node.type === 'heading') heading = plainText(node)
    if (node.type !== 'code') return
    const span = spanOf(node, places)
    const { lang } = node
    if ((RESERVED_KINDS as readonly (string | null | undefined)[]).includes(lang)) {
      problems.push({
        rule: 'bad-block',
        message: `\`${lang}\` blocks are not calculated by this version`,
        hint: 'take the block out; what it says would not be on the page',
        span: firstLine(span, places),
      })
    } else if ((BLOCK_KINDS as readonly (string | null | undefined)[]).includes(lang)) {
      if (parent?.type !== 'root') {
        problems.push({
          rule: 'bad-block',
          message: `a \`${lang}\` block stands inside a list or quotation, where it is not calculated`,
          hint: 'move it to the left margin',
          span: firstLine(span, places),
        })
        return
      }
      const result = readBlock(places, node, heading)
      if (result.block) blocks.push(result.block)
      problems.push(...result.problems)
    }
  })
  return { blocks, problems }
}

function readInlineValues(tree: Root, blocks: readonly Block[], places: Places): InlineValue[] {
  const found: InlineValue[] = []
  const headings: Heading[] = []
  visit(tree, (node: Nodes | SheetValueNode) => {
    if (node.type === 'heading') headings.push(node)
    if (node.type !== 'sheetValue') return
    const span = spanOf(node, places)
    const start = span.start.offset + ':value['.length
    const inner = node.value
    const text = inner.trim()
    const lead = start + (inner.length - inner.trimStart().length)
    const inHeading = headings.some(
      (h) =>
        (h.position?.start.offset ?? 0) <= span.start.offset &&
        span.end.offset <= (h.position?.end.offset ?? 0),
    )
    const blocksBefore = blocks.filter((block) => block.span.start.offset < span.start.offset).length
    found.push({
      expression: { text, span: places.span(lead, lead + text.length) },
      span,
      blocksBefore,
      inHeading,
    })
  })
  return found
}

function spanOf(node: { position?: Position | undefined }, places: Places): Span {
  return places.span(node.position?.start.offset ?? 0, node.position?.end.offset ?? 0)
}

function firstLine(span: Span, places: Places): Span {
  const end = places.text.indexOf('\n', span.start.offset)
  return places.span(span.start.offset, end < 0 ? span.end.offset : Math.min(end, span.end.offset))
}

function plainText(node: Nodes): string {
  if ('value' in node) return node.value
  return 'children' in node ? node.children.map((child) => plainText(child as Nodes)).join('') : ''
}
