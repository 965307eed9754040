/** An exact positive ratio of whole numbers: conversion factors are combined without rounding. */
export interface Rational {
  readonly over: bigint
  readonly under: bigint
}

export const ONE: Rational = { over: 1n, under: 1n }

/** A plain decimal number, such as '0.45359237', exactly. */
export function rational(decimal: string): Rational {
  const [whole = '', fraction = ''] = decimal.split('.')
  return { over: BigInt(whole + fraction), under: 10n ** BigInt(fraction.length) }
}

/** a · b^exponent, for a whole exponent. */
export function timesPower(a: Rational, b: Rational, exponent: number): Rational {
  const power = BigInt(Math.abs(exponent))
  const [over, under] = exponent < 0 ? [b.under, b.over] : [b.over, b.under]
  return { over: a.over * over ** power, under: a.under * under ** power }
}

const DIGITS = 34

/**
 * The double nearest to the ratio. It is divided out to at least 34 significant digits and read as a decimal, so powers of
 * ten and conversion factors of the trade come out as if typed: (cm)^4 is exactly the double 1e-8.
 */
export function toNumber({ over, under }: Rational): number {
  const shift = DIGITS + under.toString().length - over.toString().length
  const quotient = shift >= 0 ? (over * 10n ** BigInt(shift)) / under : over / (under * 10n ** BigInt(-shift))
  return Number(`${quotient.toString()}e${String(-shift)}`)
}
