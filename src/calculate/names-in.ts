import type { Span } from '../sheet/types.ts'
import { partsOf } from './parts-of.ts'
import type { Formula } from './types.ts'

export interface NameUse {
  readonly name: string
  /** The whole dotted path: ['tube', 'A']. */
  readonly path: readonly string[]
  readonly span: Span
  /** It is called as a function. */
  readonly called: boolean
}

/** Every name that a formula mentions, in the order of the text. */
export function namesIn(formula: Formula): NameUse[] {
  const found: NameUse[] = []
  const visit = (part: Formula): void => {
    if (part.type === 'name')
      found.push({ name: part.path[0] as string, path: part.path, span: part.span, called: false })
    if (part.type === 'call')
      found.push({ name: part.name, path: [part.name], span: part.span, called: true })
    partsOf(part).forEach(visit)
  }
  visit(formula)
  return found
}
