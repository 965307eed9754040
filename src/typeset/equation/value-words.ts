import type { Value } from '../../calculate/types.ts'
import type { Profile } from '../../quantity/profile.ts'
import { shownWords, showOperand } from './quantity-tex.ts'
import { symbolWords } from './symbol.ts'
import type { ValueOptions } from './value-tex.ts'

/** A value as spoken. Of an array or a list only the kind and size are told: its entries stand in the MathML and the record. */
export function valueWords(value: Value, profile: Profile, options: ValueOptions = {}): string {
  switch (value.type) {
    case 'quantity':
      return shownWords(showOperand(options, value, profile))
    case 'array':
      return arrayWords(value.si)
    case 'text':
      return value.value === '' ? 'an empty text' : value.value
    case 'truth':
      return String(value.value)
    case 'record':
      return value.of === 'record'
        ? `a record of ${counted(Object.keys(value.fields).length, 'entry', 'entries')}`
        : value.title
    case 'function':
      return `the function ${symbolWords(value.name)}`
    case 'model':
      return value.description
    case 'list':
      return `a list of ${counted(value.items.length, 'entry', 'entries')}`
  }
}

function arrayWords(si: readonly unknown[]): string {
  const [first] = si
  return Array.isArray(first)
    ? `a matrix of ${counted(si.length, 'row', 'rows')} and ${counted(first.length, 'column', 'columns')}`
    : `a vector of ${counted(si.length, 'entry', 'entries')}`
}

function counted(count: number, one: string, many: string): string {
  return `${String(count)} ${count === 1 ? one : many}`
}
