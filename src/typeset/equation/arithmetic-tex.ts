import type { Formula } from '../../calculate/types.ts'
import {
  bracketed,
  enclosed,
  led,
  LEVEL,
  operand,
  withoutGroup,
  type Look,
  type Print,
  type Printing,
} from './print.ts'
import { rowsOf } from './rows.ts'

type Binary = Extract<Formula, { type: 'binary' }>

/** Terms from left to right: `a - b + c` is one sum, in whose rest a sum or a minus needs brackets. */
export function printSum(formula: Binary, printing: Printing): Print {
  const terms: Print[] = []
  let rest: Formula = formula
  while (rest.type === 'binary' && (rest.operator === '+' || rest.operator === '-')) {
    const term = operand(printing.print(rest.right, printing), LEVEL.product)
    terms.unshift(led(term, rest.operator, `{}${rest.operator}`))
    rest = rest.left
  }
  const first = operand(printing.print(rest, printing), LEVEL.product, true)
  return joined([first, ...terms], LEVEL.sum)
}

function joined(pieces: readonly Print[], level: number): Print {
  const [first, last] = [pieces[0], pieces.at(-1)]
  return {
    tex: pieces.map(({ tex }) => tex).join(''),
    level,
    look: pieces.length === 1 && last ? last.look : 'other',
    ...(first?.signed ? { signed: true } : {}),
    ...(pieces.some(({ tall }) => tall) ? { tall: true } : {}),
    split: () => pieces,
  }
}

/** Factors from left to right, each with the sign that its neighbours need. */
export function printProduct(formula: Binary, printing: Printing): Print {
  const factors: Print[] = []
  let rest: Formula = formula
  while (rest.type === 'binary' && rest.operator === '*') {
    factors.unshift(operand(printing.print(rest.right, printing), LEVEL.power))
    rest = rest.left
  }
  factors.unshift(operand(printing.print(rest, printing), LEVEL.power, true))
  const pieces = factors.map((factor, i) => {
    const before = factors[i - 1]
    if (before === undefined) return factor
    const sign = printing.mode === 'numbers' ? '\\times ' : signBetween(before.look, factor.look)
    const shown = sign === THIN ? '\\cdot ' : sign
    return { ...led(factor, sign, `{}${shown}`), isFactor: true }
  })
  return { ...joined(pieces, LEVEL.product), look: factors.at(-1)?.look ?? 'other' }
}

const THIN = '\\,'

/**
 * Between symbols a thin space; a cross between numbers (ISO 80000-2 and NIST SP 811, 10.5.4, where the decimal sign is a
 * point); a dot wherever a thin space could be read as something else: a call, a mixed number, one word, a unit.
 */
function signBetween(left: Look, right: Look): string {
  if (right === 'number' || right === 'quantity')
    return left === 'number' || left === 'quantity' ? '\\times ' : '\\cdot '
  const clear: Readonly<Partial<Record<Look, readonly Look[]>>> = {
    number: ['symbol', 'bracket', 'call', 'root'],
    symbol: ['symbol', 'call', 'root'],
    bracket: ['symbol', 'bracket', 'call', 'root'],
    fraction: ['symbol', 'bracket', 'call', 'root'],
    root: ['symbol', 'bracket', 'call', 'root'],
  }
  return clear[left]?.includes(right) ? THIN : '\\cdot '
}

/** A stacked fraction; inside one, or in an exponent, a quotient with a slash. */
export function printQuotient(formula: Binary, printing: Printing): Print {
  return printing.inline ? slashed(formula, printing) : stacked(formula, printing)
}

function stacked({ left, right }: Binary, printing: Printing): Print {
  const inner = { ...printing, inline: true }
  const over = printing.print(withoutGroup(left), inner)
  const under = printing.print(withoutGroup(right), inner)
  return {
    tex: `\\frac{${over.tex}}{${under.tex}}`,
    level: LEVEL.power,
    look: 'fraction',
    tall: true,
    within: (width) => inRows(over, under, width - FRACTION_BAR),
  }
}

/** How much a fraction's bar is wider than what stands over and under it, in em. */
const FRACTION_BAR = 0.3

/** A fraction wider than the lane, its numerator and denominator each in as many rows as it takes. */
function inRows(over: Print, under: Print, width: number): Print {
  const part = (print: Print) => {
    const rows = rowsOf(print, width, width - 1)
    if (rows.length === 1) return rows[0] ?? ''
    const lines = rows.map((row, i) => (i === 0 ? `&${row}` : `&\\quad ${row}`))
    return `\\begin{aligned}${lines.join('\\\\')}\\end{aligned}`
  }
  return { tex: `\\frac{${part(over)}}{${part(under)}}`, level: LEVEL.power, look: 'fraction', tall: true }
}

function slashed({ left, right }: Binary, printing: Printing): Print {
  const over = printing.print(withoutGroup(left), printing)
  const under = printing.print(withoutGroup(right), printing)
  const isClear = over.level >= LEVEL.power || (over.level === LEVEL.product && isUnitless(left, printing))
  const numerator = isClear && over.look !== 'quantity' ? over : bracketed(over)
  const denominator =
    under.level >= LEVEL.power && !under.signed && under.look !== 'quantity' ? under : bracketed(under)
  return {
    tex: `${numerator.tex}/${denominator.tex}`,
    level: LEVEL.product,
    look: 'other',
    ...(numerator.signed ? { signed: true } : {}),
    ...(numerator.tall || denominator.tall ? { tall: true } : {}),
    split: () => [numerator, led(denominator, '/')],
  }
}

/** Whether a product stays legible before a slash: in numbers its last unit could be read as divided. */
function isUnitless(formula: Formula, printing: Printing): boolean {
  const product = withoutGroup(formula)
  return product.type === 'binary' && product.operator === '*' && printing.mode === 'symbols'
}

export function printPower({ left, right }: Binary, printing: Printing): Print {
  const base = printing.print(left, printing)
  const exponent = printing.print(withoutGroup(right), { ...printing, inline: true })
  const takesPower =
    base.level === LEVEL.atom &&
    !base.signed &&
    (base.look === 'bracket' ||
      base.look === 'symbol' ||
      (base.look === 'number' && !base.tex.includes('\\,')))
  const body = takesPower ? base : bracketed(base)
  return {
    tex: `${body.tex}^{${exponent.tex}}`,
    level: LEVEL.power,
    look: body.look,
    ...(body.tall ? { tall: true } : {}),
    ...(body.split ? { split: () => enclosed(body, '', `^{${exponent.tex}}`).split?.() ?? [body] } : {}),
  }
}

export function printSign(formula: Extract<Formula, { type: 'unary' }>, printing: Printing): Print {
  if (formula.operator === 'not') {
    const body = operand(printing.print(formula.body, printing), LEVEL.atom)
    return {
      tex: `\\text{not }${body.tex}`,
      level: LEVEL.power,
      look: 'other',
      ...(body.tall ? { tall: true } : {}),
    }
  }
  const body = printing.print(formula.body, printing)
  if (formula.operator === '+') return body
  return { ...enclosed(operand(body, LEVEL.power), '-'), level: LEVEL.power, look: body.look, signed: true }
}
