import { cholesky, eigen, generalisedEigen, largest, type Matrix } from '../dense.ts'
import { secondRoute, StabilityError, type SolverResult } from '../result.ts'
import { ScaledEnergy, type Energy } from './energy.ts'
import { differenceHessian } from './finite-difference.ts'
import { curvedPathPoint } from './curved-path.ts'
import { unloadedState } from './unloaded.ts'

export interface CriticalLoad extends SolverResult {
  /** The buckling mode in the coordinates themselves, the largest entry (in scaled coordinates) being one size. */
  readonly mode: readonly number[]
  /** `bifurcation`: another path branches off; `limit point`: the load cannot grow further along the path. */
  readonly kind: 'bifurcation' | 'limit point'
  /** The state at the critical load. */
  readonly state: readonly number[]
  /** Whether the state stays as it is unloaded until then. */
  readonly straight: boolean
}

/** The largest relative difference between the two routes that is accepted. */
const ALLOWED = 1e-6

/**
 * The n-th critical load of a structure along its fundamental path, which starts at the unloaded state.
 *
 * When that state stays in equilibrium under every load and the energy is linear in the load, all critical loads come from
 * one generalised eigenvalue problem, so none is missed. Otherwise the path is followed and the negative eigenvalues of the
 * Hessian are counted along it. Second route: the same from the energy's values alone, by finite differences.
 *
 * @returns the load in the SI unit of the energy's load
 * @throws StabilityError when nothing holds the structure, or there is no n-th critical load
 */
export function criticalLoad(source: Energy, n = 1): CriticalLoad {
  const energy = new ScaledEnergy(source)
  if (!Number.isInteger(n) || n < 1)
    throw new StabilityError(`critical load number ${n} was asked for`, 'use a whole number from 1')
  const x0 = unloadedState(energy)
  const K = energy.hessian(x0, 0)
  const reference = loadScale(energy, x0, K)
  if (isStraight(energy, x0, K, reference)) {
    return isLinear(energy, x0, reference)
      ? byEigenvalues(energy, x0, K, n)
      : byCounting(energy, x0, n, reference)
  }
  return curvedPathPoint(energy, x0, n, reference)
}

/** A load that changes the stiffness, or moves the structure, as much as the springs resist. */
export function loadScale(energy: ScaledEnergy, x0: readonly number[], K: Matrix): number {
  const softening = largest(energy.hessian(x0, 0, 1))
  const pushing = largest(energy.gradient(x0, 0, 1))
  const scale = largest(K) / Math.max(softening, pushing)
  if (Number.isFinite(scale) && scale > 0) return scale
  const later = largest(energy.hessian(x0, 1, 1))
  if (later > 0) return largest(K) / later
  throw new StabilityError(
    'the load does not act on the structure: the energy does not depend on it near the unloaded state',
    'check that the energy contains the work of the load',
  )
}

/** Whether the unloaded state stays in equilibrium under the load. */
export function isStraight(
  energy: ScaledEnergy,
  x0: readonly number[],
  K: Matrix,
  reference: number,
): boolean {
  return [0.37, 1, -1, 2.9].every(
    (factor) => largest(energy.gradient(x0, factor * reference)) <= 1e-11 * largest(K),
  )
}

function isLinear(energy: ScaledEnergy, x0: readonly number[], reference: number): boolean {
  return [0, 0.7, 2.3].every((factor) => {
    const curvature = largest(energy.hessian(x0, factor * reference, 2))
    return curvature * reference <= 1e-12 * largest(energy.hessian(x0, factor * reference, 1))
  })
}

function byEigenvalues(energy: ScaledEnergy, x0: readonly number[], K: Matrix, n: number): CriticalLoad {
  const softening = energy.hessian(x0, 0, 1).map((row) => row.map((value) => -value))
  const loads = loadsOf(softening, K)
  const found = loads.positive[n - 1]
  if (!found) throw none(n, loads.positive.length, loads.negative)
  const fd0 = differenceHessian(energy, x0, 0)
  const reach = found.load
  const fd1 = differenceHessian(energy, x0, reach)
  const fdSoftening = fd0.map((row, i) =>
    row.map((value, j) => (value - ((fd1[i] as number[])[j] as number)) / reach),
  )
  const second = loadsOf(fdSoftening, fd0).positive[n - 1]
  return {
    value: found.load,
    route: 'eigenvalues of the exact Hessian',
    status: 'converged',
    iterations: 1,
    residual: residual(energy, x0, found),
    second: secondRoute('energy values by finite differences', second?.load ?? NaN, found.load, ALLOWED),
    mode: energy.unscaled(found.mode),
    kind: 'bifurcation',
    state: energy.unscaled(x0),
    straight: true,
  }
}

interface Load {
  readonly load: number
  /** In scaled coordinates, the largest entry 1. */
  readonly mode: number[]
}

/** The loads P with det(K − P·S) = 0: the positive ones ascending, and the number of negative ones. */
function loadsOf(softening: Matrix, K: Matrix): { positive: Load[]; negative: number } {
  const pairs = generalisedEigen(softening, K)
  if (!pairs) return { positive: [], negative: 0 }
  const scale = largest(pairs.values)
  const counted = pairs.values
    .map((value, i) => ({ value, mode: normalised(pairs.vectors[i] as number[]) }))
    .filter(({ value }) => Math.abs(value) > 1e-13 * scale)
  const positive = counted.filter(({ value }) => value > 0).sort((a, b) => b.value - a.value)
  return {
    positive: positive.map(({ value, mode }) => ({ load: 1 / value, mode })),
    negative: counted.length - positive.length,
  }
}

/** The vector with its largest entry made 1; of equal ones the first. */
export function normalised(vector: readonly number[]): number[] {
  const top = vector.reduce(
    (best, value) => (Math.abs(value) > Math.abs(best) * (1 + 1e-9) ? value : best),
    0,
  )
  return vector.map((value) => value / top + 0)
}

function residual(energy: ScaledEnergy, x: readonly number[], { load, mode }: Load): number {
  const H = energy.hessian(x, load)
  return (
    largest(H.map((row) => row.reduce((sum, value, i) => sum + value * (mode[i] as number), 0))) /
    largest(energy.hessian(x, 0))
  )
}

function none(n: number, found: number, negative: number): StabilityError {
  const opposite =
    negative > 0 ? `; ${negative} ${negative === 1 ? 'lies' : 'lie'} at loads in the opposite sense` : ''
  const there =
    found === 0
      ? 'there is no critical load in the sense of the load'
      : `there ${found === 1 ? 'is 1 critical load' : `are ${found} critical loads`}`
  return new StabilityError(
    `critical load number ${n} was asked for, and ${there}${opposite}`,
    'check the sign of the load’s work in the energy: a load P that sinks by d has the energy −P·d',
  )
}

/** For an energy that is not linear in the load: the negative eigenvalues are counted at rising loads, then bracketed. */
function byCounting(energy: ScaledEnergy, x0: readonly number[], n: number, reference: number): CriticalLoad {
  const count = (hessian: (load: number) => Matrix) => (load: number) =>
    eigen(hessian(load)).values.filter((value) => value < 0).length
  const exact = count((load) => energy.hessian(x0, load))
  const bracket = firstWith(exact, n, reference)
  if (!bracket)
    throw new StabilityError(
      `critical load number ${n} was not found up to ${(100 * reference).toPrecision(3)} (in SI units)`,
      'check the sign of the load’s work in the energy',
      'solver',
    )
  const { low, high, iterations } = bisect(exact, n, bracket, 1e-15)
  const value = (low + high) / 2
  const { values, vectors } = eigen(energy.hessian(x0, value))
  const critical = values.reduce(
    (best, v, i) => (Math.abs(v) < Math.abs(values[best] as number) ? i : best),
    0,
  )
  const rough = bisect(
    count((load) => differenceHessian(energy, x0, load)),
    n,
    { low: value * 0.999, high: value * 1.001 },
    1e-12,
  )
  return {
    value,
    route: 'negative eigenvalues of the exact Hessian counted',
    status: 'converged',
    iterations,
    residual: (high - low) / value,
    bracket: [low, high],
    second: secondRoute('energy values by finite differences', (rough.low + rough.high) / 2, value, ALLOWED),
    mode: energy.unscaled(normalised(vectors[critical] as number[])),
    kind: 'bifurcation',
    state: energy.unscaled(x0),
    straight: true,
  }
}

function firstWith(
  count: (load: number) => number,
  n: number,
  reference: number,
): { low: number; high: number } | undefined {
  const steps = 4000
  for (let i = 1; i <= steps; i++) {
    // Steps grow from a fine start to a hundred times the reference load.
    const load = (s: number) => 100 * reference * (s / steps) ** 2
    if (count(load(i)) >= n) return { low: load(i - 1), high: load(i) }
  }
  return undefined
}

function bisect(
  count: (load: number) => number,
  n: number,
  bracket: { low: number; high: number },
  width: number,
): { low: number; high: number; iterations: number } {
  let { low, high } = bracket
  let iterations = 0
  while ((high - low) / high > width && iterations++ < 200) {
    const middle = (low + high) / 2
    if (middle <= low || middle >= high) break
    if (count(middle) >= n) high = middle
    else low = middle
  }
  return { low, high, iterations }
}

/** Whether a symmetric matrix is positive definite. */
export function isStable(H: Matrix): boolean {
  return cholesky(H) !== undefined
}
