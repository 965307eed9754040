import type { Element } from 'hast'
import { h } from 'hastscript'
import type { FrontMatter, Person } from '../sheet/types.ts'

const ROLES = ['originator', 'checker', 'approver'] as const

/** Who made, checked and approved the sheet; what is not filled in is left blank for the pen. Initials are always by hand. */
export function peopleTable(meta: FrontMatter): Element {
  const heads = ['', 'Name', 'Initials', 'Date']
  return h('table', { className: 'people' }, [
    h('caption', 'Sign-off'),
    h('thead', [
      h(
        'tr',
        heads.map((name) => (name === '' ? h('td') : h('th', { scope: 'col' }, name))),
      ),
    ]),
    h(
      'tbody',
      ROLES.map((role) => {
        const person = meta[role]
        return h('tr', [
          h('th', { scope: 'row' }, roleWord(role)),
          h('td', person?.name ?? ''),
          h('td', ''),
          h('td', person?.date ?? ''),
        ])
      }),
    ),
  ])
}

/** The same in one line, for the foot of every page. */
export function peopleLine(meta: FrontMatter): string {
  return ROLES.map((role) => `${roleWord(role)} ${inLine(meta[role])}`).join('\u00a0\u00a0\u00a0 ')
}

function inLine(person: Person | undefined): string {
  return person?.name === undefined ? '____________' : [person.name, person.date].filter(Boolean).join(', ')
}

const roleWord = (role: string): string => role.slice(0, 1).toUpperCase() + role.slice(1)
