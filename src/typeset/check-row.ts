import type { Element } from 'hast'
import { h } from 'hastscript'
import type { CheckLine, Verdict } from '../calculate/types.ts'
import { showUtilisation } from '../quantity/show.ts'
import { utilisationBar } from './utilisation-bar.ts'
import { checkMath, checkMathInText } from './mathematics.ts'
import type { Scope } from './scope.ts'
import { solverNotes } from './solver-note.ts'
import { laneRow } from './working-lines.ts'

/** One check: what it shows, both sides in symbols and numbers, how far it is used, and the word. */
export function checkRow(line: CheckLine, scope: Scope): Element {
  const { page } = scope
  const meaning = line.statement.meaning
  if (line.validity || scope.used?.brief) return slimRow(line, scope)
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

/** A limit of use, which is kept or not: it has no utilisation to speak of. */
function slimRow(line: CheckLine, scope: Scope): Element {
  const { meaning } = line.statement
  return laneRow(
    line,
    scope,
    ['check', 'slim', line.verdict === 'pass' ? 'ok' : 'not-ok'],
    [
      h('p', { className: 'meaning' }, [
        ...(meaning === undefined ? [] : [`${meaning}: `]),
        h('span', { className: 'together' }, [
          ...checkMathInText(line, scope.page),
          ' ',
          verdictWord(line.verdict),
        ]),
      ]),
      ...solverNotes(line.reports, scope.page),
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
