import type { Formula } from '../../calculate/types.ts'
import { isDimensionless } from '../../quantity/dimension.ts'
import { spokenConnective } from './logic-words.ts'
import { meantBy } from './operand.ts'
import { LEVEL, withoutGroup } from './print.ts'
import { held, inBrackets, type Speaking, type Spoken } from './spoken.ts'

export function spokenSign(
  { operator, body }: Extract<Formula, { type: 'unary' }>,
  speaking: Speaking,
): Spoken {
  if (operator === '+') return speaking.speak(body, speaking)
  const word = operator === '-' ? 'minus' : 'not'
  return { text: `${word} ${held(body, LEVEL.power, speaking)}`, level: LEVEL.sum }
}

export function spokenBinary(formula: Extract<Formula, { type: 'binary' }>, saying: Speaking): Spoken {
  const { operator, left, right } = formula
  const isLogic = operator === 'and' || operator === 'or'
  const speaking = isLogic || saying.angles === 'degrees' ? saying : { ...saying, angles: 'radians' as const }
  const between = (word: string, level: number) => ({
    text: `${held(left, level, speaking)} ${word} ${held(right, level + 1, speaking)}`,
    level,
  })
  switch (operator) {
    case '+':
      return between('plus', LEVEL.sum)
    case '-':
      return between('minus', LEVEL.sum)
    case '*':
      return between('times', LEVEL.product)
    case '/':
      return spokenQuotient(withoutGroup(left), withoutGroup(right), speaking)
    case '^':
      return spokenPower(left, withoutGroup(right), speaking)
    case 'and':
    case 'or':
      return spokenConnective(formula, speaking)
  }
}

function spokenQuotient(left: Formula, right: Formula, speaking: Speaking): Spoken {
  const [over, under] = [speaking.speak(left, speaking), speaking.speak(right, speaking)]
  const isShort = over.level === LEVEL.atom && under.level === LEVEL.atom
  return isShort
    ? { text: `${over.text} over ${under.text}`, level: LEVEL.product }
    : { text: `the fraction ${over.text} divided by ${under.text}, end of fraction`, level: LEVEL.atom }
}

function spokenPower(base: Formula, exponent: Formula, speaking: Speaking): Spoken {
  const bare = speaking.speak(base, speaking)
  const body = (bare.level < LEVEL.atom || isQuantity(base, speaking) ? inBrackets(bare) : bare).text
  const level = LEVEL.power
  if (exponent.type === 'number' && exponent.text === '2') return { text: `${body} squared`, level }
  if (exponent.type === 'number' && exponent.text === '3') return { text: `${body} cubed`, level }
  const power = speaking.speak(exponent, speaking)
  const { text } = power
  const end = power.level === LEVEL.atom ? '' : ', end of power'
  return { text: `${body} to the power ${text}${end}`, level }
}

/** A number with a unit, whose power would be taken for the unit's. */
function isQuantity(formula: Formula, { mode, operands }: Speaking): boolean {
  if (formula.type === 'quantity') return true
  const value = mode === 'numbers' ? meantBy(formula, operands)?.value : undefined
  return value?.type === 'quantity' && !isDimensionless(value.dimension)
}
