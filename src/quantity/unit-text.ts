import { exponentText, raisedExponent } from './exponent.ts'
import { UNITS, type Unit } from './unit-table.ts'
import type { UnitExpression } from './units.ts'

/** As printed in text: `kN·m/rad`, `N/mm²`, `cm⁴`, `K⁻¹`; empty for a plain number. */
export function unitText(expression: UnitExpression): string {
  return compose(expression, '·', (name, unit, exponent) => (unit?.text ?? name) + raisedExponent(exponent))
}

/** As TeX for math mode, upright, without the space before it: `\mathrm{N}/\mathrm{mm}^{2}`. */
export function unitTex(expression: UnitExpression): string {
  return compose(expression, '{\\cdot}', (name, unit, exponent) => {
    const symbol = unit?.tex ?? `\\mathrm{${name}}`
    if (exponent === 1) return symbol
    return `${unit?.tex === undefined ? symbol : `{${symbol}}`}^{${exponentText(exponent)}}`
  })
}

/** What stands between a number and its unit: nothing for a plain number and for degrees (`30°`), else a space. */
export function unitGap(expression: UnitExpression): '' | ' ' {
  const [first] = expression
  return first === undefined || (first.unit === 'deg' && first.exponent === 1) ? '' : ' '
}

type Part = (name: string, unit: Unit | undefined, exponent: number) => string

function compose(expression: UnitExpression, product: string, part: Part): string {
  const write = (exponentOf: (e: number) => number) => (e: UnitExpression[number]) =>
    part(e.unit, UNITS[e.unit], exponentOf(e.exponent))
  const over = expression.filter((e) => e.exponent > 0)
  const under = expression.filter((e) => e.exponent < 0)
  if (over.length === 0) return under.map(write((e) => e)).join(product)
  const top = over.map(write((e) => e)).join(product)
  if (under.length === 0) return top
  const bottom = under.map(write((e) => -e)).join(product)
  return under.length === 1 ? `${top}/${bottom}` : `${top}/(${bottom})`
}

/** As spoken, after a number other than 1 unless `singular`: 'kilonewton metres per radian', 'newtons per square millimetre'. */
export function unitWords(expression: UnitExpression, singular = false): string {
  const over = expression.filter((e) => e.exponent > 0)
  const under = expression.filter((e) => e.exponent < 0)
  const top = over.map((e, i) => powerWords(e.unit, e.exponent, !singular && i === over.length - 1))
  const bottom = under.map((e) => `per ${powerWords(e.unit, -e.exponent, false)}`)
  return [...top, ...bottom].join(' ')
}

function powerWords(name: string, exponent: number, plural: boolean): string {
  const unit = UNITS[name]
  const words = unit?.words ?? name
  const noun = plural ? (unit?.plural ?? `${words}s`) : words
  const isLength = unit?.dimension.join() === '0,1,0,0'
  if (exponent === 1) return noun
  if (exponent === 2) return isLength ? `square ${noun}` : `${noun} squared`
  if (exponent === 3) return isLength ? `cubic ${noun}` : `${noun} cubed`
  return exponent === 4 ? `${noun} to the fourth power` : `${noun} to the power ${exponentText(exponent)}`
}
