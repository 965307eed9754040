import { END_CONDITIONS, type Column, type End, type Restraint } from '../../stability/column/ends.ts'
import type { Dimension } from '../../quantity/dimension.ts'
import { describeKind, describeValue } from '../describe.ts'
import type { Formula, RecordValue, Value } from '../types.ts'
import {
  argumentAt,
  entryAt,
  expectCount,
  expectEntries,
  misused,
  quantityOf,
  recordOf,
} from './arguments.ts'
import type { CallContext, SheetFunction } from './types.ts'

const LENGTH: Dimension = [0, 1, 0, 0]
const STRESS: Dimension = [1, -1, -2, 0]
const SECOND_MOMENT: Dimension = [0, 4, 0, 0]
const RIGIDITY: Dimension = [1, 3, -2, 0]
const ROTATIONAL: Dimension = [1, 2, -2, 0]
const TRANSLATIONAL: Dimension = [1, 0, -2, 0]

const ENTRIES = ['L', 'E', 'I', 'EI', 'base', 'top'] as const
const ENDS = Object.keys(END_CONDITIONS)

/** Makes a uniform column from its record; every entry is needed, nothing has a default. */
export const column: SheetFunction = {
  name: 'column',
  signature: 'column({L: 4.6 m, E: 210 GPa, I: 589 cm^4, base: "pinned", top: "fixed"})',
  summary: 'a uniform elastic column under an axial load at its top, free to shorten',
  explain:
    'L: length; E and I: modulus of elasticity and second moment of area, or EI: their product; base and top: "pinned", "fixed", "free", "guided" (no rotation, free to sway), or springs {rotation: k, translation: k}, where each is a stiffness (moment per rad, force per length), "fixed" or "free". All are needed. Gives a model, to be asked `critical_load` and `effective_length`. The load keeps its direction.',
  source:
    'Livesley’s stability functions with the count of Wittrick and Williams (1971); Timoshenko and Gere, Theory of Elastic Stability, ch. 2',
  group: 'model',
  call(args, context) {
    expectCount(args, 1, 1, context, this.signature)
    const part = argumentAt(context, 0)
    const record = recordOf(args[0] as Value, part, 'the column')
    expectEntries(record, ENTRIES, part, '`column`')
    const model: Column = {
      L: entry(record, 'L', LENGTH, part, context),
      EI: rigidity(record, part, context),
      base: end(record, 'base', part, context),
      top: end(record, 'top', part, context),
    }
    return {
      type: 'model',
      of: 'column',
      description: `column, ${describeValue(required(record, 'L', part))}, base ${describeEnd(record.fields['base'])}, top ${describeEnd(record.fields['top'])}`,
      model,
    }
  },
}

function required(record: RecordValue, key: string, part: Formula): Value {
  const value = record.fields[key]
  if (value) return value
  throw misused(
    part,
    `\`${key}\` of the column is missing`,
    `its entries are ${ENTRIES.join(', ')}; \`EI\` stands for \`E\` and \`I\``,
  )
}

function entry(
  record: RecordValue,
  key: string,
  dimension: Dimension,
  part: Formula,
  context: CallContext,
): number {
  return quantityOf(
    required(record, key, part),
    dimension,
    entryAt(part, key),
    `\`${key}\` of the column,`,
    context,
  )
}

function rigidity(record: RecordValue, part: Formula, context: CallContext): number {
  const product = record.fields['EI']
  if (!product)
    return entry(record, 'E', STRESS, part, context) * entry(record, 'I', SECOND_MOMENT, part, context)
  if (record.fields['E'] ?? record.fields['I'])
    throw misused(entryAt(part, 'EI'), '`EI` is given beside `E` or `I`', 'give `EI`, or `E` and `I`')
  return entry(record, 'EI', RIGIDITY, part, context)
}

function end(record: RecordValue, key: 'base' | 'top', part: Formula, context: CallContext): End {
  const value = required(record, key, part)
  const place = entryAt(part, key)
  if (value.type === 'text') {
    if (Object.hasOwn(END_CONDITIONS, value.value))
      return END_CONDITIONS[value.value as keyof typeof END_CONDITIONS]
    throw misused(
      place,
      `\`${key}\` is "${value.value}"`,
      `use one of ${ENDS.map((name) => `"${name}"`).join(', ')}, or springs as {rotation: …, translation: …}`,
    )
  }
  if (value.type !== 'record' || value.of !== 'record')
    throw misused(
      place,
      `\`${key}\` is ${describeKind(value)}`,
      `use one of ${ENDS.map((name) => `"${name}"`).join(', ')}, or springs as {rotation: …, translation: …}`,
    )
  expectEntries(value, ['rotation', 'translation'], place, `\`${key}\``)
  return {
    rotation: restraint(value, 'rotation', ROTATIONAL, place, key, context),
    translation: restraint(value, 'translation', TRANSLATIONAL, place, key, context),
  }
}

function restraint(
  springs: RecordValue,
  what: 'rotation' | 'translation',
  dimension: Dimension,
  part: Formula,
  key: string,
  context: CallContext,
): Restraint {
  const value = springs.fields[what]
  if (!value)
    throw misused(
      part,
      `\`${key}\` does not say how its ${what} is held`,
      `add \`${what}: "fixed"\`, \`"free"\` or a stiffness`,
    )
  if (value.type === 'text') {
    if (value.value === 'fixed' || value.value === 'free') return value.value
    throw misused(
      entryAt(part, what),
      `the ${what} of \`${key}\` is "${value.value}"`,
      'use "fixed", "free" or a stiffness',
    )
  }
  return quantityOf(value, dimension, entryAt(part, what), `the ${what} of \`${key}\`,`, context)
}

function describeEnd(value: Value | undefined): string {
  if (value?.type === 'text') return value.value
  if (value?.type !== 'record') return 'not given'
  return Object.entries(value.fields)
    .map(([what, spring]) => `${what} ${spring.type === 'text' ? spring.value : describeValue(spring)}`)
    .join(', ')
}
