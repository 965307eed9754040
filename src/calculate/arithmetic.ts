import { DIMENSIONLESS, isDimensionless, sameDimension, type Dimension } from '../quantity/dimension.ts'
import { quantity } from './describe.ts'
import { fromUnit, isMathUnit, math, toUnit, type Unit } from './mathematics.ts'
import type { Quantity, QuantityArray, Value } from './types.ts'

/** Why an operation has no result: a clash of dimension or kind, or a result that is no real, finite number. */
export type Refusal =
  | { readonly refused: 'dimension' }
  | { readonly refused: 'kind' }
  | { readonly refused: 'exponent' }
  | { readonly refused: 'shape'; readonly cause: unknown }
  | { readonly refused: 'not-real' }
  | { readonly refused: 'not-finite' }

export type Numeric = Quantity | QuantityArray
export type Outcome<T> = T | Refusal

export function isRefusal(outcome: object): outcome is Refusal {
  return 'refused' in outcome
}

export function isNumeric(value: Value): value is Numeric {
  return value.type === 'quantity' || value.type === 'array'
}

/** A quantity as mathjs takes it: a plain number, or a unit in SI base units. */
function operand(value: Quantity): number | Unit {
  return isDimensionless(value.dimension) ? value.si : toUnit(value.si, value.dimension)
}

/** Takes a result of mathjs back, refusing what is complex, infinite or not a number. */
function take(raw: unknown): Outcome<Quantity> {
  if (typeof raw === 'number') return finite(raw, DIMENSIONLESS)
  if (isMathUnit(raw)) {
    const { si, dimension } = fromUnit(raw)
    return typeof si === 'number' ? finite(si, dimension) : { refused: 'not-real' }
  }
  return { refused: 'not-real' }
}

/** A quantity, unless it is infinite or not a number; -0 becomes 0. */
export function finite(si: number, dimension: Dimension): Outcome<Quantity> {
  return Number.isFinite(si) ? quantity(si + 0, dimension) : { refused: 'not-finite' }
}

export function add(a: Value, b: Value): Outcome<Numeric> {
  return addOrSubtract(a, b, (x, y) => math.add(x as number, y as number))
}

export function subtract(a: Value, b: Value): Outcome<Numeric> {
  return addOrSubtract(a, b, (x, y) => math.subtract(x as number, y as number))
}

function addOrSubtract(a: Value, b: Value, operation: (x: unknown, y: unknown) => unknown): Outcome<Numeric> {
  if (!isNumeric(a) || !isNumeric(b) || a.type !== b.type) return { refused: 'kind' }
  if (!sameDimension(a.dimension, b.dimension)) return { refused: 'dimension' }
  if (a.type === 'quantity' && b.type === 'quantity') return take(operation(operand(a), operand(b)))
  return onArrays(() => operation(a.si, b.si), a.dimension)
}

export function multiply(a: Value, b: Value): Outcome<Numeric> {
  if (!isNumeric(a) || !isNumeric(b)) return { refused: 'kind' }
  if (a.type === 'quantity' && b.type === 'quantity') return take(math.multiply(operand(a), operand(b)))
  return onArrays(() => math.multiply(a.si as never, b.si as never), combine(a.dimension, b.dimension, 1))
}

export function divide(a: Value, b: Value): Outcome<Numeric> {
  if (!isNumeric(a) || b.type !== 'quantity') return { refused: 'kind' }
  if (b.si === 0) return { refused: 'not-finite' }
  if (a.type === 'quantity') return take(math.divide(operand(a), operand(b)))
  return onArrays(() => math.divide(a.si as never, b.si as never), combine(a.dimension, b.dimension, -1))
}

export function power(base: Value, exponent: Value): Outcome<Quantity> {
  if (base.type !== 'quantity' || exponent.type !== 'quantity') return { refused: 'kind' }
  if (!isDimensionless(exponent.dimension)) return { refused: 'exponent' }
  if (base.si < 0 && !Number.isInteger(exponent.si)) return { refused: 'not-real' }
  return take(math.pow(operand(base), exponent.si))
}

export function negate(a: Value): Outcome<Numeric> {
  if (!isNumeric(a)) return { refused: 'kind' }
  if (a.type === 'quantity') return finite(-a.si, a.dimension)
  return onArrays(() => math.unaryMinus(a.si as never), a.dimension)
}

function combine(a: Dimension, b: Dimension, sign: 1 | -1): Dimension {
  return a.map((exponent, i) => exponent + sign * (b[i] ?? 0)) as unknown as Dimension
}

function onArrays(operation: () => unknown, dimension: Dimension): Outcome<Numeric> {
  let raw: unknown
  try {
    raw = operation()
  } catch (cause) {
    return { refused: 'shape', cause }
  }
  if (typeof raw === 'number') return finite(raw, dimension)
  const si = plainArray(raw)
  if (!si) return { refused: 'not-real' }
  return si.flat().every(Number.isFinite) ? { type: 'array', si, dimension } : { refused: 'not-finite' }
}

function plainArray(raw: unknown): number[] | number[][] | undefined {
  const array: unknown = Array.isArray(raw) ? raw : (raw as { toArray?: () => unknown }).toArray?.()
  if (!Array.isArray(array)) return undefined
  const flat: unknown[] = array.flat()
  return flat.every((entry) => typeof entry === 'number') ? (array as number[] | number[][]) : undefined
}

/** Compares two quantities of one dimension exactly; mathjs's own comparison has a tolerance, which a check must not have. */
export function compare(a: Value, b: Value): Outcome<{ readonly order: number }> {
  if (a.type !== 'quantity' || b.type !== 'quantity') return { refused: 'kind' }
  if (!sameDimension(a.dimension, b.dimension)) return { refused: 'dimension' }
  return { order: a.si < b.si ? -1 : a.si > b.si ? 1 : 0 }
}

/** Whether two values are the same: quantities of one dimension, texts or truths. */
export function same(a: Value, b: Value): Outcome<{ readonly same: boolean }> {
  if (a.type === 'text' && b.type === 'text') return { same: a.value === b.value }
  if (a.type === 'truth' && b.type === 'truth') return { same: a.value === b.value }
  const compared = compare(a, b)
  return isRefusal(compared) ? compared : { same: compared.order === 0 }
}
