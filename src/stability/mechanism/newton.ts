import { largest, solve, times, type Matrix } from '../dense.ts'
import type { ScaledEnergy } from './energy.ts'

export interface Root {
  readonly x: number[]
  readonly iterations: number
  /** Largest entry of the gradient over the stiffness of the unloaded state. */
  readonly residual: number
}

/** A gradient this small beside the stiffness, in scaled coordinates, is zero. */
export const BALANCED = 1e-12

/**
 * Newton's method for a state of equilibrium under a load, with the step halved until the gradient shrinks. Undefined when
 * it does not get there.
 *
 * @param stiffness the largest stiffness of the unloaded state, against which forces are small or large
 */
export function equilibriumNear(
  energy: ScaledEnergy,
  start: readonly number[],
  load: number,
  stiffness: number,
  maxIterations = 60,
): Root | undefined {
  let x = [...start]
  let g = energy.gradient(x, load)
  for (let iterations = 0; iterations <= maxIterations; iterations++) {
    const H = energy.hessian(x, load)
    const residual = largest(g) / stiffness
    if (!Number.isFinite(residual)) return undefined
    if (residual <= BALANCED) return { x: polished(H, g, x), iterations, residual }
    const full = solve(H, g)
    if (!full) return undefined
    const size = largest(full)
    // A long Newton step leaves the region where the linearisation means anything.
    let factor = size > 0.5 ? 0.5 / size : 1
    const before = sumOfSquares(g)
    let moved: number[] | undefined
    for (let halving = 0; halving < 30; halving++, factor /= 2) {
      const trial = x.map((value, i) => value - factor * (full[i] as number))
      const gradient = energy.gradient(trial, load)
      if (sumOfSquares(gradient) < before) {
        moved = trial
        g = gradient
        break
      }
    }
    if (!moved) return residual < 1e-9 ? { x, iterations, residual } : undefined
    x = moved
  }
  return undefined
}

/** One more Newton step costs nothing and squares what is left. */
function polished(H: Matrix, g: readonly number[], x: readonly number[]): number[] {
  const step = solve(H, g)
  return step && largest(step) < 1e-6 ? x.map((value, i) => value - (step[i] as number)) : [...x]
}

function sumOfSquares(v: readonly number[]): number {
  return v.reduce((sum, value) => sum + value * value, 0)
}

/** vᵀ A w */
export function form(v: readonly number[], A: Matrix, w: readonly number[]): number {
  return times(A, w).reduce((sum, value, i) => sum + value * (v[i] as number), 0)
}
