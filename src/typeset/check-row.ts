import type { Element } from 'hast'
import { h } from 'hastscript'
import type { CheckLine, Verdict } from '../calculate/types.ts'
import { showUtilisation } from '../quantity/show.ts'
import { utilisationBar } from './utilisation-bar.ts'
import { checkMath } from './mathematics.ts'
import type { Scope } from './scope.ts'
import { solverNotes } from './solver-note.ts'
import { laneRow } from './working-lines.ts'

/** One check: what it shows, both sides in symbols and numbers, how far it is used, and the word. */
export function checkRow(line: CheckLine, scope: Scope): Element {
  const { page } = scope
  const meaning = line.statement.meaning
  return laneRow(
    line,
    scope,
    ['check', line.verdict === 'pass' ? 'ok' : 'not-ok'],
    [
      ...(meaning === undefined ? [] : [h('p', { className: 'meaning' }, meaning)]),
      h('div', { className: 'check-sides' }, checkMath(line, page)),
      h('div', { className: 'check-outcome' }, [
        h('span', { className: 'utilisation' }, ['utilisation ', h('strong', utilisationText(line))]),
        utilisationBar(line),
        verdictWord(line.verdict),
      ]),
      ...solverNotes(line.reports, page),
    ],
  )
}

export function verdictWord(verdict: Verdict): Element {
  return h('strong', { className: ['verdict-word', verdict] }, verdict === 'pass' ? 'OK' : 'NOT OK')
}

/** Demand over capacity; a dash where that quotient has no meaning. */
export function utilisationText({ utilisation }: CheckLine): string {
  return utilisation === undefined ? '–' : showUtilisation(utilisation)
}
