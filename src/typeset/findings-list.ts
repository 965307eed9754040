import type { Element } from 'hast'
import { h } from 'hastscript'
import type { VFileMessage } from 'vfile-message'
import { severityOf } from '../finding.ts'
import { messageText } from './message-text.ts'

/** Everything the program found to say of the sheet, with the place in its text. */
export function findingsList(findings: readonly VFileMessage[], path: string): Element[] {
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
      h(
        'tbody',
        findings.map((finding) => row(finding, path)),
      ),
    ]),
  ]
}

function row(finding: VFileMessage, path: string): Element {
  const severity = severityOf(finding)
  return h('tr', { className: severity }, [
    h('th', { scope: 'row' }, severity === 'error' ? 'ERROR' : severity),
    h('td', place(finding, path)),
    h('td', [
      h('p', messageText(finding.reason)),
      h('p', { className: 'hint' }, [
        ...messageText(finding.note ?? ''),
        ' ',
        h('code', { className: 'rule' }, finding.ruleId ?? ''),
      ]),
    ]),
  ])
}

function place({ file, line, column }: VFileMessage, path: string): string {
  const within =
    line === undefined ? '' : `line ${String(line)}${column === undefined ? '' : `:${String(column)}`}`
  return file === path || file === undefined ? within : [file, within].filter(Boolean).join(', ')
}
