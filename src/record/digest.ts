import { createHash } from 'node:crypto'
import type { Calculation, Value } from '../calculate/types.ts'
import { withUsed } from '../calculate/use-sheet.ts'
import { show } from '../quantity/show.ts'
import { programVersion } from '../version.ts'
import { profileOf } from './profile-of.ts'

/**
 * What a calculation depends on and shows, as `sha256:…`: the texts of the sheet and of all sheets it uses, the table rows
 * used with their sources, every shown value and verdict, and the program's version. The last bits of floating-point
 * numbers, which differ between versions of Node, do not enter.
 */
export function digestOf(calculation: Calculation): string {
  const hash = createHash('sha256')
  const add = (...parts: readonly string[]) => {
    for (const part of parts) hash.update(`${Buffer.byteLength(part)}:`).update(part)
  }
  add('stanchion/digest/1', programVersion())
  const profile = profileOf(calculation)
  const shown = (value: Value): string => {
    if (value.type === 'quantity') return show(value, profile).text
    if (value.type === 'text' || value.type === 'truth') return String(value.value)
    if (value.type === 'array')
      return value.si
        .flat()
        .map((si) => show({ si, dimension: value.dimension }, profile).text)
        .join(' ')
    if (value.type === 'record')
      return [
        value.title,
        value.source ?? '',
        ...Object.entries(value.fields).map(([key, field]) => `${key}=${shown(field)}`),
      ].join(' ')
    if (value.type === 'list') return value.items.map(shown).join(' ')
    return value.type === 'model' ? value.description : value.name
  }
  for (const part of withUsed(calculation)) {
    add(part.sheet.text)
    for (const { lines } of part.blocks) {
      for (const line of lines) {
        if (line.kind === 'named') add(line.name, shown(line.value))
        else add(line.title, shown(line.demand), line.statement.relation, shown(line.capacity), line.verdict)
      }
    }
  }
  return `sha256:${hash.digest('hex')}`
}

/** The first twelve digits, for the foot of a sheet. */
export function shortDigest(digest: string): string {
  return digest.replace('sha256:', '').slice(0, 12)
}
