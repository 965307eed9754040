const SUPERSCRIPTS = '⁰¹²³⁴⁵⁶⁷⁸⁹'

/** Roots come out as floating-point exponents; within this of a ratio of small whole numbers they are printed as one. */
const NEARNESS = 1e-9
const LARGEST_DENOMINATOR = 12

/** `2`, `-3`, `1/2`, `2/3`; a decimal when the exponent is no such ratio. */
export function exponentText(exponent: number): string {
  for (let under = 1; under <= LARGEST_DENOMINATOR; under++) {
    const over = Math.round(exponent * under)
    if (Math.abs(exponent * under - over) < NEARNESS * under) {
      return under === 1 ? String(over) : `${String(over)}/${String(under)}`
    }
  }
  return String(exponent)
}

/** A whole number in raised digits: `⁻⁴`. */
export function raised(whole: number): string {
  let text = whole < 0 ? '⁻' : ''
  for (const digit of String(Math.abs(whole))) text += SUPERSCRIPTS[Number(digit)] ?? digit
  return text
}

/** What follows a unit or base: nothing for 1, `²`, `⁻¹`, and `^(1/2)` for a power that has no raised form. */
export function raisedExponent(exponent: number): string {
  const text = exponentText(exponent)
  if (text === '1') return ''
  return /^-?\d+$/.test(text) ? raised(Number(text)) : `^(${text})`
}

/** Reads raised digits as a whole number; undefined when `text` is none. */
export function readRaised(text: string): number | undefined {
  const negative = text.startsWith('⁻')
  let whole = 0
  const digits = [...(negative ? text.slice(1) : text)]
  for (const digit of digits) {
    const value = SUPERSCRIPTS.indexOf(digit)
    if (value < 0) return undefined
    whole = whole * 10 + value
  }
  return digits.length === 0 ? undefined : negative ? -whole : whole
}
