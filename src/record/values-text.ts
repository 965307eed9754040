import type { Calculation, NamedLine } from '../calculate/types.ts'
import type { Profile } from '../quantity/profile.ts'
import { showComparison } from '../quantity/show-comparison.ts'
import { showUtilisation } from '../quantity/show.ts'
import { profileOf } from './profile-of.ts'
import { valueText } from './value-text.ts'

/**
 * One line a value and a check, in the order of the document, the names of used sheets as `minor.chi`: what version
 * control compares in place of the sheet's text.
 */
export function valuesText(calculation: Calculation): string {
  const profile = profileOf(calculation)
  return lines(calculation, '', profile)
    .map((line) => `${line}\n`)
    .join('')
}

function lines(calculation: Calculation, prefix: string, profile: Profile): string[] {
  return calculation.blocks.flatMap(({ lines: own, used }) => {
    if (used) return lines(used.calculation, `${prefix}${used.as}.`, profile)
    return own.map((line) => {
      if (line.kind === 'named') return namedText(line, prefix, profile)
      const [demand, capacity] = showComparison(line.demand, line.capacity, profile)
      const ratio = line.utilisation === undefined ? '' : ` ${showUtilisation(line.utilisation)}`
      return `check ${prefix}${line.title}: ${demand.text} against ${capacity.text}${ratio} ${line.verdict === 'pass' ? 'OK' : 'NOT OK'}`
    })
  })
}

function namedText({ name, value, unit, statement }: NamedLine, prefix: string, profile: Profile): string {
  const meaning = statement.meaning === undefined ? '' : `  # ${statement.meaning}`
  return `${prefix}${name} = ${valueText(value, profile, unit)}${meaning}`
}
