import type { Nodes } from 'hast'
import { SKIP, visit } from 'unist-util-visit'

/** Emphasis would be tagged by names that came with PDF 2.0, which a reader of the PDF 1.7 that browsers write does not know. */
const PLAIN: Readonly<Record<string, string>> = { em: 'i', strong: 'b' }

/** Names elements so that the browser tags them by the types of ISO 32000-1, 14.8.4. */
export function usePlainTags(tree: Nodes): void {
  visit(tree, 'element', (element) => {
    const { className } = element.properties
    if (Array.isArray(className) && className.includes('katex')) return SKIP
    element.tagName = PLAIN[element.tagName] ?? element.tagName
  })
}
