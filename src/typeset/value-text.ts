import type { Element, ElementContent } from 'hast'
import { h } from 'hastscript'
import type { Operand, Origin, Value } from '../calculate/types.ts'
import type { Shown } from '../quantity/show.ts'
import { unitGap } from '../quantity/units.ts'
import { showOperand } from './equation/quantity-tex.ts'
import { valueMath } from './mathematics.ts'
import type { Page } from './scope.ts'

/** The mark that tells, without colour, where a value comes from; `templates/print.css` draws it. */
const MARKS: Readonly<Record<Origin, string>> = {
  given: 'given',
  'looked-up': 'looked-up',
  derived: 'result',
  carried: 'carried',
  bound: 'carried',
  function: 'defined',
  model: 'defined',
}

/** A value in text, marked by where it comes from. */
export function valueText(
  value: Value,
  origin: Origin,
  page: Page,
  how: Pick<Operand, 'unit' | 'asTyped'> = {},
): Element {
  return h('span', { className: ['value', MARKS[origin]] }, plainValue(value, page, how))
}

/** A value in text, without a mark. */
export function plainValue(
  value: Value,
  page: Page,
  how: Pick<Operand, 'unit' | 'asTyped'> = {},
): ElementContent[] {
  switch (value.type) {
    case 'quantity':
      return shownText(showOperand(how, value, page.profile))
    case 'text':
      return words(`“${value.value}”`)
    case 'truth':
      return words(String(value.value))
    case 'record':
      return value.of === 'record' ? valueMath(value, page) : words(value.title)
    case 'model':
      return words(value.description)
    default:
      return valueMath(value, page)
  }
}

const words = (text: string): ElementContent[] => [{ type: 'text', value: text }]

/** A number with its unit, kept on one line. */
export function shownText({ number, exponent, unit, unitText }: Shown): ElementContent[] {
  const power: ElementContent[] = exponent === undefined ? [] : [...words('×10'), h('sup', minus(exponent))]
  const gap = unitGap(unit) === '' ? '' : '\u00a0'
  return [h('span', { className: 'quantity' }, [...words(number), ...power, ...words(gap + unitText)])]
}

const minus = (exponent: number): string => String(exponent).replace('-', '\u2212')
