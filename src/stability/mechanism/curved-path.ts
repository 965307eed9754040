import { dot, eigen, largest, solve, type Matrix } from '../dense.ts'
import { secondRoute, StabilityError } from '../result.ts'
import type { CriticalLoad } from './critical.ts'
import type { ScaledEnergy } from './energy.ts'
import { differenceGradient, differenceHessian } from './finite-difference.ts'

/* The fundamental path when the structure moves from the first load on: followed by arc length (Riks; Crisfield, Non-linear
 * Finite Element Analysis, vol. 1, ch. 9). A point is (x, λ) with λ = load/reference. */

interface PathPoint {
  readonly x: number[]
  readonly lambda: number
  /** Unit tangent in (x, λ). */
  readonly tangent: number[]
  /** Negative eigenvalues of the Hessian. */
  readonly negative: number
}

const FIRST_STEP = 0.01
const LARGEST_STEP = 0.05
const MAX_STEPS = 4000
/** The path is followed until a coordinate has changed by this many sizes (an angle: half a turn). */
const REACH = Math.PI

/**
 * The n-th singular point of the Hessian along the curved fundamental path.
 *
 * @throws StabilityError when the path cannot be followed or has no such point within reach
 */
export function curvedPathPoint(
  energy: ScaledEnergy,
  x0: readonly number[],
  n: number,
  reference: number,
): CriticalLoad {
  const path = new Path(energy, reference, largest(energy.hessian(x0, 0)))
  let point = path.start(x0)
  let step = FIRST_STEP
  let found = 0
  for (let i = 0; i < MAX_STEPS; i++) {
    const next = path.advance(point, step)
    if (!next) {
      step /= 2
      if (step < 1e-9) break
      continue
    }
    if (next.negative !== point.negative) {
      found += 1
      if (found === n) return located(energy, path, point, step, reference, x0)
    }
    if (largest(next.x.map((value, k) => value - (x0[k] as number))) > REACH) break
    point = next
    step = Math.min(step * 1.3, LARGEST_STEP)
  }
  throw new StabilityError(
    `critical load number ${n} was asked for, and the path has ${found} within half a turn of its start`,
    'check the sign of the load’s work in the energy; a structure that only stiffens has no critical load',
    'solver',
  )
}

class Path {
  readonly energy: ScaledEnergy
  readonly reference: number
  /** The largest stiffness of the unloaded state: what forces are held against. */
  readonly stiffness: number

  constructor(energy: ScaledEnergy, reference: number, stiffness: number) {
    this.energy = energy
    this.reference = reference
    this.stiffness = stiffness
  }

  start(x0: readonly number[]): PathPoint {
    const up = new Array<number>(x0.length + 1).fill(0)
    up[x0.length] = 1
    return this.pointAt([...x0], 0, up)
  }

  /** One step of the given arc length; undefined when the corrector does not come back to the path. */
  advance(from: PathPoint, length: number): PathPoint | undefined {
    const { energy, reference } = this
    const n = from.x.length
    let x = from.x.map((value, i) => value + length * (from.tangent[i] as number))
    let lambda = from.lambda + length * (from.tangent[n] as number)
    for (let iteration = 0; iteration < 12; iteration++) {
      const load = lambda * reference
      const g = energy.gradient(x, load)
      const H = energy.hessian(x, load)
      const residual = largest(g) / this.stiffness
      const gap =
        dot(from.tangent, [...x.map((value, i) => value - (from.x[i] as number)), lambda - from.lambda]) -
        length
      if (residual < 1e-13 && Math.abs(gap) < 1e-12) return this.turnedRight(from, x, lambda)
      const change = solve(this.bordered(H, x, load, from.tangent), [...g, gap * this.stiffness])
      if (!change) return undefined
      x = x.map((value, i) => value - (change[i] as number))
      lambda -= change[n] as number
      if (!Number.isFinite(lambda) || largest(change) > 1) return undefined
      if (largest(change) < 1e-15) return this.turnedRight(from, x, lambda)
    }
    return undefined
  }

  private bordered(H: Matrix, x: readonly number[], load: number, tangent: readonly number[]): number[][] {
    const push = this.energy.gradient(x, load, 1).map((value) => value * this.reference)
    const scale = this.stiffness
    return [...H.map((row, i) => [...row, push[i] as number]), tangent.map((value) => value * scale)]
  }

  private turnedRight(from: PathPoint, x: number[], lambda: number): PathPoint | undefined {
    const point = this.pointAt(x, lambda, from.tangent)
    return point && dot(point.tangent, from.tangent) > 0.9 ? point : undefined
  }

  private pointAt(x: number[], lambda: number, along: readonly number[]): PathPoint {
    const load = lambda * this.reference
    const H = this.energy.hessian(x, load)
    const right = new Array<number>(x.length + 1).fill(0)
    right[x.length] = this.stiffness
    const raw = solve(this.bordered(H, x, load, along), right) ?? [...along]
    const size = Math.sqrt(dot(raw, raw))
    return {
      x,
      lambda,
      tangent: raw.map((value) => value / size),
      negative: eigen(H).values.filter((value) => value < 0).length,
    }
  }
}

/** Halves the step in which the count of negative eigenvalues changes. */
function located(
  energy: ScaledEnergy,
  path: Path,
  from: PathPoint,
  step: number,
  reference: number,
  x0: readonly number[],
): CriticalLoad {
  let [low, high] = [0, step]
  let at = from
  let iterations = 0
  for (; iterations < 60 && high - low > 1e-15; iterations++) {
    const middle = (low + high) / 2
    const point = path.advance(from, middle)
    if (!point) break
    if (point.negative === from.negative) low = middle
    else {
      high = middle
      at = point
    }
  }
  const load = at.lambda * reference
  const { values, vectors } = eigen(energy.hessian(at.x, load))
  const critical = values.reduce(
    (best, value, i) => (Math.abs(value) < Math.abs(values[best] as number) ? i : best),
    0,
  )
  const mode = vectors[critical] as number[]
  const push = energy.gradient(at.x, load, 1)
  // At a limit point the load works on the mode; at a bifurcation it does not.
  const kind = Math.abs(dot(mode, push)) > 1e-6 * Math.sqrt(dot(push, push)) ? 'limit point' : 'bifurcation'
  if (!(high - low <= 1e-9))
    throw new StabilityError(
      'the critical point could not be located on the path',
      'check the energy for terms that are not smooth',
      'solver',
    )
  const top = mode.reduce((best, value) => (Math.abs(value) > Math.abs(best) * (1 + 1e-9) ? value : best), 0)
  const second = byDifferences(energy, at, mode, load, kind, reference)
  return {
    value: load,
    route: 'path followed by arc length, eigenvalues of the exact Hessian counted',
    status: 'converged',
    iterations,
    residual: Math.abs(values[critical] as number) / largest(energy.hessian(x0, 0)),
    second: secondRoute('energy values by finite differences', second, load, 1e-6),
    mode: energy.unscaled(mode.map((value) => value / top + 0)),
    kind,
    state: energy.unscaled(at.x),
    straight: false,
  }
}

/** The critical load found again from energy values: the largest load along the mode, or where its curvature vanishes. */
function byDifferences(
  energy: ScaledEnergy,
  at: PathPoint,
  mode: readonly number[],
  load: number,
  kind: CriticalLoad['kind'],
  reference: number,
): number {
  const on = (s: number) => stateAlong(energy, at.x, mode, s, load, reference)
  if (kind === 'limit point') return topOfLoad((s) => on(s)?.load)
  const curvature = (p: number) => {
    const x = settled(energy, at.x, p, mode)
    return x
      ? dot(
          mode,
          differenceHessian(energy, x, p).map((row) => dot(row, mode)),
        )
      : NaN
  }
  const d = 1e-3 * load
  const [below, above] = [curvature(load - d), curvature(load + d)]
  return load - d + (2 * d * below) / (below - above)
}

/** The top of the load along the mode: of parabolas through three loads, ever closer until two of them agree. */
function topOfLoad(load: (s: number) => number | undefined): number {
  let before = NaN
  for (let d = 0.02; d > 1e-4; d /= 2) {
    const [a, b, c] = [load(-d), load(0), load(d)]
    if (a === undefined || b === undefined || c === undefined) continue
    const top = b - (c - a) ** 2 / (8 * (a - 2 * b + c))
    if (Math.abs(top - before) <= 1e-8 * Math.abs(top)) return top
    before = top
  }
  return before
}

/** The state with a given amount of the mode, and its load, from finite differences of the energy. */
function stateAlong(
  energy: ScaledEnergy,
  x: readonly number[],
  mode: readonly number[],
  s: number,
  load: number,
  reference: number,
): { x: number[]; load: number } | undefined {
  const n = x.length
  let at = x.map((value, i) => value + s * (mode[i] as number))
  let lambda = load / reference
  for (let iteration = 0; iteration < 30; iteration++) {
    const g = differenceGradient(energy, at, lambda * reference)
    const H = differenceHessian(energy, at, lambda * reference)
    const scale = largest(H)
    const push = differenceGradient(energy, at, (lambda + 0.5) * reference).map(
      (value, i) => (value - (g[i] as number)) * 2,
    )
    const gap =
      dot(
        mode,
        at.map((value, i) => value - (x[i] as number)),
      ) - s
    const change = solve(
      [...H.map((row, i) => [...row, push[i] as number]), [...mode.map((value) => value * scale), 0]],
      [...g, gap * scale],
    )
    if (!change) return undefined
    at = at.map((value, i) => value - (change[i] as number))
    lambda -= change[n] as number
    if (largest(change) < 1e-10) return { x: at, load: lambda * reference }
  }
  return undefined
}

/** Equilibrium near x under a load, kept off the mode, from finite differences. */
function settled(
  energy: ScaledEnergy,
  x: readonly number[],
  load: number,
  mode: readonly number[],
): number[] | undefined {
  let at = [...x]
  for (let iteration = 0; iteration < 30; iteration++) {
    const g = differenceGradient(energy, at, load)
    const H = differenceHessian(energy, at, load)
    const scale = largest(H)
    const gap = dot(
      mode,
      at.map((value, i) => value - (x[i] as number)),
    )
    const change = solve(
      [
        ...H.map((row, i) => [...row, (mode[i] as number) * scale]),
        [...mode.map((value) => value * scale), 0],
      ],
      [...g, gap * scale],
    )
    if (!change) return undefined
    at = at.map((value, i) => value - (change[i] as number))
    if (largest(change.slice(0, -1)) < 1e-10) return at
  }
  return undefined
}
