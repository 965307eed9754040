import type { Formula } from '../../calculate/types.ts'
import { isDimensionless } from '../../quantity/dimension.ts'
import { meantBy } from './operand.ts'
import { atom, bracketed, LEVEL, type Look, type Print, type Printing } from './print.ts'
import { isPutIn, showPutIn } from './put-in.ts'
import { shownTex, showLiteral } from './quantity-tex.ts'
import type { Shown } from '../../quantity/show.ts'
import { hasPrime, isSingleGlyph, ownedTex, pathTex } from './symbol.ts'
import { valueTex } from './value-tex.ts'

/** A number or quantity that stands in the formula, as its author typed it. */
export function printLiteral(
  formula: Extract<Formula, { type: 'number' | 'quantity' }>,
  { profile }: Printing,
): Print {
  return shownPrint(showLiteral(formula, profile))
}

export function shownPrint(shown: Shown): Print {
  const isPlain = shown.unit.length === 0 && shown.exponent === undefined
  const signed = shown.number.startsWith('\u2212') ? { signed: true } : {}
  return atom(shownTex(shown), isPlain ? 'number' : 'quantity', signed)
}

/** A name, or a part or entry of something named: as a symbol, or as the value put in for it. */
export function printName(
  formula: Extract<Formula, { type: 'name' | 'field' | 'item' }>,
  printing: Printing,
): Print {
  const put = printing.mode === 'numbers' ? numberPutIn(formula, printing) : undefined
  return put ?? printSymbol(formula, printing)
}

function numberPutIn(formula: Formula, { operands, profile, angles }: Printing): Print | undefined {
  const meant = meantBy(formula, operands)
  if (meant === undefined || !isPutIn(meant.value)) return undefined
  const { value } = meant
  if (value.type === 'quantity') return shownPrint(showPutIn(meant, value, profile, angles))
  const isMatrix = value.type === 'array' && isDimensionless(value.dimension)
  return atom(
    valueTex(value, profile, meant),
    isMatrix ? 'matrix' : 'other',
    value.type === 'array' ? { tall: true } : {},
  )
}

function printSymbol(
  formula: Extract<Formula, { type: 'name' | 'field' | 'item' }>,
  printing: Printing,
): Print {
  if (formula.type === 'name') {
    const last = formula.path.at(-1) ?? ''
    return atom(pathTex(formula.path), lookOf(last))
  }
  const owner = verbatim(formula.type === 'field' ? formula.of : formula)
  if (formula.type === 'field') {
    if (owner !== undefined) return atom(ownedTex(formula.key, owner), lookOf(formula.key))
    const of = closed(printing.print(formula.of, printing))
    return atom(`${of.tex}{.}${ownedTex(formula.key, '')}`, 'other', of.tall ? { tall: true } : {})
  }
  const of = closed(printing.print(formula.of, { ...printing, mode: 'symbols' }))
  const indices = formula.indices.map((index) => printing.print(index, { ...printing, inline: true }).tex)
  return atom(`${of.tex}[${indices.join(',\\,')}]`, 'other', of.tall ? { tall: true } : {})
}

/** A symbol takes a power as it is; a word or a primed letter does not. */
function lookOf(name: string): Look {
  return isSingleGlyph(name) && !hasPrime(name) ? 'symbol' : 'word'
}

function closed(print: Print): Print {
  return print.level < LEVEL.atom || print.signed || print.look === 'quantity' ? bracketed(print) : print
}

/** What owns a part, as the author wrote it: `tube`, `states[1]`; undefined when it is no plain name or entry of one. */
function verbatim(formula: Formula): string | undefined {
  if (formula.type === 'name') return formula.path.join('.')
  if (formula.type !== 'item') return undefined
  const of = verbatim(formula.of)
  const indices = formula.indices.map((index) => (index.type === 'number' ? index.text : undefined))
  return of === undefined || indices.includes(undefined) ? undefined : `${of}[${indices.join(',')}]`
}
