import type { Element } from 'hast'
import { h } from 'hastscript'
import katex from 'katex'
import { fromHtml } from 'hast-util-from-html'
import type { CheckLine, NamedLine, Value } from '../calculate/types.ts'
import type { Page } from './scope.ts'
import { pathTex, pathWords } from './equation/symbol.ts'
import { valueTex } from './equation/value-tex.ts'
import { escapeText } from './equation/text-tex.ts'

/** Mathematics as KaTeX sets it, or why it cannot be set. */
export type SetMath = { readonly element: Element } | { readonly problem: string; readonly offset?: number }

/** The symbol of a name or dotted path. */
export function symbolMath(name: string, page: Page): Element {
  const path = name.split('.')
  return set(pathTex(path), false, pathWords(path), page)
}

/** A calculated line as symbols = numbers put in = result. */
export function lineMath(line: NamedLine, page: Page): Element {
  return set(`\\text{${escapeText(line.statement.text)}}=${valueTex(line.value, page.profile)}`, true, line.statement.text, page)
}

/** Both sides of a check, in symbols and in numbers. */
export function checkMath(line: CheckLine, page: Page): Element {
  return set(`\\text{${escapeText(line.statement.text)}}`, true, line.statement.text, page)
}

/** A value that is more than one number: a matrix, a list of states. */
export function valueMath(value: Value, page: Page): Element {
  return set(valueTex(value, page.profile), false, '', page)
}

/** Mathematics that an author wrote in prose. */
export function proseMath(tex: string, display: boolean): SetMath {
  try {
    return { element: render(tex, display) }
  } catch (error) {
    return { problem: error instanceof Error ? error.message : String(error) }
  }
}

function set(tex: string, display: boolean, words: string, page: Page): Element {
  const key = `${display ? 'd' : 'i'}${tex}`
  let element = page.set.get(key)
  if (!element) page.set.set(key, (element = render(tex, display, words)))
  return element
}

function render(tex: string, display: boolean, words = ''): Element {
  const html = katex.renderToString(tex, { displayMode: display, throwOnError: true, output: 'htmlAndMathml' })
  const [element] = fromHtml(html, { fragment: true }).children
  return (element as Element) ?? h('span', words)
}
