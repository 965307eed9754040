import type { Element, Nodes, Properties, Root } from 'hast'
import { find, html, svg, type Schema } from 'property-information'

/**
 * The page as the text of an HTML file, ended by a newline. The same tree gives the same bytes. Written for the trees of
 * this program, most of whose elements are the many small ones of mathematics: a text for any tree takes several times as long.
 *
 * @throws {Error} at what could end an element too early, and at nodes that are not for HTML
 */
export function htmlText(tree: Root): string {
  return `${textOfAll(tree.children, html)}\n`
}

/** Elements without content, which have no end tag (HTML standard, 13.1.2). */
const VOID = new Set('area base br col embed hr img input link meta source track wbr'.split(' '))
/** Elements whose content is not read as markup. */
const RAW_TEXT = new Set(['script', 'style'])

// Strings grown by `+=` are joined once, at the end, by the engine: three times as fast as a list of parts.
function textOfAll(nodes: readonly Nodes[], schema: Schema): string {
  let text = ''
  for (const node of nodes) {
    if (node.type === 'element') text += textOf(node, schema)
    else if (node.type === 'text') text += escapeText(node.value)
    else if (node.type === 'doctype') text += '<!doctype html>'
    else throw new Error(`a ${node.type} cannot be written as HTML`)
  }
  return text
}

function textOf(element: Element, outer: Schema): string {
  const { tagName, properties, children } = element
  const schema = tagName === 'svg' ? svg : tagName === 'foreignObject' ? html : outer
  const start = `<${tagName}${attributesText(properties, schema)}>`
  if (schema === html && VOID.has(tagName)) return start
  const content = RAW_TEXT.has(tagName) ? rawText(element) : textOfAll(children, schema)
  return `${start}${content}</${tagName}>`
}

function rawText({ tagName, children }: Element): string {
  const text = children.map((child) => (child.type === 'text' ? child.value : '')).join('')
  if (new RegExp(`</${tagName}`, 'i').test(text)) throw new Error(`the content of <${tagName}> would end it`)
  return text
}

function attributesText(properties: Properties, schema: Schema): string {
  let text = ''
  for (const property in properties) {
    const value = properties[property]
    if (value === undefined || value === null || value === false) continue
    const { name, separator } = attributeOf(property, schema)
    text += ` ${name}`
    if (value === true) continue
    text += `="${escapeAttribute(Array.isArray(value) ? value.join(separator) : String(value))}"`
  }
  return text
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
