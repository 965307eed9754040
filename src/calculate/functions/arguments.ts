import { DIMENSIONLESS, sameDimension, type Dimension } from '../../quantity/dimension.ts'
import { withArticle } from '../../quantity/kinds.ts'
import { describeKind, describeValue } from '../describe.ts'
import { FormulaError } from '../formula-error.ts'
import type { Formula, FunctionValue, ModelValue, Quantity, RecordValue, Value } from '../types.ts'
import type { CallContext } from './types.ts'

/** Refuses a call for the number of its arguments. */
export function expectCount(
  args: readonly Value[],
  least: number,
  most: number,
  context: CallContext,
  signature: string,
): void {
  if (args.length >= least && args.length <= most) return
  const expected =
    least === most ? String(least) : most === Infinity ? `at least ${least}` : `${least} to ${most}`
  throw new FormulaError(
    'function-misused',
    `\`${context.formula.name}\` is called with ${args.length} argument${args.length === 1 ? '' : 's'}, and takes ${expected}`,
    `call it as \`${signature}\``,
    context.formula.span,
  )
}

/** The formula of an argument: its place is where a finding about it belongs. */
export function argumentAt(context: CallContext, index: number): Formula {
  return context.formula.args[index] ?? context.formula
}

export function misused(part: Formula, message: string, hint: string, cause?: unknown): FormulaError {
  return new FormulaError('function-misused', message, hint, part.span, cause)
}

/** A quantity of a given dimension. */
export function quantityOf(
  value: Value,
  dimension: Dimension,
  part: Formula,
  what: string,
  context: CallContext,
): number {
  if (value.type === 'quantity' && sameDimension(value.dimension, dimension)) return value.si
  const source = context.source(part)
  throw new FormulaError(
    'unit-mismatch',
    `${what} \`${source}\` is ${describeKind(value)}, and ${withArticle(dimension)} was expected`,
    'check its unit',
    part.span,
  )
}

export function numberOf(value: Value, part: Formula, what: string, context: CallContext): number {
  return quantityOf(value, DIMENSIONLESS, part, what, context)
}

/** A whole number not less than 1. */
export function ordinalOf(value: Value, part: Formula, what: string, context: CallContext): number {
  const n = numberOf(value, part, what, context)
  if (Number.isInteger(n) && n >= 1) return n
  throw misused(part, `${what} is ${n}`, 'use a whole number from 1')
}

export function anyQuantity(value: Value, part: Formula, what: string): Quantity {
  if (value.type === 'quantity') return value
  throw new FormulaError(
    'unit-mismatch',
    `${what} is ${describeKind(value)}, and a quantity was expected`,
    'use a number or a quantity',
    part.span,
  )
}

export function textOf(value: Value, part: Formula, what: string): string {
  if (value.type === 'text') return value.value
  throw misused(
    part,
    `${what} is ${describeValue(value)}, and a text was expected`,
    'write it in quotation marks',
  )
}

export function recordOf(value: Value, part: Formula, what: string): RecordValue {
  if (value.type === 'record') return value
  throw misused(
    part,
    `${what} is ${describeKind(value)}, and a record was expected`,
    'write it as `{name: value, …}`',
  )
}

export function functionOf(value: Value, part: Formula, what: string): FunctionValue {
  if (value.type === 'function') return value
  throw misused(
    part,
    `${what} is ${describeKind(value)}, and a function was expected`,
    'define it as `V(theta, P) = …` in a `working` block and give its name',
  )
}

export function modelOf(value: Value, part: Formula, what: string): ModelValue {
  if (value.type === 'model') return value
  throw misused(
    part,
    `${what} is ${describeKind(value)}, and a model was expected`,
    'make one with `column({…})` or `mechanism(V)`',
  )
}

/** The formula of one entry of a record argument, so that a finding points at it. */
export function entryAt(part: Formula, key: string): Formula {
  if (part.type !== 'record') return part
  return part.fields.find((field) => field.key === key)?.value ?? part
}

/** Refuses entries that are not known: a misspelt one would be ignored without a word. */
export function expectEntries(
  record: RecordValue,
  known: readonly string[],
  part: Formula,
  what: string,
): void {
  for (const key of Object.keys(record.fields)) {
    if (known.includes(key)) continue
    throw misused(
      entryAt(part, key),
      `${what} has no entry \`${key}\``,
      `its entries are ${known.join(', ')}`,
    )
  }
}
