import { nearestName } from '../../quantity/nearest-name.ts'
import { ELEMENTARY } from './elementary.ts'
import { lookup, material, section } from './tables.ts'
import type { SheetFunction } from './types.ts'

export type { CallContext, SheetFunction } from './types.ts'

/** Every function that sheets can call, sorted by name. */
export const FUNCTIONS: readonly SheetFunction[] = [...ELEMENTARY, lookup, material, section].sort((a, b) =>
  a.name < b.name ? -1 : 1,
)

const byName = new Map(FUNCTIONS.map((fn) => [fn.name, fn]))

export function findFunction(name: string): SheetFunction | undefined {
  return byName.get(name)
}

export function nearestFunction(name: string): string | undefined {
  return nearestName(name, [...byName.keys()])
}
