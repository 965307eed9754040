import type { ElementContent } from 'hast'

/** All text in a tree, in order. */
export function textOf(nodes: readonly ElementContent[]): string {
  return nodes
    .map((node) => (node.type === 'text' ? node.value : node.type === 'element' ? textOf(node.children) : ''))
    .join('')
}
