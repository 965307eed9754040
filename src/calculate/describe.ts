import { withArticle } from '../quantity/kinds.ts'
import { resolveProfile, type Profile } from '../quantity/profile.ts'
import { show } from '../quantity/show.ts'
import type { Quantity, Value } from './types.ts'

/** Messages name values in SI-based units whatever the sheet's own profile: the place of a finding does not know it. */
const profile = resolveProfile('metric') as Profile

/** A value as a message names it: `4.6 m`, `a section`, `true`. */
export function describeValue(value: Value): string {
  switch (value.type) {
    case 'quantity':
      return show(value, profile).text
    case 'array':
      return `an array of ${value.si.length} values`
    case 'text':
      return `"${value.value}"`
    case 'truth':
      return String(value.value)
    case 'record':
      return value.of === 'record' ? 'a record' : `the ${value.of} ${value.title}`
    case 'function':
      return `the function ${value.name}`
    case 'model':
      return `the model ${value.of}`
    case 'list':
      return `a list of ${value.items.length}`
  }
}

/** What sort of thing a value is: `a length`, `a number without unit`, `a text`. */
export function describeKind(value: Value): string {
  switch (value.type) {
    case 'quantity':
      return withArticle(value.dimension)
    case 'array':
      return `an array, each ${withArticle(value.dimension)}`
    case 'text':
      return 'a text'
    case 'truth':
      return 'true or false'
    case 'record':
      return value.of === 'record' ? 'a record' : `a ${value.of}`
    case 'function':
      return 'a function'
    case 'model':
      return `a ${value.of} model`
    case 'list':
      return 'a list'
  }
}

export function quantity(si: number, dimension: Quantity['dimension']): Quantity {
  return { type: 'quantity', si, dimension }
}
