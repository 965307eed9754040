import { eigen, largest } from '../dense.ts'
import { StabilityError } from '../result.ts'
import { ScaledEnergy, type Energy } from './energy.ts'
import { differenceGradient, differenceHessian } from './finite-difference.ts'
import { equilibriumNear, type Root } from './newton.ts'
import { unloadedState } from './unloaded.ts'

export interface EquilibriumState {
  /** The coordinates, in SI. */
  readonly q: readonly number[]
  readonly stability: 'stable' | 'unstable' | 'critical'
  readonly energy: number
}

export interface Equilibria {
  /** Nearest to the unloaded state first. */
  readonly states: readonly EquilibriumState[]
  /** Starting points of the search. */
  readonly starts: number
  /** Newton steps in all. */
  readonly iterations: number
  /** The largest out-of-balance force left, over the largest stiffness. */
  readonly residual: number
  /** The same from energy values alone, and whether they agree on the stability of every state. */
  readonly second: {
    readonly route: string
    readonly residual: number
    readonly agrees: boolean
    readonly allowed: number
  }
}

/** The search covers each coordinate from −reach to +reach sizes about the unloaded state: an angle within a quarter turn. */
export const REACH = Math.PI / 2

/**
 * The states of equilibrium under a load, with their stability from the eigenvalues of the Hessian. They are sought by
 * Newton's method from a grid of starting points; with one coordinate every change of sign of the force on a fine grid is
 * followed. A search of this kind shows what it finds; it does not prove that there is nothing else.
 *
 * @param load in SI
 * @throws StabilityError when nothing holds the structure, or no state is found within reach
 */
export function equilibrium(source: Energy, load: number): Equilibria {
  const energy = new ScaledEnergy(source)
  const x0 = unloadedState(energy)
  const stiffness = largest(energy.hessian(x0, 0))
  const starts = [x0, ...(energy.n === 1 ? signChanges(energy, x0, load) : grid(x0))]
  const found: Root[] = []
  let iterations = 0
  for (const start of starts) {
    const root = equilibriumNear(energy, start, load, stiffness)
    if (!root) continue
    iterations += root.iterations
    const inside = root.x.every((value, i) => Math.abs(value - (x0[i] as number)) <= REACH * (1 + 1e-9))
    const known = found.some(({ x }) => largest(x.map((value, i) => value - (root.x[i] as number))) < 1e-6)
    if (inside && !known) found.push(root)
  }
  if (found.length === 0) {
    throw new StabilityError(
      'no state of equilibrium was found within a quarter turn of the unloaded state',
      'the load may be beyond a limit point: ask for `critical_load` first',
      'solver',
    )
  }
  const distance = ({ x }: Root) =>
    Math.sqrt(x.reduce((sum, value, i) => sum + (value - (x0[i] as number)) ** 2, 0))
  found.sort((p, q) =>
    Math.abs(distance(p) - distance(q)) > 1e-9 ? distance(p) - distance(q) : lexicographic(q.x, p.x),
  )
  const states = found.map(({ x }) => ({
    q: energy.unscaled(x).map((value) => (Math.abs(value) < 1e-14 ? 0 : value)),
    stability: stabilityOf(energy.hessian(x, load), stiffness),
    energy: energy.value(x, load),
  }))
  const differences = found.map(({ x }) => largest(differenceGradient(energy, x, load)) / stiffness)
  const agrees = found.every(
    ({ x }, i) =>
      states[i]?.stability === 'critical' ||
      stabilityOf(differenceHessian(energy, x, load), stiffness) === states[i]?.stability,
  )
  return {
    states,
    starts: starts.length,
    iterations,
    residual: Math.max(...found.map((root) => root.residual)),
    second: {
      route: 'energy values by finite differences',
      residual: Math.max(...differences),
      agrees,
      allowed: 1e-7,
    },
  }
}

function stabilityOf(H: readonly (readonly number[])[], scale: number): EquilibriumState['stability'] {
  const { values } = eigen(H)
  const lowest = values[0] as number
  return Math.abs(lowest) <= 1e-9 * scale ? 'critical' : lowest > 0 ? 'stable' : 'unstable'
}

function lexicographic(p: readonly number[], q: readonly number[]): number {
  for (const [i, value] of p.entries()) {
    const difference = value - (q[i] as number)
    if (Math.abs(difference) > 1e-9) return difference
  }
  return 0
}

/** For one coordinate: the middles of the intervals of a fine grid in which the force changes sign, and the grid's ends. */
function signChanges(energy: ScaledEnergy, [centre = 0]: readonly number[], load: number): number[][] {
  const steps = 2000
  const at = (i: number) => centre + REACH * ((2 * i) / steps - 1)
  const force = (x: number) => energy.gradient([x], load)[0] as number
  const starts: number[][] = []
  let before = force(at(0))
  for (let i = 1; i <= steps; i++) {
    const now = force(at(i))
    if (before === 0 || before * now < 0) starts.push([(at(i - 1) + at(i)) / 2])
    before = now
  }
  return starts
}

/** A regular grid about the centre, coarser in more coordinates; its points do not lie on axes of symmetry. */
function grid(centre: readonly number[]): number[][] {
  const n = centre.length
  const perAxis = Math.max(3, [0, 0, 15, 9, 5][n] ?? 3)
  const total = Math.min(perAxis ** n, 2187)
  return Array.from({ length: total }, (_, k) => {
    let rest = k
    return centre.map((c, i) => {
      const step = rest % perAxis
      rest = Math.floor(rest / perAxis)
      return c + REACH * ((2 * (step + 0.5)) / perAxis - 1) * (1 + 0.013 * (i + 1))
    })
  })
}
