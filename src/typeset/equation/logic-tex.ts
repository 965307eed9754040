import type { Formula, RelationOperator } from '../../calculate/types.ts'
import { led, LEVEL, operand, type Print, type Printing } from './print.ts'

const RELATIONS: Readonly<Record<RelationOperator, { readonly holds: string; readonly fails: string }>> = {
  '<': { holds: '<', fails: '\\nless ' },
  '<=': { holds: '\\leq ', fails: '\\nleq ' },
  '>': { holds: '>', fails: '\\ngtr ' },
  '>=': { holds: '\\geq ', fails: '\\ngeq ' },
  '==': { holds: '=', fails: '\\neq ' },
  '!=': { holds: '\\neq ', fails: '=' },
}

/** The sign of a relation; struck when it does not hold. */
export function relationTex(operator: RelationOperator, holds = true): string {
  return RELATIONS[operator][holds ? 'holds' : 'fails']
}

/** `a < b`, or a chain `0.2 \leq x \leq 3`. */
export function printRelation(
  { operands, operators }: Extract<Formula, { type: 'relation' }>,
  printing: Printing,
  holds = true,
): Print {
  const pieces = sidesOf(operands, printing).map((side, i) => {
    const print = operand(side, LEVEL.sum, true)
    const operator = operators[i - 1]
    if (operator === undefined) return print
    const sign = relationTex(operator, holds)
    return led(print, sign, `{}${sign}`)
  })
  return row(pieces, LEVEL.relation)
}

/** The sides of a relation; angles beside plain numbers are all put in in radians. */
function sidesOf(operands: readonly Formula[], printing: Printing): readonly Print[] {
  const sides = operands.map((side) => printing.print(side, printing))
  const degrees = sides.filter(({ tex }) => tex.endsWith('\\circ}')).length
  if (degrees === 0 || degrees === sides.length) return sides
  return operands.map((side) => printing.print(side, { ...printing, angles: 'radians' }))
}

/** `a and b and c`, in words. */
export function printConnective(formula: Extract<Formula, { type: 'binary' }>, printing: Printing): Print {
  const { operator } = formula
  const level = operator === 'and' ? LEVEL.and : LEVEL.or
  const [left, right] = [formula.left, formula.right].map((side, i) => {
    const print = printing.print(side, printing)
    // Which of two words in a row binds tighter is not for the reader to know.
    return print.level === level && i === 0 ? print : operand(print, LEVEL.relation, true)
  }) as [Print, Print]
  const word = led(right, `\\text{ ${operator} }`)
  return row([left, word], level)
}

function row(pieces: readonly Print[], level: number): Print {
  return {
    tex: pieces.map(({ tex }) => tex).join(''),
    level,
    look: 'other',
    ...(pieces[0]?.signed ? { signed: true } : {}),
    ...(pieces.some(({ tall }) => tall) ? { tall: true } : {}),
    split: () => pieces,
  }
}
