import type { Element } from 'hast'
import { h } from 'hastscript'
import type { VFileMessage } from 'vfile-message'
import { severityOf } from '../finding.ts'

/** Everything the program found to say of the sheet, with the place in its text. */
export function findingsList(findings: readonly VFileMessage[]): Element[] {
  if (findings.length === 0) return [h('h2', 'Findings'), h('p', 'None.')]
  return [
    h('h2', 'Findings'),
    h('table', { className: 'findings' }, [
      h('caption', { className: 'hidden' }, 'Findings'),
      h('thead', [
        h(
          'tr',
          ['Kind', 'Place', 'Finding'].map((name) => h('th', { scope: 'col' }, name)),
        ),
      ]),
      h('tbody', findings.map(row)),
    ]),
  ]
}

function row(finding: VFileMessage): Element {
  const severity = severityOf(finding)
  return h('tr', { className: severity }, [
    h('th', { scope: 'row' }, severity === 'error' ? 'ERROR' : severity),
    h('td', place(finding)),
    h('td', [
      h('p', codes(finding.reason)),
      h('p', { className: 'hint' }, [
        ...codes(finding.note ?? ''),
        ' ',
        h('code', { className: 'rule' }, finding.ruleId ?? ''),
      ]),
    ]),
  ])
}

function place({ file, line, column }: VFileMessage): string {
  return [file, line, column].filter((part) => part !== undefined).join(':')
}

/** What stands between back quotes in a message is code. */
function codes(text: string): (Element | string)[] {
  return text.split('`').map((part, i) => (i % 2 === 1 ? h('code', part) : part))
}
