import { findFunction } from './functions/index.ts'
import type { Formula, Operand, Origin, Value } from './types.ts'

/** Where a value of a `working` line comes from: a table, another sheet, or its own calculation. */
export function originOf(formula: Formula, value: Value, operands: ReadonlyMap<string, Operand>): Origin {
  if (value.type === 'model') return 'model'
  if (value.type === 'function') return 'function'
  if (formula.type === 'group') return originOf(formula.body, value, operands)
  if (formula.type === 'call' && findFunction(formula.name)?.looksUp) return 'looked-up'
  if (formula.type === 'name') {
    const origin = operands.get(formula.path.join('.'))?.origin
    if (origin === 'looked-up' || origin === 'carried') return origin
  }
  return 'derived'
}
