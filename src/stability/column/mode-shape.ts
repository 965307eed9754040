import { dot, eigen, type Matrix } from '../dense.ts'
import { equilibrate } from '../inertia.ts'
import { StabilityError, type SolverResult } from '../result.ts'
import { columnCriticalLoad } from './column.ts'
import type { Column, Restraint } from './ends.ts'
import { countBelow } from './exact.ts'

export interface ModeShape {
  /** The critical load that the shape belongs to, N. */
  readonly load: SolverResult
  /**
   * Sideways deflection at x, m above the base, as a part of the largest one along the column, which is 1.
   *
   * @throws RangeError when x is not between 0 and L
   */
  readonly deflection: (x: number) => number
}

/** Loads that differ relatively by less than this have no shape of their own. */
const APART = 1e-10

/**
 * The shape in which a uniform column buckles at its n-th critical load: the solution of EI v'''' + P v'' = 0 that meets
 * the end conditions (Timoshenko and Gere, Theory of Elastic Stability, Art. 2.1). Error about 1e-13 of the largest deflection.
 *
 * @param column lengths in m, EI in N·m², springs in N·m/rad and N/m
 * @param n 1 for the lowest
 * @throws StabilityError as `columnCriticalLoad`, and when several modes share the load
 */
export function columnModeShape(column: Column, n = 1): ModeShape {
  const load = columnCriticalLoad(column, n)
  const kappa = column.L * Math.sqrt(load.value / column.EI)
  const sharing =
    countBelow(column, (kappa / 2) * (1 + APART / 2)) - countBelow(column, (kappa / 2) * (1 - APART / 2))
  if (sharing > 1)
    throw new StabilityError(
      `${sharing} modes share the critical load number ${n}, and any mixture of them is a mode`,
      'make the supports of the two ends slightly different',
    )
  const solution = nullVector(endConditions(column, kappa))
  const shape = (s: number) => combination(solution, deflections(kappa, s))
  const largest = largestOf(shape, (s) => combination(solution, slopes(kappa, s)), 64 * n)
  const deflection = (x: number) => {
    if (!(x >= 0 && x <= column.L)) throw new RangeError(`x is ${x}, outside the column's length ${column.L}`)
    return shape(x / column.L) / largest
  }
  return { load, deflection }
}

/*
 * v = A + B s + C f2(s) + D f3(s), with f2 = (1 − cos κs)/κ² and f3 = (κs − sin κs)/κ³: for a small load these are s²/2 and
 * s³/6, so that the four stay independent.
 */

type Four = readonly [number, number, number, number]

function deflections(kappa: number, s: number): Four {
  return [1, s, f2(kappa, s), f3(kappa, s)]
}

function slopes(kappa: number, s: number): Four {
  return [0, 1, sine(kappa, s), f2(kappa, s)]
}

/** sin κs / κ */
const sine = (kappa: number, s: number) => Math.sin(kappa * s) / kappa

function f2(kappa: number, s: number): number {
  const half = Math.sin((kappa * s) / 2) / kappa
  return 2 * half * half
}

function f3(kappa: number, s: number): number {
  const x = kappa * s
  if (x < 0.1) return (s * s * s * (1 - (x * x * (1 - (x * x * (1 - (x * x) / 72)) / 42)) / 20)) / 6
  return (x - Math.sin(x)) / (kappa * kappa * kappa)
}

/** The conditions for moment and transverse force at the base and the top, as rows for A, B, C and D. */
function endConditions({ L, EI, base, top }: Column, kappa: number): number[][] {
  return [
    row(base.rotation, L / EI, [0, 0, -1, 0], slopes(kappa, 0)),
    row(top.rotation, L / EI, [0, 0, Math.cos(kappa), sine(kappa, 1)], slopes(kappa, 1)),
    ...transverse(base.translation, top.translation, (L * L * L) / EI, kappa),
  ]
}

/**
 * The transverse force v''' + κ² v' = κ² B + D is the same along the column. So the two ends' springs balance each other,
 * which is one condition; the other is that of the weaker spring, where the two would be nearly the same one.
 */
function transverse(base: Restraint, top: Restraint, scale: number, kappa: number): number[][] {
  const force: Four = [0, kappa * kappa, 0, 1]
  const reversed: Four = [0, -kappa * kappa, 0, -1]
  const [below, above] = [deflections(kappa, 0), deflections(kappa, 1)]
  const baseRow = row(base, scale, force, below)
  const topRow = row(top, scale, reversed, above)
  if (base === 'fixed' || top === 'fixed') return [baseRow, topRow]
  const [k, l] = [base === 'free' ? 0 : base, top === 'free' ? 0 : top]
  const balance = below.map((value, i) => k * value + l * (above[i] as number))
  return [k < l ? baseRow : topRow, balance]
}

/** What the member and the spring bring to the end, or the movement itself when it is held. */
function row(spring: Restraint, scale: number, member: Four, movement: Four): number[] {
  if (spring === 'fixed') return [...movement]
  const stiffness = spring === 'free' ? 0 : spring * scale
  return member.map((value, i) => value + stiffness * (movement[i] as number))
}

const combination = (solution: readonly number[], functions: Four) =>
  functions.reduce((sum, value, i) => sum + value * (solution[i] as number), 0)

/**
 * The vector that a singular matrix sends to zero: the eigenvectors of [0 A; Aᵀ 0] with the two eigenvalues nearest to zero
 * have a multiple of it in their lower halves. Unlike AᵀA this keeps all digits.
 */
function nullVector(A: Matrix): number[] {
  const { scaled, columns } = equilibrate(A)
  const none = scaled.map(() => 0)
  const { values, vectors } = eigen([
    ...scaled.map((row) => [...none, ...row]),
    ...scaled.map((_, j) => [...scaled.map((row) => row[j] as number), ...none]),
  ])
  const lower = values
    .map((value, i) => ({ size: Math.abs(value), half: (vectors[i] as number[]).slice(A.length) }))
    .sort((p, q) => p.size - q.size)
    .slice(0, 2)
    .map(({ half }) => half)
  const longest = lower.reduce((best, half) => (dot(half, half) > dot(best, best) ? half : best))
  return longest.map((value, i) => value * (columns[i] as number))
}

/** The value of largest magnitude on [0, 1]: at an end or where the slope changes sign. */
function largestOf(shape: (s: number) => number, slope: (s: number) => number, steps: number): number {
  const candidates = [0, 1]
  for (let i = 0; i < steps; i++) {
    let [low, high] = [i / steps, (i + 1) / steps]
    const before = slope(low)
    if (before * slope(high) >= 0) continue
    for (let halving = 0; halving < 40; halving++) {
      const middle = (low + high) / 2
      if (before * slope(middle) > 0) low = middle
      else high = middle
    }
    candidates.push(low)
  }
  return candidates
    .map(shape)
    .reduce((best, value) => (Math.abs(value) > Math.abs(best) * (1 + 1e-9) ? value : best), 0)
}
