/** A positive decimal number d₁.d₂d₃… × 10^exponent. */
export interface Decimal {
  readonly digits: string
  readonly exponent: number
}

/**
 * Digits taken from a double before it is rounded for showing. A double carries 15 to 17; the last ones are noise of the
 * arithmetic, which would make 12.345 (held as 12.3449999999999997) round down on one machine and up on another.
 */
const CARRIED = 14

/** The size of a finite number to 14 significant digits, or with `exact` to every digit that tells it from its neighbours. */
export function toDecimal(value: number, exact = false): Decimal {
  const size = Math.abs(value)
  const [mantissa = '0', exponent = '0'] = (
    exact ? size.toExponential() : size.toExponential(CARRIED - 1)
  ).split('e')
  return { digits: mantissa.replace('.', ''), exponent: Number(exponent) }
}

/** Rounded to `kept` digits, half away from zero; 9.99 to two digits gives 100 with the exponent one higher. */
export function roundDecimal({ digits, exponent }: Decimal, kept: number): Decimal {
  if (kept >= digits.length) return { digits: digits.padEnd(kept, '0'), exponent }
  if (kept < 0) return { digits: '0', exponent: exponent - kept }
  const head = `0${digits.slice(0, kept)}`
  if ((digits[kept] ?? '0') < '5')
    return kept === 0 ? { digits: '0', exponent: exponent + 1 } : { digits: head.slice(1), exponent }
  const raised = increment(head)
  return raised.startsWith('0')
    ? { digits: raised.slice(1), exponent }
    : { digits: raised, exponent: exponent + 1 }
}

/** The next whole number, as digits. The first digit is 0, so that there is room for the carry. */
function increment(digits: string): string {
  const nines = /9*$/.exec(digits)?.[0].length ?? 0
  const at = digits.length - nines - 1
  return digits.slice(0, at) + String(Number(digits[at]) + 1) + '0'.repeat(nines)
}

/** Written out: whole part and fraction, without exponent. */
export function plainDigits({ digits, exponent }: Decimal): { whole: string; fraction: string } {
  if (exponent < 0) return { whole: '0', fraction: '0'.repeat(-exponent - 1) + digits }
  const whole = digits.slice(0, exponent + 1).padEnd(exponent + 1, '0')
  return { whole, fraction: digits.slice(exponent + 1) }
}

/** Whole digits in groups of three from the right, from four digits up. */
export function groupDigits(whole: string, separator: string): string {
  if (whole.length < 4) return whole
  return whole.replaceAll(/\B(?=(?:\d{3})+$)/g, separator)
}
