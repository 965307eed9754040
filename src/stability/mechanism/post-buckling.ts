import { dot, eigen, largest, solve, type Matrix } from '../dense.ts'
import { StabilityError, type SecondRoute } from '../result.ts'
import { criticalLoad, type CriticalLoad } from './critical.ts'
import { ScaledEnergy, type Energy } from './energy.ts'

export interface PostBuckling {
  readonly critical: CriticalLoad
  readonly kind: 'stable symmetric' | 'unstable symmetric' | 'asymmetric' | 'undecided'
  /** Load along the branch: P = P_cr (1 + a s + b s² + …), s the amplitude of the mode in its largest coordinate, in sizes. */
  readonly a: number
  readonly b: number
  /** The coefficient that decides, found again by following the branch. */
  readonly second: SecondRoute
}

/** A coefficient smaller than this is zero; at b = 0 the kind is decided by higher terms, which are not calculated. */
const ZERO = 1e-9

/**
 * The start of the path that branches off at a simple bifurcation, by the asymptotic expansion of Koiter (On the Stability of
 * Elastic Equilibrium, 1945; Budiansky, Advances in Applied Mechanics 14, 1974) with the exact derivatives of the energy up to
 * the fourth, the non-critical coordinates following to second order. Second route: the branch is followed by Newton's method
 * at small amplitudes and the coefficients fitted.
 *
 * @throws StabilityError when the critical point is a limit point or several modes meet in it
 */
export function postBuckling(source: Energy, n = 1): PostBuckling {
  const energy = new ScaledEnergy(source)
  const critical = criticalLoad(source, n)
  if (!critical.straight || critical.kind !== 'bifurcation') {
    throw new StabilityError(
      critical.kind === 'limit point'
        ? 'the path ends in a limit point: the structure snaps, and no path branches off'
        : 'the path bends before it branches, which the expansion does not cover',
      'use `equilibrium` for the states under a given load',
    )
  }
  const x = critical.state.map((value, i) => value / (source.scale[i] as number))
  const mode = critical.mode.map((value, i) => value / (source.scale[i] as number))
  const P = critical.value
  const H = energy.hessian(x, P)
  expectSimple(H, energy.hessian(x, 0))
  const H1 = energy.hessian(x, P, 1)
  const work = dot(mode, multiply(H1, mode))
  const cubic = energy.third(mode, mode, x, P)
  const P1 = (-0.5 * dot(cubic, mode)) / work
  const follow = solveOff(
    H,
    largest(energy.hessian(x, 0)),
    mode,
    cubic.map((value, i) => -0.5 * value - P1 * (multiply(H1, mode)[i] as number)),
  )
  const cubicFollow = dot(energy.third(mode, follow, x, P), mode)
  const fourth = energy.fourth(mode, x, P)
  const mixed =
    P1 === 0
      ? 0
      : P1 * (dot(mode, multiply(H1, follow)) + 0.5 * dot(energy.third(mode, mode, x, P, 1), mode)) +
        0.5 * P1 * P1 * dot(mode, multiply(energy.hessian(x, P, 2), mode))
  const P2 = -(cubicFollow + fourth / 6 + mixed) / work
  const [a, b] = [clean(P1 / P), clean(P2 / P)]
  const followed = followBranch(energy, x, mode, P)
  const decides = a !== 0 ? a : b
  const again = a !== 0 ? followed.a : followed.b
  const kind =
    a !== 0 ? 'asymmetric' : b > 0 ? 'stable symmetric' : b < 0 ? 'unstable symmetric' : 'undecided'
  const difference = decides === 0 ? Math.abs(again) : Math.abs(again - decides) / Math.abs(decides)
  return {
    critical,
    kind,
    a,
    b,
    second: { route: 'branch followed at small amplitudes', value: again, difference, allowed: 1e-4 },
  }
}

const clean = (value: number) => (Math.abs(value) < ZERO ? 0 : value)
const multiply = (A: Matrix, v: readonly number[]) => A.map((row) => dot(row, v))

function expectSimple(H: Matrix, K: Matrix): void {
  const near = eigen(H).values.filter((value) => Math.abs(value) < 1e-7 * largest(K)).length
  if (near <= 1) return
  throw new StabilityError(
    `${near} modes meet at the critical load, and their interaction is not covered`,
    'change a stiffness slightly, or use `equilibrium` for the states under a given load',
  )
}

/** Solves H w = r for w at right angles to the mode, H being singular in the mode only. */
function solveOff(H: Matrix, scale: number, mode: readonly number[], r: readonly number[]): number[] {
  const bordered = [
    ...H.map((row, i) => [...row, (mode[i] as number) * scale]),
    [...mode.map((value) => value * scale), 0],
  ]
  const solution = solve(bordered, [...r, 0])
  if (!solution)
    throw new StabilityError(
      'the equations of the post-buckling expansion are singular',
      'use `equilibrium` for the states under a given load',
      'solver',
    )
  return solution.slice(0, -1)
}

/** Loads on the branch at ± two amplitudes, fitted by a cubic and a quartic through P_cr. */
function followBranch(
  energy: ScaledEnergy,
  x: readonly number[],
  mode: readonly number[],
  P: number,
): { a: number; b: number } {
  const s = 0.02
  const ratio = (amplitude: number) => branchLoad(energy, x, mode, amplitude, P) / P - 1
  const odd = (h: number) => (ratio(h) - ratio(-h)) / (2 * h)
  const even = (h: number) => (ratio(h) + ratio(-h)) / (2 * h * h)
  const extrapolated = (f: (h: number) => number) => (4 * f(s / 2) - f(s)) / 3
  return { a: extrapolated(odd), b: extrapolated(even) }
}

/** The load at which a state with the given amplitude of the mode is in equilibrium. */
function branchLoad(
  energy: ScaledEnergy,
  x: readonly number[],
  mode: readonly number[],
  amplitude: number,
  P: number,
): number {
  let at = x.map((value, i) => value + amplitude * (mode[i] as number))
  let lambda = 1
  const measure = dot(mode, mode)
  for (let iteration = 0; iteration < 40; iteration++) {
    const g = energy.gradient(at, lambda * P)
    const H = energy.hessian(at, lambda * P)
    const push = energy.gradient(at, lambda * P, 1).map((value) => value * P)
    const gap =
      dot(
        mode,
        at.map((value, i) => value - (x[i] as number)),
      ) /
        measure -
      amplitude
    const change = solve(
      [...H.map((row, i) => [...row, push[i] as number]), [...mode.map((value) => value / measure), 0]],
      [...g, gap],
    )
    if (!change) break
    at = at.map((value, i) => value - (change[i] as number))
    lambda -= change[x.length] as number
    if (largest(change) < 1e-13) return lambda * P
  }
  throw new StabilityError(
    'the branch could not be followed from the bifurcation',
    'use `equilibrium` for the states under a given load',
    'solver',
  )
}
