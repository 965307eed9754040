import type { ScaledEnergy } from './energy.ts'

/*
 * Derivatives from values of the energy alone: the second routes use these, so that a wrong symbolic derivative cannot pass.
 * Central differences of fourth order with steps of about a hundredth of each coordinate's size; relative error about 1e-8.
 */
const STEP = 1 / 64
/** Weights at −2, −1, 0, 1, 2 steps. */
const FIRST = [1 / 12, -2 / 3, 0, 2 / 3, -1 / 12]
const SECOND = [-1 / 12, 4 / 3, -5 / 2, 4 / 3, -1 / 12]

function shifted(x: readonly number[], steps: readonly (readonly [number, number])[]): number[] {
  const moved = [...x]
  for (const [i, by] of steps) moved[i] = (moved[i] as number) + by
  return moved
}

/** One step of Richardson's extrapolation on a formula of fourth order. */
function extrapolated(formula: (h: number) => number): number {
  return (16 * formula(STEP / 2) - formula(STEP)) / 15
}

export function differenceGradient(energy: ScaledEnergy, x: readonly number[], load: number): number[] {
  return x.map((_, i) =>
    extrapolated(
      (h) =>
        FIRST.reduce(
          (sum, w, k) => (w === 0 ? sum : sum + w * energy.value(shifted(x, [[i, (k - 2) * h]]), load)),
          0,
        ) / h,
    ),
  )
}

export function differenceHessian(energy: ScaledEnergy, x: readonly number[], load: number): number[][] {
  const n = x.length
  const H = Array.from({ length: n }, () => new Array<number>(n).fill(0))
  for (let i = 0; i < n; i++) {
    for (let j = i; j < n; j++) {
      const value = extrapolated((h) =>
        i === j ? second(energy, x, load, i, h) : mixed(energy, x, load, i, j, h),
      )
      ;(H[i] as number[])[j] = value
      ;(H[j] as number[])[i] = value
    }
  }
  return H
}

function second(energy: ScaledEnergy, x: readonly number[], load: number, i: number, h: number): number {
  return (
    SECOND.reduce((sum, w, k) => sum + w * energy.value(shifted(x, [[i, (k - 2) * h]]), load), 0) / (h * h)
  )
}

function mixed(
  energy: ScaledEnergy,
  x: readonly number[],
  load: number,
  i: number,
  j: number,
  h: number,
): number {
  let sum = 0
  for (const [a, wa] of FIRST.entries())
    for (const [b, wb] of FIRST.entries()) {
      if (wa !== 0 && wb !== 0)
        sum +=
          wa *
          wb *
          energy.value(
            shifted(x, [
              [i, (a - 2) * h],
              [j, (b - 2) * h],
            ]),
            load,
          )
    }
  return sum / (h * h)
}
