import type { Element, ElementContent } from 'hast'
import katex, { type KatexOptions } from 'katex'
import { markupTree } from './markup-tree.ts'

export interface RenderOptions {
  /** On a line of its own, rather than in text. */
  readonly display: boolean
  /** The same as spoken. */
  readonly words: string
  /**
   * For a PDF, whose structure has no place for MathML: the visible formula itself is then the figure that a reading
   * program speaks by its words. Else the MathML is spoken, and the visible formula hidden from it.
   */
  readonly forPdf?: boolean
}

/** No size in a formula is larger than this, in em. */
const MAX_SIZE = 30
/** In prose, where an author may define macros. Equations made here define none, and a long one expands some thousands. */
const MAX_EXPANSIONS = 1000

function settings(display: boolean, forPdf: boolean): KatexOptions {
  return {
    displayMode: display,
    output: forPdf ? 'html' : 'htmlAndMathml',
    throwOnError: true,
    trust: false,
    strict: 'ignore',
    macros: {},
    maxSize: MAX_SIZE,
    maxExpand: Infinity,
  }
}

/** Mathematics made by this program, as a tree for the page. Throws an Error when KaTeX refuses it, which is a defect here. */
export function renderMath(tex: string, { display, words, forPdf = false }: RenderOptions): ElementContent[] {
  let markup: string
  try {
    markup = katex.renderToString(tex, settings(display, forPdf))
  } catch (cause) {
    throw new Error(`the equation \`${tex}\` cannot be set`, { cause })
  }
  return spoken(markupTree(markup), words, forPdf)
}

/** Mathematics from prose, or why it cannot be set and how far into its text. */
export type ProseMath =
  { readonly ok: ElementContent[] } | { readonly problem: string; readonly offset?: number }

/** Mathematics that an author wrote between `$` signs. It may not load, link or name anything outside itself. */
export function renderProseMath(tex: string, display: boolean, forPdf = false): ProseMath {
  const refused: string[] = []
  try {
    const markup = katex.renderToString(tex, {
      ...settings(display, forPdf),
      maxExpand: MAX_EXPANSIONS,
      trust: ({ command }) => {
        refused.push(command)
        return false
      },
      strict: (code: string) => (code === 'unknownSymbol' ? 'error' : 'ignore'),
    })
    const [command] = refused
    if (command === undefined) return { ok: spoken(markupTree(markup), tex, forPdf) }
    const offset = tex.indexOf(command)
    return { problem: `\`${command}\` is not allowed in a sheet`, ...(offset < 0 ? {} : { offset }) }
  } catch (error) {
    if (error instanceof katex.ParseError) return refusal(error)
    if (error instanceof RangeError) return { problem: 'it is nested too deep to be set' }
    throw error
  }
}

/** KaTeX's words for what it could not read, as a finding says them. */
const FACTS: readonly (readonly [pattern: RegExp, fact: string])[] = [
  [/^LaTeX-incompatible input.*Unrecognized Unicode character.*$/s, 'it has a character that cannot be set'],
  [/^Too many expansions.*$/s, 'a macro in it never ends'],
  [/'([^']*)'/g, '`$1`'],
  [/[Ee]xpected `EOF`/g, 'expected the end'],
  [/`EOF`/g, 'the end'],
]

function refusal(error: InstanceType<typeof katex.ParseError>): ProseMath {
  const { rawMessage, position } = error as { rawMessage?: string; position?: number }
  const text = FACTS.reduce(
    (message, [pattern, fact]) => message.replace(pattern, fact),
    rawMessage ?? error.message,
  )
  const problem = text.charAt(0).toLowerCase() + text.slice(1)
  return { problem, ...(position === undefined ? {} : { offset: position }) }
}

function spoken(tree: ElementContent[], words: string, forPdf: boolean): ElementContent[] {
  const visit = (node: ElementContent): void => {
    if (node.type !== 'element') return
    if (forPdf && hasClass(node, 'katex-html')) {
      delete node.properties.ariaHidden
      Object.assign(node.properties, { role: 'img', ariaLabel: words })
      return
    }
    if (node.tagName === 'math' && words !== '') node.properties.alttext = words
    else node.children.forEach(visit)
  }
  tree.forEach(visit)
  return tree
}

function hasClass({ properties }: Element, name: string): boolean {
  return Array.isArray(properties.className) && properties.className.includes(name)
}
