import { resolveProfile, isProfileProblem, type Profile } from '../../src/quantity/profile.ts'
import type { Quantified } from '../../src/quantity/show.ts'
import { isUnitProblem, parseUnit, toSi, unitFactor, type UnitExpression } from '../../src/quantity/units.ts'
import type { UnitProfile } from '../../src/sheet/types.ts'

export function unit(text: string): UnitExpression {
  const result = parseUnit(text)
  if (isUnitProblem(result)) throw new Error(result.problem)
  return result
}

export function quantity(value: number, unitText: string): Quantified {
  const expression = unit(unitText)
  return { si: toSi(value, expression), dimension: unitFactor(expression).dimension }
}

export function profile(asked: UnitProfile): Profile {
  const result = resolveProfile(asked)
  if (isProfileProblem(result)) throw new Error(result.problem)
  return result
}
