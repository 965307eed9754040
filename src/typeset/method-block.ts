import type { Element, ElementContent } from 'hast'
import { h } from 'hastscript'
import type { CalculatedBlock, NamedLine, UsedSheet } from '../calculate/types.ts'
import type { MethodBlock } from '../sheet/types.ts'
import { sheetBody } from './body.ts'
import { briefResults, limitsOf } from './entries.ts'
import { symbolMath } from './mathematics.ts'
import { within, type Page, type Scope } from './scope.ts'
import { solverNotes } from './solver-note.ts'
import { valueText } from './value-text.ts'
import { resultsTable } from './results-table.ts'
import { lines } from './working-lines.ts'

/** A used sheet where it is used: its title and source, then its steps with this sheet's numbers, or its results when `brief`. */
export function methodBlock(calculated: CalculatedBlock, scope: Scope, rank: number): Element {
  const block = calculated.block as MethodBlock
  const { used } = calculated
  if (!used) {
    return h('section', { className: 'method' }, [
      h(heading(rank), `${block.id}, used as ${block.as}`),
      ...lines(calculated.failures, scope),
    ])
  }
  const inner = within(scope, used)
  return h('section', { className: ['method', ...(used.brief ? ['brief'] : [])] }, [
    h('header', [h(heading(rank), titleOf(used)), ...sourceNotes(used, scope.page)]),
    ...(used.brief ? brief(calculated, inner) : sheetBody(inner, rank, `${block.as}-`)),
  ])
}

const heading = (rank: number): string => `h${String(Math.min(6, rank))}`

function titleOf({ calculation, builtIn }: UsedSheet): string {
  const { sheet, title } = calculation.sheet.meta
  return builtIn ? title : `${sheet} ${title}`
}

function sourceNotes(used: UsedSheet, { cautioned }: Page): Element[] {
  const { source, clause, revision, unverified } = used.calculation.sheet.meta
  const from = used.builtIn
    ? [source, clause === undefined ? undefined : `clause ${clause}`]
    : [revision === undefined ? 'no revision' : `revision ${revision}`, source]
  const parts: (string | Element)[] = from.flatMap((part) => (part === undefined ? [] : [part, '; ']))
  const isRepeated = cautioned.has(used.id)
  cautioned.add(used.id)
  return [
    h('p', { className: 'method-source' }, [
      ...parts,
      used.builtIn ? 'method sheet ' : 'sheet ',
      h('code', used.id),
      ', used as ',
      h('code', used.as),
      ...(unverified !== undefined && isRepeated ? ['; not verified: see its first use'] : []),
    ]),
    ...(unverified === undefined || isRepeated
      ? []
      : [h('p', { className: 'unverified' }, [h('strong', 'Not verified: '), unverified])]),
  ]
}

/** A bound name is shown as where it comes from: typed, or in the unit asked for there. */
function howOf(line: NamedLine) {
  const { formula, operands, unit } = line
  if (formula.type === 'name' && !unit) return operands.get(formula.path.join('.')) ?? {}
  return { asTyped: formula, ...(unit ? { unit } : {}) }
}

/** The inputs in one paragraph, the results and the limits of use as lines. */
function brief(calculated: CalculatedBlock, inner: Scope): ElementContent[] {
  const { used } = inner
  if (!used) return []
  const inputs = calculated.lines.filter((line): line is NamedLine => line.kind === 'named')
  const { page } = inner
  const shown = inputs.map((line) =>
    h('li', [...symbolMath(line.name, page), ' = ', valueText(line.value, line.origin, page, howOf(line))]),
  )
  const notes = inputs.flatMap(({ reports }) => solverNotes(reports, page))
  return [
    ...(shown.length === 0
      ? []
      : [
          h('div', { className: 'brief-inputs' }, [
            h('p', 'With'),
            h('ul', { className: 'properties' }, shown),
            ...notes,
          ]),
        ]),
    ...resultsTable(briefResults(used, inner.outer?.calculation ?? inner.calculation), inner),
    ...lines(limitsOf(used), inner),
  ]
}
