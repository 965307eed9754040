import { nearestUnit } from './nearest-unit.ts'

/** Why a text is no unit: the fact, and one act to try. */
export interface UnitProblem {
  readonly problem: string
  readonly suggestion?: string
}

/** Names that people write as units and that no factor fits. */
const REFUSED: Readonly<Record<string, UnitProblem>> = Object.assign(Object.create(null) as object, {
  ...everyWay(['degC', 'celsius', 'Celsius', '°C', '℃'], {
    problem: 'is an offset unit, so it cannot be multiplied by a number',
    suggestion: 'write temperature differences in K, for example `20 K`',
  }),
  ...everyWay(['degF', 'fahrenheit', 'Fahrenheit', '°F', '℉'], {
    problem: 'is an offset unit, so it cannot be multiplied by a number',
    suggestion: 'write temperature differences in K: a difference of 1 °F is 5/9 K',
  }),
  ...everyWay(['percent', '%', 'permille', '‰'], {
    problem: 'is no unit: added to a number it would be read in two ways',
    suggestion: 'write the fraction, for example 0.05 for five in a hundred',
  }),
  ...everyWay(['ton', 'tons'], {
    problem: 'has several meanings: a tonne of mass, a metric tonne-force, a short ton-force',
    suggestion: 'write `t` (1000 kg), `tf` (1000 kgf) or `tonf` (2000 lbf)',
  }),
})

function everyWay(names: readonly string[], why: UnitProblem): Record<string, UnitProblem> {
  return Object.fromEntries(
    names.map((name) => [name, { ...why, problem: `\`${name}\` ${why.problem}` } as const]),
  )
}

/** What is wrong with a name that is no unit, and what to write: why `degC` or `ton` is refused, or the unit likely meant. */
export function unknownUnit(name: string, written = name): UnitProblem {
  const refused = REFUSED[name]
  if (refused !== undefined) return refused
  const problem = `there is no unit \`${written}\``
  const near = nearestUnit(name)
  return near === undefined ? { problem } : { problem, suggestion: `did you mean \`${near}\`?` }
}
