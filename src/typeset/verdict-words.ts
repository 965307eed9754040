import type { Element } from 'hast'
import { h } from 'hastscript'
import type { VFileMessage } from 'vfile-message'
import type { CheckLine } from '../calculate/types.ts'
import { severityOf } from '../finding.ts'
import { showComparison } from '../quantity/show-comparison.ts'
import type { SheetVerdict } from '../verify/verdict.ts'
import { utilisationText } from './check-row.ts'
import { failedChecks, type PageChecks } from './checks-of-page.ts'
import { lineLink } from './cross-references.ts'
import type { Page } from './scope.ts'
import { shownText } from './value-text.ts'

export interface Outcome {
  readonly verdict: SheetVerdict
  readonly checks: PageChecks
  readonly findings: readonly VFileMessage[]
}

/** The outcome of the sheet, in words: what holds, what does not, and which check governs. */
export function verdictWords(outcome: Outcome, page: Page): Element {
  const { governing } = outcome.checks
  return h('div', { className: ['verdict', outcome.verdict] }, [
    h('h2', 'Result'),
    h('p', { className: 'verdict-sentence' }, headline(outcome)),
    ...(governing && outcome.verdict !== 'error' ? [governingSentence(governing, page)] : []),
  ])
}

/** For the head of every page, when the sheet must not be relied on. */
export function alarmWords(outcome: Outcome): string | undefined {
  if (outcome.verdict === 'error') return `NOT CALCULATED\n${counted(errors(outcome), 'error')}`
  const failed = failedChecks(outcome.checks).length
  return outcome.verdict === 'fail' ? `NOT OK\n${counted(failed, 'check')} failed` : undefined
}

/** A banner above everything else, when the sheet must not be relied on. */
export function banner(outcome: Outcome): Element[] {
  if (outcome.verdict !== 'error') return []
  const words = `${counted(errors(outcome), 'error')} in this sheet: it is not calculated completely, and no result of it may be relied on.`
  return [h('p', { className: 'banner', role: 'alert' }, [h('strong', 'NOT CALCULATED'), ` – ${words}`])]
}

function headline({ verdict, checks, findings }: Outcome): string {
  if (verdict === 'error') return `Not calculated completely: ${counted(errors({ findings }), 'error')}.`
  const total = checks.own.length + checks.others.length
  const failedLimits = checks.limits.filter(({ check }) => check.verdict === 'fail').length
  const failed = failedChecks(checks).length - failedLimits
  const limits =
    failedLimits > 0
      ? ` ${counted(failedLimits, 'limit')} of use ${failedLimits === 1 ? 'is' : 'are'} NOT kept.`
      : ''
  if (total === 0) return `The sheet has no check of its own; nothing is shown to be adequate.${limits}`
  if (failed > 0)
    return `${String(failed)} of ${counted(total, 'check')} ${failed === 1 ? 'does' : 'do'} NOT hold.${limits}`
  return `${total === 1 ? 'The one check holds' : `All ${String(total)} checks hold`}.${limits}`
}

function governingSentence(check: CheckLine, page: Page): Element {
  const [demand, capacity] = showComparison(check.demand, check.capacity, page.profile)
  const number = page.numbers.of.get(check)
  return h('p', { className: 'governing' }, [
    'Governing: ',
    h('strong', check.title),
    ...(number === undefined ? [] : [', line ', lineLink(number)]),
    ': ',
    ...shownText(demand),
    ' against a limit of ',
    ...shownText(capacity),
    check.utilisation === undefined ? '' : `, utilisation ${utilisationText(check)}`,
    '.',
  ])
}

const errors = ({ findings }: Pick<Outcome, 'findings'>): number =>
  findings.filter((finding) => severityOf(finding) === 'error').length

export function counted(count: number, noun: string): string {
  return `${String(count)} ${noun}${count === 1 ? '' : 's'}`
}
