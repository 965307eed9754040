import type { Dimension } from './dimension.ts'
import { ONE, timesPower, toNumber, type Rational } from './rational.ts'
import { UNITS, type Unit } from './unit-table.ts'

export { UNITS, type Unit } from './unit-table.ts'
export { nearestUnit } from './nearest-unit.ts'
export { isUnitProblem, parseUnit } from './parse-unit.ts'
export { unitGap, unitTex, unitText, unitWords } from './unit-text.ts'
export { unknownUnit, type UnitProblem } from './unknown-unit.ts'

/** A unit as written after a number: `kN*m/rad` is [{kN, 1}, {m, 1}, {rad, -1}]; empty for a plain number. */
export type UnitExpression = readonly { readonly unit: string; readonly exponent: number }[]

/** A plain number. */
export const NO_UNIT: UnitExpression = []

export interface UnitFactor {
  /** Multiplies a value in the unit to give coherent SI units. */
  readonly factor: number
  readonly dimension: Dimension
}

export function isUnit(name: string): boolean {
  return UNITS[name] !== undefined
}

interface Conversion extends UnitFactor {
  /** One of the two is 1. For mm they are 1 and 1000: dividing by a whole number rounds once, where times 0.001 rounds twice. */
  readonly multiply: number
  readonly divide: number
}

const known = new WeakMap<UnitExpression, Conversion>()

/**
 * The SI factor and dimension of a unit. The factor of whole powers is exact before it is rounded once to a double.
 * Throws a RangeError for a unit that is not in the table, and for powers whose factor no double can hold; `parseUnit`
 * lets neither through.
 */
export function unitFactor(expression: UnitExpression): UnitFactor {
  return conversion(expression)
}

/** A value in `unit`, in coherent SI units. */
export function toSi(value: number, unit: UnitExpression): number {
  const { multiply, divide } = conversion(unit)
  return divide === 1 ? value * multiply : value / divide
}

/** A value in coherent SI units, in `unit`. */
export function fromSi(si: number, unit: UnitExpression): number {
  const { multiply, divide } = conversion(unit)
  return divide === 1 ? si / multiply : si * divide
}

function conversion(expression: UnitExpression): Conversion {
  let found = known.get(expression)
  if (found === undefined) known.set(expression, (found = calculateConversion(expression)))
  return found
}

function calculateConversion(expression: UnitExpression): Conversion {
  let exact: Rational = ONE
  let rest = 1
  const dimension: [number, number, number, number] = [0, 0, 0, 0]
  for (const { unit: name, exponent } of expression) {
    const unit = knownUnit(name)
    if (unit.exact !== undefined && Number.isInteger(exponent))
      exact = timesPower(exact, unit.exact, exponent)
    else rest *= unit.factor ** exponent
    for (let i = 0; i < 4; i++) dimension[i] = (dimension[i] ?? 0) + (unit.dimension[i] ?? 0) * exponent
  }
  const factor = toNumber(exact) * rest
  if (!(factor > 0 && Number.isFinite(factor))) throw new RangeError('the powers of this unit are too large')
  const inverse = toNumber({ over: exact.under, under: exact.over }) / rest
  const byDividing = factor < 1 && Number.isInteger(inverse)
  return { factor, dimension, multiply: byDividing ? 1 : factor, divide: byDividing ? inverse : 1 }
}

function knownUnit(name: string): Unit {
  const unit = UNITS[name]
  if (unit === undefined) throw new RangeError(`there is no unit \`${name}\``)
  return unit
}
