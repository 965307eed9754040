import { DIMENSIONLESS } from '../../quantity/dimension.ts'
import { quantity } from '../describe.ts'
import { energyFunction, type CoordinateSize, type EnergyFunction } from '../energy.ts'
import type { Energy } from '../../stability/mechanism/energy.ts'
import type { Value } from '../types.ts'
import {
  anyQuantity,
  argumentAt,
  entryAt,
  expectCount,
  expectEntries,
  functionOf,
  misused,
  recordOf,
} from './arguments.ts'
import type { SheetFunction } from './types.ts'

/** What the model of a mechanism holds: the energy for the solvers, and the dimensions for what they answer. */
export interface Mechanism {
  readonly energy: Energy
  readonly fn: EnergyFunction
}

/** Coordinates beyond this make the derivatives and the search for states too many. */
const MAX_COORDINATES = 8

/** Makes a mechanism from the sheet's energy function. */
export const mechanism: SheetFunction = {
  name: 'mechanism',
  signature: 'mechanism(V) or mechanism(V, {w: 1 mm})',
  summary: 'a structure with a few coordinates, given by its total potential energy V(q1, q2, …, P)',
  explain:
    'V: a function of the sheet whose last argument is the load and whose others are the coordinates; it must be smooth in them and give an energy. A coordinate is an angle (a number without unit) unless the second argument gives the size it is measured by, as `{w: 1 mm}`. The unloaded state is the equilibrium under no load nearest to all coordinates zero. Gradient and Hessian are differentiated symbolically. Gives a model, to be asked `critical_load`, `mode_shape`, `post_buckling` and `equilibrium`. Up to 8 coordinates.',
  source: 'Thompson and Hunt, A General Theory of Elastic Stability (1973)',
  group: 'model',
  call(args, context) {
    expectCount(args, 1, 2, context, this.signature)
    const part = argumentAt(context, 0)
    const fn = functionOf(args[0] as Value, part, 'the energy')
    const names = fn.parameters.slice(0, -1)
    if (names.length === 0)
      throw misused(
        part,
        `\`${fn.name}\` has no coordinate beside the load`,
        'write the energy as `V(theta, P)`: coordinates first, the load last',
      )
    if (names.length > MAX_COORDINATES)
      throw misused(
        part,
        `\`${fn.name}\` has ${names.length} coordinates, and ${MAX_COORDINATES} are allowed`,
        'use fewer coordinates',
      )
    const sizesPart = argumentAt(context, 1)
    const sizes = args[1] ? recordOf(args[1], sizesPart, 'the sizes of the coordinates') : undefined
    if (sizes) expectEntries(sizes, names, sizesPart, `\`${fn.name}\``)
    const coordinates = names.map((name): CoordinateSize => {
      const given = sizes?.fields[name]
      if (!given) return { name, size: quantity(1, DIMENSIONLESS) }
      const size = anyQuantity(given, entryAt(sizesPart, name), `the size of \`${name}\``)
      if (!(size.si > 0))
        throw misused(
          entryAt(sizesPart, name),
          `the size of \`${name}\` is not above zero`,
          'give a typical amount of it, as `1 mm`',
        )
      return { name, size }
    })
    const plain = energyFunction(fn, coordinates, {
      source: (span) => context.source({ ...part, span }),
      budget: context.budget,
    })
    const energy: Energy = {
      coordinates: names,
      scale: coordinates.map(({ size }) => size.si),
      energy: (q, load) => plain.energy(q, load),
      partial: (orders, loadOrder) => plain.partial(orders, loadOrder),
    }
    const model: Mechanism = { energy, fn: plain }
    return {
      type: 'model',
      of: 'mechanism',
      description: `mechanism with energy ${fn.name}(${fn.parameters.join(', ')})`,
      model,
    }
  },
}
