import type { Comment, Element, ElementContent, Nodes, Root } from 'hast'
import { fromHtml } from 'hast-util-from-html'
import { SKIP, visit } from 'unist-util-visit'

export type Slots = Readonly<Record<string, readonly ElementContent[]>>

const parsed = new Map<string, Root>()

/**
 * Fills the slots of a template: an element `<slot name="…">` gives way to what the program has for that name, or, when that
 * is nothing, to what the template has in it. Comments are left out.
 *
 * @throws {Error} when the template names a slot that does not exist
 */
export function fillTemplate(template: string, slots: Slots): Root {
  let original = parsed.get(template)
  if (original === undefined) parsed.set(template, (original = parse(template)))
  const tree = structuredClone(original)
  visit(tree as Nodes, 'element', (element, index, parent) => {
    if (element.tagName !== 'slot' || !parent || index === undefined) return
    const content = contentOf(element, slots)
    parent.children.splice(index, 1, ...content)
    return [SKIP, index + content.length]
  })
  return tree
}

function contentOf(element: Element, slots: Slots): readonly ElementContent[] {
  const name = typeof element.properties.name === 'string' ? element.properties.name : ''
  if (!Object.hasOwn(slots, name))
    throw new Error(`the page template has a slot \`${name}\`; there are ${Object.keys(slots).join(', ')}`)
  const content = slots[name] ?? []
  return content.length > 0 ? content : element.children
}

function parse(template: string): Root {
  const tree = fromHtml(template)
  visit(tree as Nodes, 'comment', (_node: Comment, index, parent) => {
    if (!parent || index === undefined) return
    parent.children.splice(index, 1)
    return index
  })
  return tree
}
