import type { Formula } from '../../calculate/types.ts'
import { anglesIn } from './angles-in.ts'
import { tableOf } from './lookup-tex.ts'
import { meantBy } from './operand.ts'
import { LEVEL, withoutGroup } from './print.ts'
import { rewritten } from './rewritten.ts'
import { inner, type Speaking, type Spoken } from './spoken.ts'
import { symbolWords } from './symbol.ts'

export function fieldsWords({ fields }: Extract<Formula, { type: 'record' }>, speaking: Speaking): string {
  return fields
    .map(({ key, value }) => {
      const [name, words] = [symbolWords(key), inner(value, speaking)]
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

export function spokenCall(call: Extract<Formula, { type: 'call' }>, saying: Speaking): Spoken {
  const other = rewritten(call)
  if (other) return saying.speak(other, saying)
  const speaking = { ...saying, angles: anglesIn(call) }
  const lookup = call.name === 'lookup' ? tableOf(call) : undefined
  if (lookup) return spokenLookup(lookup, speaking)
  const args = call.args.map((arg): Spoken => {
    const body = withoutGroup(arg)
    return body.type === 'record'
      ? { text: fieldsWords(body, speaking), level: LEVEL.case }
      : speaking.speak(body, speaking)
  })
  const name = CALLS.get(call.name) ?? call.name.replaceAll('_', ' ')
  const isShort = args.length === 1 && args[0]?.level === LEVEL.atom
  const text = `the ${name} of ${args.map((arg) => arg.text).join(' and ')}`
  return { text: isShort ? text : `${text}, end of ${name}`, level: LEVEL.power }
}

function spokenLookup({ key, table }: NonNullable<ReturnType<typeof tableOf>>, speaking: Speaking): Spoken {
  const symbol = inner(key, { ...speaking, mode: 'symbols' })
  const known = key.type === 'text' ? key.value : meantBy(key, speaking.operands)?.value
  const text = typeof known === 'object' && known.type === 'text' ? known.value : known
  const entry = table.fields.find((field) => field.key === text)
  if (speaking.mode === 'numbers' && entry) return speaking.speak(withoutGroup(entry.value), speaking)
  const rows = table.fields.map(({ key: name, value }) => `${name}: ${inner(value, speaking)}`)
  const taken = entry ? `; ${entry.key} applies` : ''
  return { text: `by the table of ${symbol}: ${rows.join('; ')}${taken}; end of table`, level: LEVEL.case }
}
