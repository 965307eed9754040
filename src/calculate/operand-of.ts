import type { Formula, NamedLine, Operand } from './types.ts'

/** How a name's value is best put into a formula: as it was typed, or in the unit asked for. */
export function operandOf(line: NamedLine): Operand {
  const { value, origin, formula, unit } = line
  const typed =
    literal(formula) ??
    (formula.type === 'name' && origin === 'bound'
      ? line.operands.get(formula.path.join('.'))?.asTyped
      : undefined)
  return { value, origin, ...(typed && !unit ? { asTyped: typed } : {}), ...(unit ? { unit } : {}) }
}

/** A number or quantity as typed, if that is all the formula is. */
function literal(formula: Formula): Formula | undefined {
  if (formula.type === 'number' || formula.type === 'quantity') return formula
  if (formula.type === 'unary' && formula.operator === '-') return literal(formula.body) && formula
  return undefined
}
