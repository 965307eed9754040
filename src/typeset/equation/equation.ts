import type { NamedLine } from '../../calculate/types.ts'
import type { Profile } from '../../quantity/profile.ts'
import { layChain, type Link } from './layout.ts'
import { atom, type Print } from './print.ts'
import { symbolTex } from './symbol.ts'
import { equationWords } from './words.ts'

import { partsOf, type EquationParts } from './equation-parts.ts'
export interface EquationOptions {
  /** Width of the lane in em of the mathematics; see layout.ts. */
  readonly width?: number
  /** Sets the figures of a calculated quantity bold, so that it stands out from the numbers it was made of. */
  readonly boldResult?: boolean
}

/** A calculated line ready for print. */
export interface Equation {
  /** The whole in TeX for display: symbols = numbers put in = result, broken over rows where it is long. */
  readonly tex: string
  /** The same as spoken. */
  readonly words: string
  readonly left: string
  /** The formula in symbols; absent where the line only states a value. */
  readonly symbolic?: string
  /** The formula with the numbers put in; absent where that says nothing new. */
  readonly substituted?: string
  /** The value; absent for a function and where it is what stands before it. */
  readonly result?: string
}

/** A line `name = formula` as a checker reads it. Throws nothing for a line that was calculated. */
export function equation(line: NamedLine, profile: Profile, options: EquationOptions = {}): Equation {
  const left = leftOf(line)
  const parts = partsOf(line, profile)
  const links = linksOf(parts, options.boldResult === true && line.value.type === 'quantity')
  const { symbolic, substituted, result } = parts
  return {
    tex: layChain(left, links, options.width),
    words: equationWords(line, profile, parts),
    left,
    ...(symbolic ? { symbolic: symbolic.tex } : {}),
    ...(substituted ? { substituted: substituted.tex } : {}),
    ...(result ? { result: result.tex } : {}),
  }
}

function leftOf({ statement, name }: NamedLine): string {
  const symbol = symbolTex(name)
  if (statement.kind !== 'function') return symbol
  return `${symbol}(${statement.parameters.map((parameter) => symbolTex(parameter.name)).join(',\\,')})`
}

function linksOf(
  { symbolic, substituted, result, because }: EquationParts,
  isBold: boolean,
): readonly Link[] {
  const links: Link[] = []
  const add = (print: Print, startsRow: boolean) => {
    const isLast = print === result || (print === substituted && !result)
    links.push({ sign: '=', print: isBold && isLast ? bold(print) : print, startsRow })
  }
  if (symbolic) add(symbolic, true)
  if (substituted) add(substituted, true)
  if (result) add(result, symbolic !== undefined && substituted === undefined && symbolic.ownRow === true)
  if (because) links.push({ sign: '', print: because, startsRow: false })
  return links
}

/** Figures in bold; a unit, upright of its own, stays as it is. */
function bold(print: Print): Print {
  return atom(`\\mathbf{${print.tex}}`, print.look)
}
