import type { Formula } from '../../calculate/types.ts'
import { withoutGroup } from './print.ts'
import type { Angles } from './put-in.ts'

const TRIGONOMETRIC = new Set(['sin', 'cos', 'tan', 'cot'])

/** How angles stand in the arguments of a call: those of sine and its kin stay in degrees unless something is added to them. */
export function anglesIn({ name, args }: Extract<Formula, { type: 'call' }>): Angles {
  return TRIGONOMETRIC.has(name) && !args.some(hasSum) ? 'degrees' : 'as-shown'
}

function hasSum(formula: Formula): boolean {
  const body = withoutGroup(formula)
  if (body.type !== 'binary') return false
  return body.operator === '+' || body.operator === '-' || hasSum(body.left) || hasSum(body.right)
}
