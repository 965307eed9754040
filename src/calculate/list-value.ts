import { DIMENSIONLESS, sameDimension } from '../quantity/dimension.ts'
import { isNumeric } from './arithmetic.ts'
import { describeKind, describeValue, quantity } from './describe.ts'
import { FormulaError } from './formula-error.ts'
import { clip } from './required.ts'
import type { Node, Scope } from './scope.ts'
import type { Formula, Quantity, Value } from './types.ts'

/** The value of `[a, b]`: an array when all entries are quantities of one dimension, else a list. */
export function listOf(formula: Node<'list'>, values: readonly Value[], scope: Scope): Value {
  const [first] = values
  if (!first || !values.every(isNumeric)) return { type: 'list', items: values }
  const odd = values.findIndex(
    (value) => !sameDimension((value as Quantity).dimension, (first as Quantity).dimension),
  )
  if (odd >= 0) {
    // Unlike quantities side by side are a list of values (a model's data), not an array for arithmetic.
    return { type: 'list', items: values }
  }
  const { dimension } = first as Quantity
  if (values.every((value) => value.type === 'quantity'))
    return { type: 'array', si: values.map((value) => value.si), dimension }
  const rows = values.map((value) => (value.type === 'array' ? value.si : undefined))
  const width = rows[0]?.length
  if (rows.some((row) => row === undefined || row.length !== width || row.some(Array.isArray))) {
    throw new FormulaError(
      'unit-mismatch',
      `the rows of \`${clip(scope.source(formula.span))}\` are not of one length`,
      'give each row as many entries',
      formula.span,
    )
  }
  return { type: 'array', si: rows as number[][], dimension }
}

/** The value of `v[2]` or `M[1, 2]`; indices count from 1. */
export function itemOf(formula: Node<'item'>, value: Value, indices: readonly Value[], scope: Scope): Value {
  const numbers = indices.map((index, i) => {
    const part = formula.indices[i] as Formula
    if (
      index.type === 'quantity' &&
      sameDimension(index.dimension, DIMENSIONLESS) &&
      Number.isInteger(index.si) &&
      index.si >= 1
    )
      return index.si
    throw new FormulaError(
      'function-misused',
      `the index \`${scope.source(part.span)}\` is ${describeValue(index)}`,
      'an index is a whole number; the first entry has index 1',
      part.span,
    )
  })
  let current: unknown = value.type === 'list' ? value.items : value.type === 'array' ? value.si : undefined
  numbers.forEach((index, i) => {
    const part = formula.indices[i] as Formula
    if (!Array.isArray(current)) {
      throw new FormulaError(
        'function-misused',
        `\`${clip(scope.source(formula.of.span))}\` is ${describeKind(value)} and has no entry ${numbers.join(', ')}`,
        'use as many indices as it has levels',
        formula.span,
      )
    }
    if (index > current.length) {
      throw new FormulaError(
        'function-misused',
        `entry ${index} was asked for, and there are ${current.length}`,
        'indices count from 1',
        part.span,
      )
    }
    current = current[index - 1]
  })
  if (value.type === 'list') return current as Value
  const { dimension } = value as { dimension: Quantity['dimension'] }
  return typeof current === 'number'
    ? quantity(current, dimension)
    : { type: 'array', si: current as number[], dimension }
}
