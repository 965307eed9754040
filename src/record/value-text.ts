import type { NamedLine, QuantityArray, Value } from '../calculate/types.ts'
import type { Profile } from '../quantity/profile.ts'
import { show } from '../quantity/show.ts'

/** A value as plain text: quantities in the profile's units (or in `unit`), matrices by rows, records by their title. */
export function valueText(value: Value, profile: Profile, unit?: NamedLine['unit']): string {
  switch (value.type) {
    case 'quantity':
      return show(value, profile, unit ? { unit } : {}).text
    case 'array':
      return arrayText(value, profile, unit)
    case 'text':
    case 'truth':
      return String(value.value)
    case 'record':
      return value.title
    case 'list':
      return value.items.map((item) => valueText(item, profile)).join('; ')
    case 'function':
      return `function of ${value.parameters.join(', ')}`
    case 'model':
      return value.description
  }
}

/** `[1 m, 2 m]`; a matrix as `[1, 2; 3, 4]`, as it is written in a sheet. */
function arrayText({ si, dimension }: QuantityArray, profile: Profile, unit: NamedLine['unit']): string {
  const item = (value: number) => show({ si: value, dimension }, profile, unit ? { unit } : {}).text
  const rows = si.map((row) => (typeof row === 'number' ? item(row) : row.map(item).join(', ')))
  return `[${rows.join(si.some((row) => typeof row !== 'number') ? '; ' : ', ')}]`
}
