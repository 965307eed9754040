import type { ElementContent } from 'hast'
import { h } from 'hastscript'
import type { CheckLine, NamedLine, Value } from '../calculate/types.ts'
import { checkEquation } from './equation/check-equation.ts'
import { equation } from './equation/equation.ts'
import { LANE } from './equation/layout.ts'
import { renderMath, renderProseMath, type ProseMath } from './equation/render.ts'
import { pathTex, pathWords } from './equation/symbol.ts'
import { valueTex } from './equation/value-tex.ts'
import type { Page } from './scope.ts'

/** A longer name is no symbol: it stands as written, and can be broken. */
const LONGEST = 24

/** The symbol of a name or dotted path. */
export function symbolMath(name: string, page: Page): ElementContent[] {
  if (name.length > LONGEST) return [h('code', name)]
  const path = name.split('.')
  return inText(pathTex(path), pathWords(path), page)
}

/**
 * A calculated line as symbols = numbers put in = result, broken where it would run out of its lane. The result stands out
 * from the numbers that it was made of; its unit does not.
 */
export function lineMath(line: NamedLine, page: Page, width = LANE): ElementContent[] {
  const { tex, words } = equation(line, page.profile, { width, boldResult: true })
  return renderMath(tex, { display: true, words, forPdf: page.forPdf })
}

/** Both sides of a check, in symbols and in numbers. */
export function checkMath(line: CheckLine, page: Page, width?: number): ElementContent[] {
  const { tex, words } = checkEquation(line, page.profile, width === undefined ? {} : { width })
  return renderMath(tex, { display: true, words, forPdf: page.forPdf })
}

/** The same in a line of text. */
export function checkMathInText(line: CheckLine, page: Page): ElementContent[] {
  const { tex, words } = checkEquation(line, page.profile)
  return renderMath(tex, { display: false, words, forPdf: page.forPdf })
}

/** A value that is more than one number: a matrix, a list of states. */
export function valueMath(value: Value, page: Page): ElementContent[] {
  return inText(valueTex(value, page.profile), '', page)
}

/** Mathematics that an author wrote in prose. */
export function proseMath(tex: string, display: boolean, page: Page): ProseMath {
  return renderProseMath(tex, display, page.forPdf)
}

/** Symbols recur: each is set once a page. */
function inText(tex: string, words: string, page: Page): ElementContent[] {
  let set = page.set.get(tex)
  if (!set) page.set.set(tex, (set = renderMath(tex, { display: false, words, forPdf: page.forPdf })))
  return set
}
