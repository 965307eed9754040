import type { Calculation } from '../calculate/types.ts'
import { isProfileProblem, resolveProfile, type Profile } from '../quantity/profile.ts'

/** The unit profile of a calculation; a sheet whose `units` cannot be followed (which is an error of its own) shows metric units. */
export function profileOf({ sheet }: Calculation): Profile {
  const profile = resolveProfile(sheet.meta.units)
  return isProfileProblem(profile) ? (resolveProfile('metric') as Profile) : profile
}
