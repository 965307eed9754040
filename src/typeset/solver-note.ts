import type { Element, ElementContent } from 'hast'
import { h } from 'hastscript'
import type { SolverReport } from '../calculate/types.ts'
import { show } from '../quantity/show.ts'
import type { Page } from './scope.ts'
import { shownText } from './value-text.ts'

/** Under a line: by which route each numerical result was found, and how far an independent one differs from it. */
export function solverNotes(reports: readonly SolverReport[], page: Page): Element[] {
  return reports.map((report) => solverNote(report, page))
}

export function solverNote(report: SolverReport, page: Page): Element {
  const value = (si: number): ElementContent[] =>
    shownText(show({ si, dimension: report.dimension }, page.profile, { figures: FIGURES }))
  const { second } = report
  return h('div', { className: 'solver' }, [
    h('p', [
      h('code', report.question),
      ': ',
      ...value(report.value),
      ` by ${report.route}${endedWords(report)}`,
    ]),
    ...(second === undefined
      ? [h('p', 'No second route exists for this result.')]
      : [
          h('p', [
            'Second route ',
            ...value(second.value),
            ` by ${second.route}: differs by ${relative(second.difference)}, ${relative(second.allowed)} allowed`,
          ]),
        ]),
    ...(report.source === undefined ? [] : [h('p', report.source)]),
  ])
}

const FIGURES = 6

const ENDED: Readonly<Record<Exclude<SolverReport['status'], 'closed-form'>, string>> = {
  'bad-bracket': 'no bracket was found',
  converged: 'converged',
  'iteration-limit': 'stopped at the limit of iterations',
  'not-finite': 'ended without a finite value',
}

function endedWords({ status, iterations, residual }: SolverReport): string {
  const after =
    iterations === undefined
      ? ''
      : ` after ${String(iterations)} ${iterations === 1 ? 'iteration' : 'iterations'}`
  const left = residual === undefined ? '' : `, residual ${relative(residual)}`
  return status === 'closed-form' ? '' : `; ${ENDED[status]}${after}${left}`
}

/** A small relative number in one figure and a power of ten: `3×10⁻⁹`; zero is `0`. */
export function relative(value: number): string {
  if (value === 0) return '0'
  const [digits = '', power = '0'] = value.toExponential(0).split('e')
  return `${digits}×10${superscript(Number(power))}`
}

const RAISED = '⁰¹²³⁴⁵⁶⁷⁸⁹'

function superscript(whole: number): string {
  return String(whole).replaceAll(/[-\d]/g, (digit) =>
    digit === '-' ? '⁻' : (RAISED[Number(digit)] ?? digit),
  )
}
