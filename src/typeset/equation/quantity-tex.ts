import type { Formula, Quantity } from '../../calculate/types.ts'
import { DIMENSIONLESS } from '../../quantity/dimension.ts'
import type { Profile } from '../../quantity/profile.ts'
import { show, type Shown, type ShowOptions } from '../../quantity/show.ts'
import { unitGap, unitTex, unitWords, type UnitExpression } from '../../quantity/units.ts'

/** A quantity ready for print, in TeX: digits in groups, the unit upright. */
export function shownTex(shown: Shown): string {
  const number = numberTex(shown)
  return `${number}${unitGap(shown.unit) === '' ? '' : '\\,'}${unitTex(shown.unit)}`
}

function numberTex({ number, exponent }: Shown): string {
  const digits = number.replaceAll('\u202f', '\\,').replace('\u2212', '-')
  return exponent === undefined ? digits : `${digits}{\\times}10^{${String(exponent)}}`
}

/** A quantity as spoken: 'minus 1235 kilonewtons', '2.1 times ten to the power 5 newtons per square millimetre'. */
export function shownWords({ number, exponent, unit }: Shown): string {
  const digits = number.replaceAll('\u202f', '').replace('\u2212', 'minus ')
  const power = exponent === undefined ? '' : ` times ten to the power ${signedWords(exponent)}`
  const words = unitWords(unit, exponent === undefined && Number(digits) === 1)
  return `${digits}${power}${words === '' ? '' : ` ${words}`}`
}

function signedWords(whole: number): string {
  return whole < 0 ? `minus ${String(-whole)}` : String(whole)
}

/** A number or quantity as typed, if that is all a formula is; its sign is part of the text. */
export function asTyped(formula: Formula | undefined): ShowOptions['asTyped'] {
  switch (formula?.type) {
    case 'number':
      return { text: formula.text, unit: [] }
    case 'quantity':
      return { text: formula.text, unit: formula.unit }
    case 'group':
      return asTyped(formula.body)
    case 'unary': {
      const body = formula.operator === '-' ? asTyped(formula.body) : undefined
      return body && !body.text.startsWith('-') ? { ...body, text: `-${body.text}` } : undefined
    }
    default:
      return undefined
  }
}

/** A number or quantity that stands in a formula, as its author wrote it. */
export function showLiteral(
  formula: Extract<Formula, { type: 'number' | 'quantity' }>,
  profile: Profile,
): Shown {
  const quantity: Quantity =
    formula.type === 'quantity'
      ? { type: 'quantity', si: formula.si, dimension: formula.dimension }
      : { type: 'quantity', si: formula.value, dimension: DIMENSIONLESS }
  return show(quantity, profile, { asTyped: asTyped(formula) })
}

/** A quantity that a name stands for: as typed where it was typed in, else rounded, in the unit asked for where one was. */
export function showOperand(
  {
    unit,
    asTyped: typed,
  }: { readonly unit?: UnitExpression | undefined; readonly asTyped?: Formula | undefined },
  quantity: Quantity,
  profile: Profile,
): Shown {
  return show(quantity, profile, { unit, asTyped: asTyped(typed) })
}
