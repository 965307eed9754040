/**
 * A physical dimension as exponents of the SI base quantities, in the order mass (kg), length (m), time (s),
 * temperature (K). An angle is dimensionless (rad = 1), so a rotational stiffness in kN·m/rad times an angle is a moment.
 * Exponents may be fractions (a square root halves them).
 */
export type Dimension = readonly [mass: number, length: number, time: number, temperature: number]

export const DIMENSIONLESS: Dimension = [0, 0, 0, 0]

/** Exponents closer than this are the same; 1/3 + 1/3 + 1/3 must come back to 1. */
const EXPONENT_TOLERANCE = 1e-9

export function sameDimension(a: Dimension, b: Dimension): boolean {
  return a.every((exponent, i) => Math.abs(exponent - (b[i] ?? 0)) < EXPONENT_TOLERANCE)
}

export function isDimensionless(dimension: Dimension): boolean {
  return sameDimension(dimension, DIMENSIONLESS)
}
