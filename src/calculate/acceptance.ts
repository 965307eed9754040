import type { Acceptance, Span } from '../sheet/types.ts'
import { compare, isRefusal } from './arithmetic.ts'
import { describeKind, describeValue } from './describe.ts'
import { inOrder } from './in-order.ts'
import { FormulaError } from './formula-error.ts'
import type { CheckLine, Formula, Operand, Quantity, SolverReport, Value } from './types.ts'

export interface Side {
  readonly formula: Formula
  readonly value: Value
  readonly operands: ReadonlyMap<string, Operand>
  readonly branches: ReadonlyMap<Formula, boolean>
  readonly reports: readonly SolverReport[]
}

/**
 * Decides one check, on the full values and without tolerance. The demand is the side that must be the smaller one.
 *
 * @throws FormulaError `unit-mismatch` when the sides cannot be compared
 */
export function acceptance(
  statement: Acceptance,
  left: Side,
  right: Side,
  validity: boolean,
  source: (span: Span) => string,
): CheckLine {
  const { relation } = statement
  const compared = compare(left.value, right.value)
  if (isRefusal(compared)) {
    const name = (side: Side) => `\`${source(side.formula.span)}\` (${describeValue(side.value)})`
    throw new FormulaError(
      'unit-mismatch',
      `cannot compare ${name(left)} and ${name(right)}: ${describeKind(left.value)} and ${describeKind(right.value)}`,
      'a check compares two quantities of one dimension',
      { start: left.formula.span.end, end: right.formula.span.start },
    )
  }
  const [small, large] = relation === '<=' || relation === '<' ? [left, right] : [right, left]
  const demand = small.value as Quantity
  const capacity = large.value as Quantity
  const ratio = demand.si / capacity.si
  const meaningful = demand.si >= 0 && capacity.si > 0 && Number.isFinite(ratio)
  return {
    kind: 'check',
    statement,
    title: statement.meaning ?? statement.reference ?? statement.text,
    formula: left.formula,
    demand,
    capacity,
    demandFormula: small.formula,
    capacityFormula: large.formula,
    ...(meaningful ? { utilisation: ratio } : {}),
    verdict: inOrder(compared.order, relation) ? 'pass' : 'fail',
    validity,
    operands: new Map([...left.operands, ...right.operands]),
    branches: new Map([...left.branches, ...right.branches]),
    reports: [...left.reports, ...right.reports],
  }
}
