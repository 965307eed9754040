import type { Element, ElementContent } from 'hast'
import { h } from 'hastscript'
import type { CheckLine, NamedLine } from '../calculate/types.ts'
import { checkRow } from './check-row.ts'
import { isFailure, type Entry } from './entries.ts'
import { evidence, lineNumber, tick } from './evidence.ts'
import { failureLine } from './failure-line.ts'
import { lineMath } from './mathematics.ts'
import type { Scope } from './scope.ts'
import { solverNotes } from './solver-note.ts'

/** Numbered lines, each with its evidence beside it. */
export function lines(entries: readonly Entry[], scope: Scope): Element[] {
  if (entries.length === 0) return []
  return [
    h(
      'ol',
      { className: 'lines' },
      entries.map((entry) => oneLine(entry, scope)),
    ),
  ]
}

function oneLine(entry: Entry, scope: Scope): Element {
  if (isFailure(entry)) return failureLine(entry, scope)
  return entry.kind === 'check' ? checkRow(entry, scope) : workingLine(entry, scope)
}

/** What the line is, in words, then how it is found. */
function workingLine(line: NamedLine, scope: Scope): Element {
  const meaning = line.statement.meaning
  return laneRow(
    line,
    scope,
    ['working'],
    [
      ...(meaning === undefined ? [] : [h('p', { className: 'meaning' }, meaning)]),
      ...lineMath(line, scope.page),
      ...solverNotes(line.reports, scope.page),
    ],
  )
}

/** A row over both lanes: number, calculation, evidence, tick square. */
export function laneRow(
  line: NamedLine | CheckLine,
  scope: Scope,
  classes: readonly string[],
  calculation: readonly ElementContent[],
): Element {
  const { id, number } = lineNumber(line, scope)
  return h('li', { id, className: ['line', ...classes] }, [
    h('span', { className: 'number' }, number),
    h('div', { className: 'calculation' }, [...calculation]),
    h('div', { className: 'evidence' }, evidence(line, scope)),
    tick(),
  ])
}
