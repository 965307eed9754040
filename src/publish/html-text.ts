import type { Root } from 'hast'
import { toHtml } from 'hast-util-to-html'

/** The page as the text of an HTML file, ended by a newline. The same tree gives the same bytes. */
export function htmlText(tree: Root): string {
  const text = toHtml(tree)
  return text.endsWith('\n') ? text : `${text}\n`
}
