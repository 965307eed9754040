import { groupDigits, plainDigits, roundDecimal, toDecimal, type Decimal } from './decimal.ts'
import { sameDimension, type Dimension } from './dimension.ts'
import { raised } from './exponent.ts'
import { displayUnit, type Profile } from './profile.ts'
import { fromSi, toSi, unitFactor, unitGap, unitText, type UnitExpression } from './units.ts'

export { showUtilisation } from './show-utilisation.ts'

/** A value in coherent SI units. */
export interface Quantified {
  readonly si: number
  readonly dimension: Dimension
}

export interface ShowOptions {
  /** The unit asked for (`to UNIT`); else the profile chooses. */
  readonly unit?: UnitExpression | undefined
  /** Significant figures; the digits of the whole part are always all shown. */
  readonly figures?: number | undefined
  /** A number as its author typed it, which keeps its digits and its unit: `4.60 m`. */
  readonly asTyped?: { readonly text: string; readonly unit: UnitExpression } | undefined
  /** The kind of quantity, where more than the dimension is known; see kinds.ts. */
  readonly kind?: string | undefined
}

/** A quantity ready for print. */
export interface Shown {
  /** Digits with U+2212 minus and U+202F (narrow no-break space) between groups of three; the mantissa when `exponent` is there. */
  readonly number: string
  /** The number is to be multiplied by ten to this power. */
  readonly exponent?: number
  readonly unit: UnitExpression
  readonly unitText: string
  /** The whole in plain text, with ordinary spaces and hyphen: `-1 235 kN`, `1.2×10⁻⁵ K⁻¹`, `30°`. */
  readonly text: string
}

const FIGURES = 4
/** A ratio below one is shown to three decimals (0.734), in the company of 1.234. */
const FIGURES_OF_FRACTION = 3
/** Powers of ten written out, from 0.001 to below ten million. */
const PLAIN_FROM = -3
const PLAIN_BELOW = 7

const NARROW_SPACE = '\u202f'
const MINUS = '\u2212'

/**
 * Rounds a quantity for print: to four significant figures and never less than its whole part (12.35 kN, 1 235 kN, 12 346 kN),
 * half away from zero; a fraction without unit to three figures. Zeros at the end are kept where they are the outcome of
 * rounding (12.30 from 12.301) and left out where the value is exactly that (6 m). What is shown differs from the value by at
 * most half of its last digit. Throws a RangeError for a value that is not finite or a unit of another dimension.
 */
export function show(quantity: Quantified, profile: Profile, options: ShowOptions = {}): Shown {
  if (!Number.isFinite(quantity.si)) throw new RangeError(`${String(quantity.si)} cannot be shown`)
  const typed = options.unit === undefined ? keptAsTyped(quantity, options.asTyped) : undefined
  if (typed !== undefined) return typed
  const unit = options.unit ?? displayUnit(quantity, profile, options.kind)
  if (options.unit !== undefined) requireDimension(quantity, unit)
  const value = fromSi(quantity.si, unit)
  const bare = unit.length === 0
  const figures = (exponent: number) =>
    options.figures ?? (bare && exponent < 0 ? FIGURES_OF_FRACTION : FIGURES)
  return compose(value < 0, rounded(value, figures), unit)
}

function requireDimension({ dimension }: Quantified, unit: UnitExpression): void {
  if (!sameDimension(dimension, unitFactor(unit).dimension)) {
    throw new RangeError(
      `a quantity of dimension [${dimension.join(', ')}] cannot be shown in ${unitText(unit) || 'no unit'}`,
    )
  }
}

interface Mantissa {
  readonly whole: string
  readonly fraction: string
  readonly exponent?: number
}

function rounded(value: number, figures: (exponent: number) => number): Mantissa {
  if (value === 0) return { whole: '0', fraction: '' }
  const full = toDecimal(value)
  const plain = toFigures(full, (exponent) => Math.max(figures(exponent), exponent + 1))
  if (plain.exponent >= PLAIN_FROM && plain.exponent < PLAIN_BELOW) return trimmed(plain, full)
  const scientific = toFigures(full, figures)
  return { ...trimmed({ ...scientific, exponent: 0 }, full), exponent: scientific.exponent }
}

/** Rounded to its figures; a carry (9.9996 to 10.000) that adds a figure gives up the last zero again. */
function toFigures(full: Decimal, figures: (exponent: number) => number): Decimal {
  const result = roundDecimal(full, figures(full.exponent))
  if (result.exponent === full.exponent) return result
  return { ...result, digits: result.digits.slice(0, figures(result.exponent)) }
}

/** Without zeros at the end of the fraction when nothing was rounded off. */
function trimmed(result: Decimal, full: Decimal): Mantissa {
  const { whole, fraction } = plainDigits(result)
  const isExact =
    /^0*$/.test(full.digits.slice(result.digits.length)) && full.digits.startsWith(result.digits)
  return { whole, fraction: isExact ? fraction.replace(/0+$/, '') : fraction }
}

const TYPED = /^([-−]?)(\d*)(?:\.(\d*))?(?:[eE]([+-]?\d+))?$/
/** A typed number stands for its value when both agree to this, relatively; else the value is shown. */
const AGREEMENT = 1e-12

function keptAsTyped(quantity: Quantified, typed: ShowOptions['asTyped']): Shown | undefined {
  if (typed === undefined) return undefined
  const match = TYPED.exec(typed.text.trim())
  if (match === null || !sameDimension(quantity.dimension, unitFactor(typed.unit).dimension)) return undefined
  const si = toSi(Number(typed.text.trim().replace('−', '-')), typed.unit)
  if (!(Math.abs(si - quantity.si) <= AGREEMENT * Math.abs(quantity.si))) return undefined
  const [, sign, whole = '', fraction = '', exponent] = match
  const mantissa: Mantissa = { whole: whole || '0', fraction }
  return compose(
    sign !== '',
    exponent === undefined ? mantissa : { ...mantissa, exponent: Number(exponent) },
    typed.unit,
  )
}

function compose(negative: boolean, { whole, fraction, exponent }: Mantissa, unit: UnitExpression): Shown {
  const tail = fraction === '' ? '' : `.${fraction}`
  const isNegative = negative && /[1-9]/.test(whole + fraction)
  const power = exponent === undefined ? '' : `×10${raised(exponent)}`
  const { text: unitAsText, gap } = unitFacts(unit)
  return {
    number: (isNegative ? MINUS : '') + groupDigits(whole, NARROW_SPACE) + tail,
    ...(exponent === undefined ? {} : { exponent }),
    unit,
    unitText: unitAsText,
    text: (isNegative ? '-' : '') + groupDigits(whole, ' ') + tail + power + gap + unitAsText,
  }
}

const facts = new WeakMap<UnitExpression, { text: string; gap: string }>()

function unitFacts(unit: UnitExpression): { text: string; gap: string } {
  let found = facts.get(unit)
  if (found === undefined) facts.set(unit, (found = { text: unitText(unit), gap: unitGap(unit) }))
  return found
}
