// What is compared with: the usual libraries, unbundled, typesetting the same equations. Usage: node plain.js IN.md OUT.html
import { readFileSync, writeFileSync } from 'node:fs'
// Loaded, as a sheet's evaluation would need it; nothing is evaluated here.
import 'mathjs'
import rehypeKatex from 'rehype-katex'
import rehypeStringify from 'rehype-stringify'
import remarkMath from 'remark-math'
import remarkParse from 'remark-parse'
import remarkRehype from 'remark-rehype'
import { unified } from 'unified'

const [input, output] = process.argv.slice(2)
const processor = unified()
  .use(remarkParse)
  .use(remarkMath)
  .use(remarkRehype)
  .use(rehypeKatex)
  .use(rehypeStringify)
writeFileSync(output, String(processor.processSync(readFileSync(input, 'utf8'))))
