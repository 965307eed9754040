import { raised } from './exponent.ts'
import { groupDigits, plainDigits, roundDecimal, toDecimal } from './decimal.ts'

const DECIMALS = 3
/** No double lies nearer to 1 than 1.1e-16. */
const MOST_DECIMALS = 17

/** From here on the three decimals say nothing; powers of ten are used. */
const PLAIN_BELOW = 1e7

/**
 * A utilisation to three decimals, and to as many more as it takes not to read as exactly 1 when it is not: 1.0004 and
 * 0.99996 keep their digits, so that neither a pass nor a failure is made by rounding. Throws a RangeError for a value that
 * is not finite.
 */
export function showUtilisation(utilisation: number): string {
  if (!Number.isFinite(utilisation))
    throw new RangeError(`a utilisation of ${String(utilisation)} cannot be shown`)
  if (Math.abs(utilisation) >= PLAIN_BELOW) return inPowersOfTen(utilisation)
  let decimals = DECIMALS
  let text = toDecimals(utilisation, decimals)
  while (utilisation !== 1 && Number(text) === 1 && decimals < MOST_DECIMALS)
    text = toDecimals(utilisation, ++decimals)
  const [whole = '', fraction = ''] = text.split('.')
  const sign = utilisation < 0 && Number(text) !== 0 ? '\u2212' : ''
  return `${sign}${groupDigits(whole, '\u202f')}.${fraction}`
}

function toDecimals(value: number, decimals: number): string {
  if (value === 0) return `0.${'0'.repeat(decimals)}`
  const full = toDecimal(value, true)
  const { whole, fraction } = plainDigits(roundDecimal(full, full.exponent + 1 + decimals))
  return `${whole}.${fraction.slice(0, decimals).padEnd(decimals, '0')}`
}

function inPowersOfTen(value: number): string {
  const { digits, exponent } = roundDecimal(toDecimal(value, true), DECIMALS + 1)
  const sign = value < 0 ? '\u2212' : ''
  return `${sign}${digits.slice(0, 1)}.${digits.slice(1, DECIMALS + 1)}×10${raised(exponent)}`
}
