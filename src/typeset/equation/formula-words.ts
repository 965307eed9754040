import type { Formula, RelationOperator } from '../../calculate/types.ts'
import { isDimensionless } from '../../quantity/dimension.ts'
import { branchesOf } from './case-tex.ts'
import { tableOf } from './lookup-tex.ts'
import { meantBy } from './operand.ts'
import { isPutIn, showPutIn } from './put-in.ts'
import { anglesIn } from './angles-in.ts'
import { LEVEL, withoutGroup, type Printing } from './print.ts'
import { shownWords, showLiteral } from './quantity-tex.ts'
import { rewritten } from './rewritten.ts'
import { pathWords, symbolWords } from './symbol.ts'
import { valueWords } from './value-words.ts'

/** What is spoken, and how firmly it holds together (see print.ts). */
interface Spoken {
  readonly text: string
  readonly level: number
}

/** Where a formula is in its line: symbols or numbers, with what is known of its names. */
export type Speaking = Pick<Printing, 'mode' | 'profile' | 'operands' | 'branches' | 'angles'>

/** A formula as spoken. Brackets, fractions and roots are closed in words, so that it has one meaning by ear too. */
export function formulaWords(formula: Formula, speaking: Speaking): string {
  return spoken(withoutGroup(formula), speaking).text
}

function spoken(formula: Formula, speaking: Speaking): Spoken {
  const inner = (part: Formula) => formulaWords(part, speaking)
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
      return { text: `the list ${formula.items.map(inner).join(', ')}, end of list`, level: LEVEL.atom }
    case 'record':
      return { text: `the record ${fieldsWords(formula, speaking)}, end of record`, level: LEVEL.atom }
  }
}

function inBrackets({ text }: Spoken): Spoken {
  return { text: `open bracket ${text} close bracket`, level: LEVEL.atom }
}

function held(formula: Formula, level: number, speaking: Speaking): string {
  const part = spoken(formula, speaking)
  return (part.level < level ? inBrackets(part) : part).text
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
  const indices = formula.indices.map((index) => formulaWords(index, speaking)).join(', ')
  return { text: `entry ${indices} of ${owner}`, level: LEVEL.atom }
}

function spokenSign({ operator, body }: Extract<Formula, { type: 'unary' }>, speaking: Speaking): Spoken {
  if (operator === '+') return spoken(body, speaking)
  const word = operator === '-' ? 'minus' : 'not'
  return { text: `${word} ${held(body, LEVEL.power, speaking)}`, level: LEVEL.sum }
}

function spokenBinary(formula: Extract<Formula, { type: 'binary' }>, saying: Speaking): Spoken {
  const { operator, left, right } = formula
  const isLogic = operator === 'and' || operator === 'or'
  const speaking = isLogic || saying.angles === 'degrees' ? saying : { ...saying, angles: 'radians' as const }
  const between = (word: string, level: number, rightLevel = level + 1) => ({
    text: `${held(left, level, speaking)} ${word} ${held(right, rightLevel, speaking)}`,
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
      return between('and', LEVEL.and)
    case 'or':
      return between('or', LEVEL.or)
  }
}

function spokenQuotient(left: Formula, right: Formula, speaking: Speaking): Spoken {
  const [over, under] = [spoken(left, speaking), spoken(right, speaking)]
  const isShort = over.level === LEVEL.atom && under.level === LEVEL.atom
  return isShort
    ? { text: `${over.text} over ${under.text}`, level: LEVEL.product }
    : { text: `the fraction ${over.text} divided by ${under.text}, end of fraction`, level: LEVEL.atom }
}

function spokenPower(base: Formula, exponent: Formula, speaking: Speaking): Spoken {
  const inner = spoken(base, speaking)
  const body = (inner.level < LEVEL.atom || isQuantity(base, speaking) ? inBrackets(inner) : inner).text
  const level = LEVEL.power
  if (exponent.type === 'number' && exponent.text === '2') return { text: `${body} squared`, level }
  if (exponent.type === 'number' && exponent.text === '3') return { text: `${body} cubed`, level }
  const power = spoken(exponent, speaking)
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

function spokenCase(formula: Extract<Formula, { type: 'case' }>, speaking: Speaking): Spoken {
  const { branches, taken } = branchesOf(formula, speaking.branches)
  const chosen = taken === undefined ? undefined : branches[taken]
  if (speaking.mode === 'numbers' && chosen) return spoken(chosen.value, speaking)
  const rows = branches.map(({ value, condition }, i) => {
    const when = condition ? `if ${formulaWords(condition, speaking)}` : 'otherwise'
    return `${formulaWords(value, speaking)} ${when}${i === taken ? ', which applies' : ''}`
  })
  return { text: `by cases: ${rows.join('; ')}; end of cases`, level: LEVEL.case }
}

function fieldsWords({ fields }: Extract<Formula, { type: 'record' }>, speaking: Speaking): string {
  return fields
    .map(({ key, value }) => {
      const [name, words] = [symbolWords(key), formulaWords(value, speaking)]
      return name === words ? name : `${name} ${words}`
    })
    .join(', ')
}

const CALLS: ReadonlyMap<string, string> = new Map([
  ['sin', 'sine'],
  ['cos', 'cosine'],
  ['tan', 'tangent'],
  ['cot', 'cotangent'],
  ['asin', 'arc sine'],
  ['acos', 'arc cosine'],
  ['atan', 'arc tangent'],
  ['log', 'natural logarithm'],
  ['log10', 'logarithm to base ten'],
  ['exp', 'exponential'],
  ['sqrt', 'square root'],
  ['cbrt', 'cube root'],
  ['abs', 'magnitude'],
  ['min', 'least'],
  ['max', 'greatest'],
  ['floor', 'whole number not above'],
  ['ceil', 'whole number not below'],
  ['inv', 'inverse'],
  ['det', 'determinant'],
  ['norm', 'length'],
  ['nthRoot', 'n-th root'],
  ['mod', 'remainder'],
  ['round', 'rounding'],
  ['sinh', 'hyperbolic sine'],
  ['cosh', 'hyperbolic cosine'],
  ['tanh', 'hyperbolic tangent'],
])

function spokenCall(call: Extract<Formula, { type: 'call' }>, saying: Speaking): Spoken {
  const other = rewritten(call)
  if (other) return spoken(other, saying)
  const speaking = { ...saying, angles: anglesIn(call) }
  const lookup = call.name === 'lookup' ? tableOf(call) : undefined
  if (lookup) return spokenLookup(lookup, speaking)
  const args = call.args.map((arg): Spoken => {
    const body = withoutGroup(arg)
    return body.type === 'record'
      ? { text: fieldsWords(body, speaking), level: LEVEL.case }
      : spoken(body, speaking)
  })
  const name = CALLS.get(call.name) ?? call.name.replaceAll('_', ' ')
  const isShort = args.length === 1 && args[0]?.level === LEVEL.atom
  const text = `the ${name} of ${args.map((arg) => arg.text).join(' and ')}`
  return { text: isShort ? text : `${text}, end of ${name}`, level: LEVEL.power }
}

function spokenLookup({ key, table }: NonNullable<ReturnType<typeof tableOf>>, speaking: Speaking): Spoken {
  const symbol = formulaWords(key, { ...speaking, mode: 'symbols' })
  const known = key.type === 'text' ? key.value : meantBy(key, speaking.operands)?.value
  const text = typeof known === 'object' && known.type === 'text' ? known.value : known
  const entry = table.fields.find((field) => field.key === text)
  if (speaking.mode === 'numbers' && entry) return spoken(withoutGroup(entry.value), speaking)
  const rows = table.fields.map(({ key: name, value }) => `${name}: ${formulaWords(value, speaking)}`)
  const taken = entry ? `; ${entry.key} applies` : ''
  return { text: `by the table of ${symbol}: ${rows.join('; ')}${taken}; end of table`, level: LEVEL.case }
}
