import type { Formula, NamedLine, Value } from '../../calculate/types.ts'
import type { Profile } from '../../quantity/profile.ts'
import { reasonsOf } from './case-tex.ts'
import { printingOf } from './formula-tex.ts'
import { layChain, type Link } from './layout.ts'
import { printRelation } from './logic-tex.ts'
import { meantBy } from './operand.ts'
import { atom, bracketed, LEVEL, withoutGroup, type Print, type Printing } from './print.ts'
import { asTyped } from './quantity-tex.ts'
import { symbolTex } from './symbol.ts'
import { textTex } from './text-tex.ts'
import { valueTex } from './value-tex.ts'
import { equationWords } from './words.ts'

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

/** The parts of a line that say something new. */
export interface EquationParts {
  readonly symbolic?: Print
  readonly substituted?: Print
  readonly result?: Print
  /** Why this branch of a case distinction: its condition with the numbers put in. */
  readonly because?: Print
}

function partsOf(line: NamedLine, profile: Profile): EquationParts {
  const printing = printingOfLine(line, profile)
  const symbolic = closed(printing.print(line.formula, printing))
  if (line.value.type === 'function') return { symbolic }
  const shown = valueTex(line.value, profile, {
    unit: line.unit,
    asTyped: line.unit ? undefined : line.formula,
  })
  const isText = line.value.type === 'model'
  const result = isText ? splitText(line.value.description) : atom(shown, 'other')
  if (isPlainLookup(line.formula, line.value)) return { result }
  const numbers = { ...printing, mode: 'numbers' as const }
  const substituted = closed(printing.print(line.formula, numbers))
  const saysSame = substituted.tex === symbolic.tex
  const isSpelledOut = !line.unit && isSpelled(line.formula, line)
  const meant = meantBy(withoutGroup(line.formula), line.operands)
  const isAlias = !line.unit && meant !== undefined
  // A rounded value of the other name before the same value in another unit would only disagree with it in the last figure.
  const isConverted = line.unit !== undefined && meant !== undefined && !meant.asTyped
  const before = saysSame || isConverted ? symbolic : substituted
  // What a model is made from says all, unless numbers were put in: then its description tells how they were understood.
  const isTold = line.value.type === 'model' && saysSame && line.formula.type === 'call'
  const because = becauseOf(line, numbers)
  return {
    symbolic,
    ...(saysSame || isConverted ? {} : { substituted }),
    ...(before.tex === result.tex || (isAlias && !saysSame) || isTold || isSpelledOut ? {} : { result }),
    ...(because ? { because } : {}),
  }
}

/** What the formulas of a line are printed with; a function's own names are those it was defined with. */
export function printingOfLine(line: NamedLine, profile: Profile): Printing {
  const { operands, branches, value } = line
  const isSheetFunction = (name: string) =>
    (value.type === 'function' ? value.names.get(name) : operands.get(name)?.value)?.type === 'function'
  return printingOf({ profile, operands, branches, isSheetFunction })
}

/** A comparison as the right side of `=` needs brackets; a case distinction has its brace. */
export function closed(print: Print): Print {
  return print.level > LEVEL.case && print.level < LEVEL.sum ? bracketed(print) : print
}

/** A list or record whose entries are numbers, texts or names: with the numbers put in it is its own result. */
function isSpelled(formula: Formula, line: NamedLine): boolean {
  const body = withoutGroup(formula)
  const isEntry = (entry: Formula): boolean =>
    asTyped(entry) !== undefined ||
    entry.type === 'text' ||
    entry.type === 'truth' ||
    meantBy(withoutGroup(entry), line.operands) !== undefined ||
    isSpelled(entry, line)
  if (body.type === 'list') return body.items.every(isEntry)
  return body.type === 'record' && body.fields.every(({ value }) => isEntry(value))
}

/** `section("HE 160 B")`: its designation says all. */
function isPlainLookup(formula: Formula, value: Value): boolean {
  return (
    formula.type === 'call' &&
    value.type === 'record' &&
    (value.of === 'section' || value.of === 'material') &&
    formula.args.every((arg) => withoutGroup(arg).type === 'text')
  )
}

/** A text that can be broken between its words. */
function splitText(text: string): Print {
  const words = text.split(' ')
  const pieces = words.map((word, i) =>
    atom(textTex(i === 0 ? word : ` ${word}`), 'other', { atStart: textTex(word) }),
  )
  return atom(textTex(text), 'other', pieces.length > 1 ? { split: () => pieces } : {})
}

function becauseOf(line: NamedLine, numbers: Printing): Print | undefined {
  const reasons = reasonsOf(line.formula, line.branches).map(({ condition, holds }) => {
    return printRelation(condition, { ...numbers, inline: true }, holds).tex
  })
  return reasons.length === 0 ? undefined : atom(`\\quad\\text{as }${reasons.join(',\\;')}`, 'other')
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
