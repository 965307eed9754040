import type { Element, ElementContent, Properties, Root, Text } from 'hast'

const TAG = /<(\/?)([a-z]+)((?:\s+[A-Za-z:-]+="[^"]*")*)\s*(\/?)>|([^<]+)/y
const ATTRIBUTE = /([A-Za-z:-]+)="([^"]*)"/g

/**
 * KaTeX's markup as a tree. It is plain: every element closed, attributes in double quotes, five characters escaped; so it
 * needs no parser of HTML at large. Throws an Error at markup of any other make.
 */
export function markupTree(markup: string): ElementContent[] {
  const root: Root = { type: 'root', children: [] }
  const open: (Root | Element)[] = [root]
  TAG.lastIndex = 0
  for (let at = 0; at < markup.length; at = TAG.lastIndex) {
    const match = TAG.exec(markup)
    const parent = open.at(-1)
    if (!match || !parent) throw unreadable(markup, at)
    const [, closing, name = '', attributes = '', selfClosing, text] = match
    if (text !== undefined) parent.children.push(textNode(text))
    else if (closing) {
      if (parent.type !== 'element' || parent.tagName !== name) throw unreadable(markup, at)
      open.pop()
    } else {
      const element: Element = {
        type: 'element',
        tagName: name,
        properties: propertiesOf(attributes),
        children: [],
      }
      parent.children.push(element)
      if (!selfClosing) open.push(element)
    }
  }
  if (open.length > 1) throw unreadable(markup, markup.length)
  return root.children as ElementContent[]
}

function unreadable(markup: string, at: number): Error {
  return new Error(`the markup of an equation is not as expected: ${markup.slice(at, at + 40)}`)
}

function textNode(text: string): Text {
  return { type: 'text', value: unescaped(text) }
}

function propertiesOf(attributes: string): Properties {
  const properties: Properties = {}
  for (const [, name = '', value = ''] of attributes.matchAll(ATTRIBUTE)) {
    const text = unescaped(value)
    if (name === 'class') properties.className = text.split(/\s+/).filter((part) => part !== '')
    else if (name === 'aria-hidden') properties.ariaHidden = text
    else properties[name] = text
  }
  return properties
}

const CHARACTERS: ReadonlyMap<string, string> = new Map([
  ['&amp;', '&'],
  ['&lt;', '<'],
  ['&gt;', '>'],
  ['&quot;', '"'],
  ['&#x27;', "'"],
])

function unescaped(text: string): string {
  return text.includes('&')
    ? text.replaceAll(/&[#a-z0-9]+;/g, (entity) => CHARACTERS.get(entity) ?? entity)
    : text
}
