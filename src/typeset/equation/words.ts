import type { CheckLine, NamedLine } from '../../calculate/types.ts'
import type { Profile } from '../../quantity/profile.ts'
import type { CheckSide } from './check-equation.ts'
import type { EquationParts } from './equation-parts.ts'
import { reasonsOf } from './case-tex.ts'
import { comparisonWords, formulaWords } from './formula-words.ts'
import { relationWord } from './logic-words.ts'
import type { Speaking } from './spoken.ts'
import { shownWords } from './quantity-tex.ts'
import { symbolWords } from './symbol.ts'
import { valueWords } from './value-words.ts'

/** A calculated line as spoken: the same parts as are printed. */
export function equationWords(line: NamedLine, profile: Profile, parts: EquationParts): string {
  const { statement, formula, operands, branches, value, unit } = line
  const speaking: Omit<Speaking, 'speak'> = {
    mode: 'symbols',
    angles: 'as-shown',
    profile,
    operands,
    branches,
  }
  const parameters =
    statement.kind === 'function'
      ? ` of ${statement.parameters.map(({ name }) => symbolWords(name)).join(' and ')}`
      : ''
  const said = [`${symbolWords(line.name)}${parameters}`]
  if (parts.symbolic) said.push(formulaWords(formula, speaking))
  if (parts.substituted) said.push(formulaWords(formula, { ...speaking, mode: 'numbers' }))
  if (parts.result) said.push(valueWords(value, profile, { unit, asTyped: unit ? undefined : formula }))
  const reasons = parts.because ? reasonsOf(formula, branches) : []
  const why = reasons.map((reason) => comparisonWords(reason, { ...speaking, mode: 'numbers' }))
  return `${said.join(' equals ')}${why.length === 0 ? '' : `, as ${why.join(' and ')}`}`
}

/** A check as spoken: 'N sub Ed equals 285 kilonewtons, is at most, N sub b Rd equals 734 kilonewtons'. */
export function checkWords(line: CheckLine, profile: Profile, left: CheckSide, right: CheckSide): string {
  const { operands, branches, statement, verdict } = line
  const speaking: Omit<Speaking, 'speak'> = {
    mode: 'symbols',
    angles: 'as-shown',
    profile,
    operands,
    branches,
  }
  const side = ({ formula, value, hasSymbols }: CheckSide) =>
    hasSymbols ? `${formulaWords(formula, speaking)} equals ${shownWords(value)}` : shownWords(value)
  const relation = relationWord(statement.relation, verdict === 'pass')
  return `${side(left)}, ${relation}, ${side(right)}`
}
