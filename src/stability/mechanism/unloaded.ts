import { cholesky, eigen, largest } from '../dense.ts'
import { StabilityError } from '../result.ts'
import type { ScaledEnergy } from './energy.ts'
import { equilibriumNear } from './newton.ts'

/**
 * The unloaded state: the equilibrium under no load nearest to all coordinates zero, in scaled coordinates.
 *
 * @throws StabilityError when there is none, or when nothing holds the structure there
 */
export function unloadedState(energy: ScaledEnergy): number[] {
  const zero = new Array<number>(energy.n).fill(0)
  const H0 = energy.hessian(zero, 0)
  if (!H0.flat().every(Number.isFinite)) {
    throw new StabilityError(
      'the energy has no finite stiffness where all coordinates are zero',
      'choose coordinates that are zero in the unloaded state',
    )
  }
  expectHeld(energy, H0)
  const root = equilibriumNear(energy, zero, 0, largest(H0))
  if (!root)
    throw new StabilityError(
      'no unloaded state of equilibrium was found near all coordinates zero',
      'measure the coordinates from the unstressed state',
      'solver',
    )
  expectHeld(energy, energy.hessian(root.x, 0))
  return root.x.map((value) => (Math.abs(value) < 1e-13 ? 0 : value))
}

function expectHeld(energy: ScaledEnergy, H: readonly (readonly number[])[]): void {
  const scale = largest(H)
  const { values, vectors } =
    scale > 0 ? eigen(H) : { values: [0], vectors: [H.map((_, i) => (i === 0 ? 1 : 0))] }
  const lowest = values[0] as number
  if (lowest > 1e-12 * scale && cholesky(H)) return
  const mode = vectors[0] as number[]
  const dominant = mode.reduce(
    (best, value, i) => (Math.abs(value) > Math.abs(mode[best] as number) + 1e-9 ? i : best),
    0,
  )
  const others = energy.names.filter(
    (_, i) => i !== dominant && Math.abs(mode[i] as number) > 0.1 * Math.abs(mode[dominant] as number),
  )
  const what = `\`${energy.names[dominant]}\`${others.length > 0 ? ` (with ${others.map((name) => `\`${name}\``).join(', ')})` : ''}`
  const state =
    lowest < -1e-12 * scale ? 'is unstable without any load' : 'is not held by anything when unloaded'
  throw new StabilityError(
    `the structure ${state} in the coordinate ${what}`,
    'add the spring or weight that holds it, and check the signs in the energy',
  )
}
