import type { CheckLine, Formula, Quantity } from '../../calculate/types.ts'
import type { Profile } from '../../quantity/profile.ts'
import { showComparison } from '../../quantity/show-comparison.ts'
import { show, type Shown, type ShowOptions } from '../../quantity/show.ts'
import { unitText } from '../../quantity/units.ts'
import type { EquationOptions } from './equation.ts'
import { printingOf } from './formula-tex.ts'
import { layChain, type Link } from './layout.ts'
import { relationTex } from './logic-tex.ts'
import { shownPrint } from './name-tex.ts'
import { meantBy } from './operand.ts'
import { closed, withoutGroup, type Print, type Printing } from './print.ts'
import { asTyped } from './quantity-tex.ts'
import { checkWords } from './words.ts'

/** A check ready for print. */
export interface CheckEquation {
  /** Both sides with their numbers, and between them the relation; struck where it does not hold. */
  readonly tex: string
  readonly words: string
}

/** One side: the formula in symbols, with numbers put in, and its value; only what says something new. */
export interface CheckSide {
  readonly formula: Formula
  readonly parts: readonly Print[]
  readonly value: Shown
  readonly hasSymbols: boolean
}

/** A check as a checker reads it: `N_{Ed} = 285 kN \leq N_{b,Rd} = 734 kN`. */
export function checkEquation(
  line: CheckLine,
  profile: Profile,
  options: EquationOptions = {},
): CheckEquation {
  const printing = printingOf({ profile, operands: line.operands, branches: line.branches })
  const isUpper = line.statement.relation.startsWith('<')
  const demand = { formula: line.demandFormula, quantity: line.demand }
  const capacity = { formula: line.capacityFormula, quantity: line.capacity }
  const [left, right] = isUpper ? [demand, capacity] : [capacity, demand]
  const [leftValue, rightValue] = valuesOf(left, right, line, profile)
  const leftSide = sideOf(left.formula, leftValue, printing)
  const rightSide = sideOf(right.formula, rightValue, printing)
  const holds = line.verdict === 'pass'
  const [first, ...others] = leftSide.parts
  const relation = relationTex(line.statement.relation, holds)
  const links: Link[] = [
    ...others.map((print, i) => ({ sign: '=', print, startsRow: i === 0 && others.length > 1 })),
    ...rightSide.parts.map((print, i) => ({ sign: i === 0 ? relation : '=', print, startsRow: i === 0 })),
  ]
  return {
    tex: layChain(first?.tex ?? '', links, options.width),
    words: checkWords(line, profile, leftSide, rightSide),
  }
}

interface Side {
  readonly formula: Formula
  readonly quantity: Quantity
}

/**
 * The values of both sides, in one unit and with figures enough to tell them apart. A value that was typed in stays as it was
 * typed, and the other is shown in its unit.
 */
function valuesOf(left: Side, right: Side, line: CheckLine, profile: Profile): readonly [Shown, Shown] {
  const [typedLeft, typedRight] = [typedOf(left.formula, line), typedOf(right.formula, line)]
  const sameUnit = typedLeft && typedRight && unitText(typedLeft.unit) === unitText(typedRight.unit)
  const unit = sameUnit || !(typedLeft && typedRight) ? (typedLeft ?? typedRight)?.unit : undefined
  const [a, b] = showComparison(left.quantity, right.quantity, profile, { unit })
  const keep = (side: Side, typed: ShowOptions['asTyped'], shown: Shown) =>
    typed && unit ? show(side.quantity, profile, { asTyped: typed }) : shown
  return [keep(left, typedLeft, a), keep(right, typedRight, b)]
}

/** The number as typed, when a side is one or is the name of one. */
function typedOf(formula: Formula, line: CheckLine): ShowOptions['asTyped'] {
  const meant = meantBy(withoutGroup(formula), line.operands)
  return asTyped(formula) ?? (meant?.unit ? undefined : asTyped(meant?.asTyped))
}

function sideOf(formula: Formula, value: Shown, printing: Printing): CheckSide {
  const symbolic = closed(printing.print(withoutGroup(formula), printing))
  const isName = meantBy(withoutGroup(formula), printing.operands) !== undefined
  const numbers = closed(printing.print(withoutGroup(formula), { ...printing, mode: 'numbers' }))
  const parts = [symbolic]
  if (!isName && numbers.tex !== symbolic.tex) parts.push(numbers)
  const shown = shownPrint(value)
  if (parts.at(-1)?.tex !== shown.tex) parts.push(shown)
  return { formula, parts, value, hasSymbols: numbers.tex !== symbolic.tex }
}
