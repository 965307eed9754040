import type { Formula, RelationOperator } from '../../calculate/types.ts'
import { branchesOf } from './case-tex.ts'
import { LEVEL } from './print.ts'
import { held, inBrackets, inner, type Speaking, type Spoken } from './spoken.ts'

const RELATIONS: Readonly<Record<RelationOperator, readonly [holds: string, fails: string]>> = {
  '<': ['is less than', 'is not less than'],
  '<=': ['is at most', 'is not at most'],
  '>': ['is greater than', 'is not greater than'],
  '>=': ['is at least', 'is not at least'],
  '==': ['equals', 'does not equal'],
  '!=': ['does not equal', 'equals'],
}

export function relationWord(operator: RelationOperator, holds = true): string {
  return RELATIONS[operator][holds ? 0 : 1]
}

export function relationWords(
  { operands, operators }: Extract<Formula, { type: 'relation' }>,
  speaking: Speaking,
  holds = true,
): string {
  return operands
    .map((side, i) => {
      const text = held(side, LEVEL.sum, speaking)
      const operator = operators[i - 1]
      return operator === undefined ? text : `${relationWord(operator, holds)} ${text}`
    })
    .join(' ')
}

export function spokenCase(formula: Extract<Formula, { type: 'case' }>, speaking: Speaking): Spoken {
  const { branches, taken } = branchesOf(formula, speaking.branches)
  const chosen = taken === undefined ? undefined : branches[taken]
  if (speaking.mode === 'numbers' && chosen) return speaking.speak(chosen.value, speaking)
  const rows = branches.map(({ value, condition }, i) => {
    const when = condition ? `if ${inner(condition, speaking)}` : 'otherwise'
    return `${inner(value, speaking)} ${when}${i === taken ? ', which applies' : ''}`
  })
  return { text: `by cases: ${rows.join('; ')}; end of cases`, level: LEVEL.case }
}

/** `a and b`; another connective within it stands in brackets, since which binds tighter is not for the hearer to know. */
export function spokenConnective(
  { operator, left, right }: Extract<Formula, { type: 'binary' }>,
  speaking: Speaking,
): Spoken {
  const level = operator === 'and' ? LEVEL.and : LEVEL.or
  const first = speaking.speak(left, speaking)
  const isRun = first.level === level || first.level >= LEVEL.relation
  const text = `${(isRun ? first : inBrackets(first)).text} ${operator} ${held(right, LEVEL.relation, speaking)}`
  return { text, level }
}
