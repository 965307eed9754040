import type { Element, Nodes, Properties, Root } from 'hast'
import { find, html, svg, type Schema } from 'property-information'

/**
 * The page as the text of an HTML file, ended by a newline. The same tree gives the same bytes. Written for the trees of
 * this program, most of whose elements are the many small ones of mathematics: a text for any tree takes several times as long.
 *
 * @throws {Error} at what could end an element too early, and at nodes that are not for HTML
 */
export function htmlText(tree: Root): string {
  const parts: string[] = []
  writeAll(tree.children, html, parts)
  return `${parts.join('')}\n`
}

/** Elements without content, which have no end tag (HTML standard, 13.1.2). */
const VOID = new Set('area base br col embed hr img input link meta source track wbr'.split(' '))
/** Elements whose content is not read as markup. */
const RAW_TEXT = new Set(['script', 'style'])

function writeAll(nodes: readonly Nodes[], schema: Schema, parts: string[]): void {
  for (const node of nodes) {
    if (node.type === 'element') writeElement(node, schema, parts)
    else if (node.type === 'text') parts.push(escapeText(node.value))
    else if (node.type === 'doctype') parts.push('<!doctype html>')
    else throw new Error(`a ${node.type} cannot be written as HTML`)
  }
}

function writeElement(element: Element, outer: Schema, parts: string[]): void {
  const { tagName, properties, children } = element
  const schema = tagName === 'svg' ? svg : tagName === 'foreignObject' ? html : outer
  parts.push('<', tagName)
  writeAttributes(properties, schema, parts)
  parts.push('>')
  if (schema === html && VOID.has(tagName)) return
  if (RAW_TEXT.has(tagName)) parts.push(rawText(element))
  else writeAll(children, schema, parts)
  parts.push('</', tagName, '>')
}

function rawText({ tagName, children }: Element): string {
  const text = children.map((child) => (child.type === 'text' ? child.value : '')).join('')
  if (text.toLowerCase().includes(`</${tagName}`)) throw new Error(`the content of <${tagName}> would end it`)
  return text
}

function writeAttributes(properties: Properties, schema: Schema, parts: string[]): void {
  for (const property in properties) {
    const value = properties[property]
    if (value === undefined || value === null || value === false) continue
    const { name, separator } = attributeOf(property, schema)
    parts.push(' ', name)
    if (value === true) continue
    const text = Array.isArray(value) ? value.join(separator) : String(value)
    parts.push('="', escapeAttribute(text), '"')
  }
}

interface Attribute {
  readonly name: string
  /** Between the values of a list. */
  readonly separator: string
}

const attributes = new Map<Schema, Map<string, Attribute>>([
  [html, new Map()],
  [svg, new Map()],
])

function attributeOf(property: string, schema: Schema): Attribute {
  const known = attributes.get(schema)
  let attribute = known?.get(property)
  if (attribute === undefined) {
    const info = find(schema, property)
    if (/[\s"'<>/=]/.test(info.attribute)) throw new Error(`\`${info.attribute}\` cannot name an attribute`)
    attribute = { name: info.attribute, separator: info.commaSeparated ? ', ' : ' ' }
    known?.set(property, attribute)
  }
  return attribute
}

const SPECIAL_IN_TEXT = /[&<]/
const SPECIAL_IN_ATTRIBUTE = /[&"]/

function escapeText(text: string): string {
  return SPECIAL_IN_TEXT.test(text) ? text.replaceAll('&', '&#x26;').replaceAll('<', '&#x3C;') : text
}

function escapeAttribute(text: string): string {
  return SPECIAL_IN_ATTRIBUTE.test(text) ? text.replaceAll('&', '&#x26;').replaceAll('"', '&#x22;') : text
}
