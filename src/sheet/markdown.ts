import type { Root } from 'mdast'
import remarkFrontmatter from 'remark-frontmatter'
import remarkGfm from 'remark-gfm'
import remarkMath from 'remark-math'
import remarkParse from 'remark-parse'
import { unified } from 'unified'
import { sheetValueSyntax } from './value-syntax.ts'

const processor = unified()
  .use(remarkParse)
  .use(remarkFrontmatter, ['yaml'])
  .use(remarkGfm)
  .use(remarkMath)
  .use(sheetValueSyntax)
  .freeze()

/** Reads Markdown (CommonMark, GFM, `$…$` mathematics, front matter, `:value[…]`) into a tree. Never fails. */
export function parseMarkdown(text: string): Root {
  return processor.parse(text)
}
