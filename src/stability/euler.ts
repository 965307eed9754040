import { expectPositive } from './result.ts'

/**
 * Elastic critical load of a uniform, straight, elastic column with both ends pinned (Euler, 1744; for example Timoshenko and
 * Gere, Theory of Elastic Stability, Art. 2.1): N = π² E I / L².
 *
 * @param E modulus of elasticity, Pa, above zero
 * @param I second moment of area about the axis of bending, m⁴, above zero
 * @param L length between pins, or effective length, m, above zero
 * @returns N; exact for the stated assumptions
 * @throws StabilityError when an argument is not above zero and finite
 */
export function eulerLoad(E: number, I: number, L: number): number {
  expectPositive(E, 'the modulus of elasticity')
  expectPositive(I, 'the second moment of area')
  expectPositive(L, 'the length')
  return (Math.PI * Math.PI * E * I) / (L * L)
}
