import type { Element } from 'hast'
import { h } from 'hastscript'
import type { Failure } from '../calculate/types.ts'
import { lineNumber, ofStatement, tick } from './evidence.ts'
import { messageText } from './message-text.ts'
import type { Scope } from './scope.ts'

/** A statement that could not be calculated, as written, with the reason. */
export function failureLine(failure: Failure, scope: Scope): Element {
  const { id, number } = lineNumber(failure, scope)
  const { statement } = failure
  return h('li', { id, className: ['line', 'failure'] }, [
    h('span', { className: 'number' }, number),
    h('div', { className: 'calculation' }, failureWords(failure)),
    h('div', { className: 'evidence' }, ofStatement(statement)),
    tick(),
  ])
}

export function failureWords({ statement, because }: Failure): Element[] {
  return [
    ...(statement.meaning === undefined ? [] : [h('p', { className: 'meaning' }, statement.meaning)]),
    h('p', [h('code', statement.text)]),
    h('p', { className: 'because' }, [h('strong', 'NOT CALCULATED'), ' ', ...messageText(because)]),
  ]
}
