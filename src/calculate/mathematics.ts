import {
  addDependencies,
  create,
  detDependencies,
  divideDependencies,
  invDependencies,
  multiplyDependencies,
  powDependencies,
  subtractDependencies,
  transposeDependencies,
  unaryMinusDependencies,
  unitDependencies,
  type FactoryFunctionMap,
  type Unit,
} from 'mathjs'
import type { Dimension } from '../quantity/dimension.ts'

/** Our own instance of mathjs with only what the sheets' arithmetic needs. Nothing a sheet says reaches its parser or settings. */
export const math = create({
  addDependencies,
  detDependencies,
  divideDependencies,
  invDependencies,
  multiplyDependencies,
  powDependencies,
  subtractDependencies,
  transposeDependencies,
  unaryMinusDependencies,
  unitDependencies,
} as FactoryFunctionMap)

export type { Unit }

/** The parts of a mathjs unit that we read; they are its documented state but are not in its published types. */
interface UnitState {
  value: number
  dimensions: number[]
  units: { power: number }[]
}

/** Where our base quantities stand in mathjs's list of dimensions: mass, length, time, (current), temperature. */
const PLACES = [0, 1, 2, 4] as const

const SI_BASE = math.unit(1, 'kg m s K')
const prototypes = new Map<string, Unit>()

/** A mathjs quantity in SI base units, so that none of mathjs's own units or conversions comes into play. */
export function toUnit(si: number, dimension: Dimension): Unit {
  const key = dimension.join()
  let prototype = prototypes.get(key)
  if (!prototype) {
    prototype = SI_BASE.clone()
    const state = prototype as unknown as UnitState
    dimension.forEach((exponent, i) => {
      state.dimensions[PLACES[i] as number] = exponent
      const part = state.units[i]
      if (part) part.power = exponent
    })
    prototypes.set(key, prototype)
  }
  const unit = prototype.clone()
  ;(unit as unknown as UnitState).value = si
  return unit
}

/** The SI value and dimension of a mathjs quantity made from `toUnit` values. */
export function fromUnit(unit: Unit): { si: number; dimension: Dimension } {
  const { value, dimensions } = unit as unknown as UnitState
  const [mass, length, time, temperature] = PLACES.map((i) => dimensions[i] ?? 0) as [
    number,
    number,
    number,
    number,
  ]
  return { si: value, dimension: [mass, length, time, temperature] }
}

export function isMathUnit(value: unknown): value is Unit {
  return typeof value === 'object' && value !== null && (value as { isUnit?: boolean }).isUnit === true
}
