import type { Formula } from '../calculate/types.ts'

/** The dotted paths of all names in a formula and the functions it calls, each once, in the order they stand. */
export function pathsIn(formula: Formula, parameters: readonly string[] = []): string[] {
  const found = new Set<string>()
  walk(formula, found)
  return [...found].filter((path) => !parameters.includes(path))
}

function walk(part: unknown, found: Set<string>): void {
  if (Array.isArray(part)) {
    for (const item of part) walk(item, found)
  } else if (typeof part === 'object' && part !== null) {
    const { type, path, name } = part as { type?: unknown; path?: unknown; name?: unknown }
    if (type === 'call') found.add(String(name))
    if (type === 'name' && Array.isArray(path)) found.add(path.join('.'))
    else for (const child of Object.values(part)) walk(child, found)
  }
}
