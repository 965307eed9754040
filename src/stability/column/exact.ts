import { negativeCount } from '../inertia.ts'
import type { Column } from './ends.ts'
import { addProduct, freeMotions, springStiffness } from './motions.ts'

/*
 * A column under the load P with h = (L/2)·sqrt(P/EI). The exact stiffness of the uniform member in compression is written
 * with φ1 = h·cot h and φ2 = h²/(3(1 − φ1)) (Livesley's stability functions; Timoshenko and Gere, Art. 2.4, in other
 * letters). Displacements are made dimensionless with L, stiffnesses with EI/L, so that only h and the springs matter.
 */

function phi1(h: number): number {
  return h < 1e-4 ? 1 - (h * h) / 3 : (h * Math.cos(h)) / Math.sin(h)
}

/** φ2; below h = 0.3 by its series, where 1 − φ1 loses digits (the first term left out is below 1e-14). */
function phi2(h: number): number {
  if (h >= 0.3) return (h * h) / (3 * (1 - phi1(h)))
  const x = h * h
  return (
    1 /
    (1 +
      x *
        (1 / 15 +
          x * (2 / 315 + x * (1 / 1575 + x * (2 / 31185 + x * (1382 / 212837625 + x * (4 / 6081075)))))))
  )
}

/**
 * Negative eigenvalues of the dimensionless stiffness of the free motions under the load given by h. The member's part is
 * 12 φ2 in the S and 4 φ1 in the bow; where one of them is large (a pole lies near) it enters by its reciprocal in a
 * bordered matrix, whose negative eigenvalues are those of the stiffness and one more when the large part is positive.
 */
function negativeStiffness(column: Column, h: number): number {
  const motions = freeMotions(column)
  const part = (at: number) => motions.map((motion) => motion[at] as number)
  const K = springStiffness(column, motions)
  addProduct(K, -4 * h * h, part(2))
  const one = phi1(h)
  const borders: { row: number[]; corner: number }[] = []
  for (const { row, value, inverse } of [
    { row: part(0), value: 12 * phi2(h), inverse: (1 - one) / (4 * h * h) },
    { row: part(1), value: 4 * one, inverse: Math.tan(h) / (4 * h) },
  ]) {
    if (Math.abs(value) <= 100) addProduct(K, value, row)
    else borders.push({ row, corner: -inverse })
  }
  const bordered = [
    ...K.map((row, i) => [...row, ...borders.map((border) => border.row[i] as number)]),
    ...borders.map(({ row, corner }, k) => [...row, ...borders.map((_, j) => (j === k ? corner : 0))]),
  ]
  return negativeCount(bordered) - borders.filter(({ corner }) => corner < 0).length
}

/**
 * Critical loads of the member with both ends clamped that lie below h: roots of sin h = 0 and of tan h = h, that is of
 * φ1 = 1. Decided by the same computed sin h and φ1 as the stiffness, so that the two agree beside a pole.
 */
function clampedBelow(h: number): number {
  const nearest = Math.round(h / Math.PI)
  const beside = Math.abs(h - nearest * Math.PI) < 1e-6
  const signOf = (k: number) => (k % 2 === 0 ? 1 : -1)
  const whole = !beside
    ? Math.floor(h / Math.PI)
    : Math.sign(Math.sin(h)) === signOf(nearest)
      ? nearest
      : nearest - 1
  if (whole <= 0) return 0
  return whole + (whole - 1) + (phi1(h) < 1 ? 1 : 0)
}

/**
 * The number of critical loads below the load given by h: clamped ones plus negative eigenvalues of the exact stiffness
 * (Wittrick and Williams, Quarterly Journal of Mechanics and Applied Mathematics 24, 1971). No mode can be missed by it.
 */
export function countBelow(column: Column, h: number): number {
  return clampedBelow(h) + negativeStiffness(column, h)
}
