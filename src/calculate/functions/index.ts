import { nearestName } from '../../quantity/nearest-name.ts'
import { column } from './column.ts'
import { ELEMENTARY } from './elementary.ts'
import { mechanism } from './mechanism.ts'
import {
  critical_load,
  effective_length,
  equilibrium,
  euler_load,
  mode_shape,
  post_buckling,
} from './questions.ts'
import { lookup, material, section } from './tables.ts'
import type { SheetFunction } from './types.ts'

export type { CallContext, SheetFunction } from './types.ts'

const byName = new Map<string, SheetFunction>()

function all(): ReadonlyMap<string, SheetFunction> {
  if (byName.size === 0) {
    const functions = [
      ...ELEMENTARY,
      column,
      critical_load,
      effective_length,
      equilibrium,
      euler_load,
      lookup,
      material,
      mechanism,
      mode_shape,
      post_buckling,
      section,
    ]
    for (const fn of functions.sort((a, b) => (a.name < b.name ? -1 : 1))) byName.set(fn.name, fn)
  }
  return byName
}

/** Every function that sheets can call, sorted by name. */
export function allFunctions(): readonly SheetFunction[] {
  return [...all().values()]
}

export function findFunction(name: string): SheetFunction | undefined {
  return all().get(name)
}

export function nearestFunction(name: string): string | undefined {
  return nearestName(name, [...all().keys()])
}
