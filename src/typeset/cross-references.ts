import type { ElementContent } from 'hast'
import { h } from 'hastscript'
import type { Line, NamedLine } from '../calculate/types.ts'
import { pathsIn } from './paths-in.ts'
import type { Scope } from './scope.ts'

/** A line's number as a link to it. */
export function lineLink(number: string): ElementContent {
  return h('a', { href: `#line-${number}` }, number)
}

/** Where the values that a line uses come from: `from 2.01, 2.03; TW-100 1.02`. Nothing when it uses none. */
export function crossReferences(line: Line, scope: Scope): ElementContent[] {
  const bound = line.kind === 'named' && line.boundBy !== undefined
  const seenFrom = bound ? (scope.outer ?? scope) : scope
  const paths = line.kind === 'named' ? pathsIn(line.formula, parametersOf(line)) : [...line.operands.keys()]
  const own = new Set<string>()
  const others = new Map<string, Set<string>>()
  for (const path of paths) {
    const origin = originOf(path, seenFrom)
    if (origin === undefined) continue
    if (origin.sheet === undefined) own.add(origin.number)
    else {
      const numbers = others.get(origin.sheet) ?? new Set()
      others.set(origin.sheet, numbers.add(origin.number))
    }
  }
  const groups = [
    ...(own.size > 0 ? [links(own)] : []),
    ...[...others].map(([sheet, numbers]) => [`${sheet} `, ...links(numbers)]),
  ]
  return groups.length === 0
    ? []
    : [
        h('div', { className: 'from' }, [
          'from ',
          ...groups.flatMap((group, i) => (i === 0 ? group : ['; ', ...group])),
        ]),
      ]
}

function links(numbers: ReadonlySet<string>): (ElementContent | string)[] {
  const sorted = [...numbers].filter((number) => number !== '').sort(byNumber)
  return sorted.flatMap((number, i) => (i === 0 ? [lineLink(number)] : [', ', lineLink(number)]))
}

const parametersOf = ({ statement }: NamedLine): string[] =>
  statement.kind === 'function' ? statement.parameters.map(({ name }) => name) : []

interface Origin {
  /** The line that defines it; empty when that is not on the page. */
  readonly number: string
  /** The id of another sheet of the project, when it comes from one. */
  readonly sheet?: string
}

function originOf(path: string, { calculation, page }: Scope): Origin | undefined {
  const [first = '', second = ''] = path.split('.')
  const used = calculation.usedSheets.get(first)
  if (!used) return printed(calculation.names.get(first), page.numbers.of)
  const inner = printed(used.calculation.names.get(second), page.numbers.of)
  if (used.builtIn) return inner
  return { number: inner?.number ?? '', sheet: used.calculation.sheet.meta.sheet }
}

function printed(
  line: NamedLine | undefined,
  numbers: ReadonlyMap<unknown, string>,
): { readonly number: string } | undefined {
  const number = line && numbers.get(line)
  return number === undefined ? undefined : { number }
}

function byNumber(a: string, b: string): number {
  const [sectionA = 0, lineA = 0] = a.split('.').map(Number)
  const [sectionB = 0, lineB = 0] = b.split('.').map(Number)
  return sectionA - sectionB || lineA - lineB
}
