import type { Formula } from '../../calculate/types.ts'
import { spokenBinary, spokenSign } from './arithmetic-words.ts'
import type { Reason } from './case-tex.ts'
import { fieldsWords, spokenCall } from './call-words.ts'
import { relationWords, spokenCase } from './logic-words.ts'
import { meantBy } from './operand.ts'
import { LEVEL, withoutGroup } from './print.ts'
import { isPutIn, showPutIn } from './put-in.ts'
import { shownWords, showLiteral } from './quantity-tex.ts'
import { held, inBrackets, inner, type Speaking, type Spoken } from './spoken.ts'
import { pathWords, symbolWords } from './symbol.ts'
import { valueWords } from './value-words.ts'

/** A formula as spoken. Brackets, fractions and roots are closed in words, so that it has one meaning by ear too. */
export function formulaWords(formula: Formula, setting: Omit<Speaking, 'speak'>): string {
  return spoken(withoutGroup(formula), { ...setting, speak: spoken }).text
}

/** A comparison as spoken, or its denial where it does not hold. */
export function comparisonWords({ condition, holds }: Reason, setting: Omit<Speaking, 'speak'>): string {
  return relationWords(condition, { ...setting, speak: spoken }, holds)
}

function spoken(formula: Formula, speaking: Speaking): Spoken {
  switch (formula.type) {
    case 'number':
    case 'quantity':
      return { text: shownWords(showLiteral(formula, speaking.profile)), level: LEVEL.atom }
    case 'text':
      return { text: formula.value === '' ? 'an empty text' : formula.value, level: LEVEL.atom }
    case 'truth':
      return { text: String(formula.value), level: LEVEL.atom }
    case 'constant':
      return { text: 'pi', level: LEVEL.atom }
    case 'name':
    case 'field':
    case 'item':
      return spokenName(formula, speaking)
    case 'call':
      return spokenCall(formula, speaking)
    case 'unary':
      return spokenSign(formula, speaking)
    case 'binary':
      return spokenBinary(formula, speaking)
    case 'relation':
      return { text: relationWords(formula, speaking), level: LEVEL.relation }
    case 'group': {
      const body = spoken(formula.body, speaking)
      return body.level >= LEVEL.power ? body : inBrackets(body)
    }
    case 'case':
      return spokenCase(formula, speaking)
    case 'list':
      return {
        text: `the list ${formula.items.map((item) => inner(item, speaking)).join(', ')}, end of list`,
        level: LEVEL.atom,
      }
    case 'record':
      return { text: `the record ${fieldsWords(formula, speaking)}, end of record`, level: LEVEL.atom }
  }
}

function spokenName(
  formula: Extract<Formula, { type: 'name' | 'field' | 'item' }>,
  speaking: Speaking,
): Spoken {
  const meant = speaking.mode === 'numbers' ? meantBy(formula, speaking.operands) : undefined
  if (meant && isPutIn(meant.value)) {
    const { value } = meant
    const text =
      value.type === 'quantity'
        ? shownWords(showPutIn(meant, value, speaking.profile, speaking.angles))
        : valueWords(value, speaking.profile, meant)
    return { text, level: text.startsWith('minus') ? LEVEL.sum : LEVEL.atom }
  }
  if (formula.type === 'name') return { text: pathWords(formula.path), level: LEVEL.atom }
  const owner = held(formula.of, LEVEL.atom, { ...speaking, mode: 'symbols' })
  if (formula.type === 'field') return { text: `${symbolWords(formula.key)} of ${owner}`, level: LEVEL.atom }
  const indices = formula.indices.map((index) => inner(index, speaking)).join(', ')
  return { text: `entry ${indices} of ${owner}`, level: LEVEL.atom }
}
