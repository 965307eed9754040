import { basename } from 'node:path'
import type { Element, ElementContent } from 'hast'
import { h } from 'hastscript'
import type { Calculation, SolverReport, UsedSheet } from '../calculate/types.ts'
import { show } from '../quantity/show.ts'
import { usedBy } from './checks-of-page.ts'
import { lineLink } from './cross-references.ts'
import { allEntries, isFailure } from './entries.ts'
import type { Page } from './scope.ts'
import { relative } from './solver-note.ts'
import { shownText } from './value-text.ts'

export interface Program {
  readonly programVersion: string
  readonly digest?: string | undefined
}

/** What made the numbers: program, sheets and methods with their editions, solvers with their second routes, and the digest. */
export function computationRecord(calculation: Calculation, program: Program, page: Page): Element[] {
  return [
    h('h2', 'Computation record'),
    h('dl', { className: 'record' }, [
      entry('Program', [`Stanchion ${program.programVersion}`]),
      entry('Sheet', [h('code', basename(calculation.sheet.path))]),
      ...(program.digest === undefined ? [] : [entry('Digest', [h('code', program.digest)])]),
      entry('Units', [unitsWords(calculation)]),
    ]),
    ...sheetsTable(calculation),
    ...solversTable(calculation, page),
  ]
}

const entry = (term: string, content: (ElementContent | string)[]): Element =>
  h('div', [h('dt', term), h('dd', content)])

function unitsWords({ sheet }: Calculation): string {
  const { units = 'metric' } = sheet.meta
  if (typeof units === 'string') return units
  return Object.entries(units)
    .map(([kind, unit]) => `${kind} ${unit}`)
    .join(', ')
}

function sheetsTable(calculation: Calculation): Element[] {
  const used = usedBy(calculation)
  if (used.length === 0) return []
  return [
    h('table', { className: 'sheets-used' }, [
      h('caption', 'Sheets and methods used'),
      h('thead', [
        h(
          'tr',
          ['Used as', 'Sheet', 'Title', 'Source and edition', 'Checked against'].map((name) =>
            h('th', { scope: 'col' }, name),
          ),
        ),
      ]),
      h('tbody', used.map(sheetRow)),
    ]),
  ]
}

function sheetRow({ as, id, builtIn, calculation }: UsedSheet): Element {
  const { meta } = calculation.sheet
  const cases = meta.published?.length ?? 0
  return h('tr', [
    h('td', [h('code', as)]),
    h('th', { scope: 'row' }, [h('code', id)]),
    h('td', meta.title),
    h(
      'td',
      builtIn
        ? [meta.source, meta.clause].filter(Boolean).join(', ')
        : `${meta.sheet}${meta.revision ? ` revision ${meta.revision}` : ''}`,
    ),
    h('td', cases === 0 ? '–' : `${String(cases)} published values`),
  ])
}

function solversTable(calculation: Calculation, page: Page): Element[] {
  const rows = allEntries(calculation).flatMap((entry) =>
    isFailure(entry)
      ? []
      : entry.reports.map((report) => solverRow(page.numbers.of.get(entry), report, page)),
  )
  if (rows.length === 0) return []
  return [
    h('table', { className: 'solvers' }, [
      h('caption', 'Numerical results and their second routes'),
      h('thead', [
        h(
          'tr',
          ['Line', 'Question', 'Route', 'Value', 'Second route', 'Difference'].map((name) =>
            h('th', { scope: 'col' }, name),
          ),
        ),
      ]),
      h('tbody', rows),
    ]),
  ]
}

function solverRow(number: string | undefined, report: SolverReport, page: Page): Element {
  const { second } = report
  return h('tr', [
    h('td', { className: 'number' }, number === undefined ? [] : [lineLink(number)]),
    h('th', { scope: 'row' }, [h('code', report.question)]),
    h('td', report.route),
    h('td', shownText(show({ si: report.value, dimension: report.dimension }, page.profile, { figures: 6 }))),
    h('td', second?.route ?? 'none'),
    h('td', second === undefined ? '–' : relative(second.difference)),
  ])
}
