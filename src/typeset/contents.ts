import type { Element, ElementContent, Nodes } from 'hast'
import { h } from 'hastscript'
import { visit, SKIP } from 'unist-util-visit'
import type { LineNumbers } from './line-numbers.ts'

/** The sections with the numbers of their lines, from the headings of the printed body. */
export function contents(body: readonly ElementContent[], numbers: LineNumbers): Element[] {
  const items: Element[] = []
  let section = 0
  for (const node of body) {
    if (node.type !== 'element' || !/^h[23]$/.test(node.tagName)) continue
    const isSection = node.children.some((child) => isNumber(child))
    if (isSection) section++
    const range = isSection ? numbers.sections[section] : undefined
    const lines =
      range?.first === undefined
        ? ''
        : range.first === range.last
          ? range.first
          : `${range.first} – ${range.last ?? ''}`
    const { id } = node.properties
    items.push(
      h('li', { className: isSection ? 'section' : 'sub-section' }, [
        h('span', { className: 'section-number' }, isSection ? String(section) : ''),
        h(
          'a',
          { href: `#${typeof id === 'string' ? id : ''}` },
          unlinked(node.children.filter((child) => !isNumber(child))),
        ),
        h('span', { className: 'section-lines' }, lines),
      ]),
    )
  }
  return items.length < 2
    ? []
    : [
        h('nav', { className: 'contents', ariaLabel: 'Contents' }, [
          h('h2', 'Contents'),
          h('p', { className: 'aside' }, 'Section, and the numbers of its lines'),
          h('ol', items),
        ]),
      ]
}

const isNumber = (node: ElementContent): boolean =>
  node.type === 'element' &&
  Array.isArray(node.properties.className) &&
  node.properties.className.includes('section-number')

/** A heading's words for use inside a link: without links and ids of its own. */
function unlinked(children: readonly ElementContent[]): ElementContent[] {
  const copy = h('span', structuredClone([...children]))
  visit(copy as Nodes, 'element', (element, index, parent) => {
    delete element.properties.id
    if (element.tagName !== 'a' || !parent || index === undefined) return
    parent.children.splice(index, 1, ...element.children)
    return [SKIP, index]
  })
  return [copy]
}
