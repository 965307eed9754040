import type { Element } from 'hast'
import { h } from 'hastscript'

/** The program signs nothing off, so that a sheet is this until a record of its issue says otherwise. */
export const STATUS = 'draft – not checked, not issued'

export const REVIEW_SHORT =
  'Not for use until reviewed by a licensed engineer. Local codes and the engineer’s judgement govern.'

/** Printed on the first sheet. */
export function reviewNotice(): Element {
  return h('p', { className: 'review' }, [
    h('strong', 'Review by a licensed engineer. '),
    'This calculation is to be reviewed, and where the law asks for it sealed, by an engineer licensed at the place of the works before anything is built, loaded or removed by it. The program has approved nothing.',
  ])
}

/** Printed at the end. */
export function cautions(): Element {
  return h('div', { className: 'cautions' }, [
    h('h2', 'Cautions'),
    h(
      'ul',
      CAUTIONS.map((text) => h('li', text)),
    ),
  ])
}

const CAUTIONS = [
  'The program is an aid to calculation. The codes in force at the place of the works, and the judgement of the licensed engineer, govern.',
  '“OK” says that a comparison written in this sheet holds for the values given. It does not say that the structure is safe, that the comparison is the right one, or that every comparison that is needed is there.',
  'Inputs, assumptions, choice of method and limits of use are to be checked as well as the arithmetic.',
  'A paper or downloaded copy may be out of date. Confirm the current revision before it is used.',
]
