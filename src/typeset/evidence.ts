import type { Element, ElementContent } from 'hast'
import { h } from 'hastscript'
import type { Line, RecordValue } from '../calculate/types.ts'
import type { Statement } from '../sheet/types.ts'
import { crossReferences } from './cross-references.ts'
import type { Entry } from './entries.ts'
import type { Scope } from './scope.ts'

/** What the evidence lane says of a line: its reference, the table it was read from, an open hold, where its values come from. */
export function evidence(line: Line, scope: Scope): ElementContent[] {
  return [
    ...ofStatement(line.statement),
    ...bindingReference(line),
    ...tableSource(line),
    ...byDefault(line, scope),
    ...crossReferences(line, scope),
  ]
}

export function ofStatement({ reference, hold }: Statement): ElementContent[] {
  return [
    ...(reference === undefined ? [] : [h('div', { className: 'reference' }, reference)]),
    ...(hold === undefined ? [] : [h('div', { className: 'hold' }, [h('strong', 'HOLD'), ` ${hold}`])]),
  ]
}

/** An input of a method carries the method's reference; the binding may carry the using sheet's own. */
function bindingReference(line: Line): ElementContent[] {
  const bound = line.kind === 'named' ? line.boundBy : undefined
  return bound === undefined ? [] : ofStatement(bound)
}

function tableSource(line: Line): ElementContent[] {
  const source = line.kind === 'named' && line.boundBy === undefined ? sourceOf(line.value) : undefined
  return source === undefined ? [] : [h('div', { className: 'table-source' }, source)]
}

export function sourceOf(value: { readonly type: string }): string | undefined {
  return value.type === 'record' ? (value as RecordValue).source : undefined
}

function byDefault(line: Line, scope: Scope): ElementContent[] {
  return line.kind === 'named' && line.byDefault && scope.used?.builtIn
    ? [h('div', { className: 'from' }, 'the method’s own value')]
    : []
}

/** The number of a printed line, as a place to link to. */
export function lineNumber(entry: Entry, scope: Scope): { readonly id: string; readonly number: string } {
  const number = scope.page.numbers.of.get(entry) ?? ''
  return { id: `line-${number}`, number }
}

/** The empty square at the page's edge, for the checker's pen. */
export function tick(): Element {
  return h('span', { className: 'tick', ariaHidden: 'true' })
}
