import type { BinaryOperator, Formula } from '../../calculate/types.ts'

type Call = Extract<Formula, { type: 'call' }>

/**
 * A call of a function that is nothing but a formula, as that formula: `euler_load(E, I, L)` is π²EI/L², so that the page
 * shows what was calculated. Undefined for any other call.
 */
export function rewritten(call: Call): Formula | undefined {
  const { span } = call
  const binary = (operator: BinaryOperator, left: Formula, right: Formula): Formula => ({
    type: 'binary',
    operator,
    left,
    right,
    span,
    operatorSpan: span,
  })
  const squared = (base: Formula) => binary('^', base, { type: 'number', value: 2, text: '2', span })
  const [a, b, c] = call.args
  if (call.name === 'euler_load' && a && b && c && call.args.length === 3) {
    const pi: Formula = { type: 'constant', name: 'pi', span }
    return binary('/', binary('*', binary('*', squared(pi), a), b), squared(c))
  }
  if (call.name === 'hypot' && a && b) {
    const squares = call.args.map(squared)
    return { type: 'call', name: 'sqrt', args: [squares.reduce((sum, next) => binary('+', sum, next))], span }
  }
  return undefined
}
