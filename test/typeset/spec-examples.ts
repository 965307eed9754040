import { describe, expect, it } from 'vitest'
import { foreignTags, printed, sanitised, specified, type Example } from './spec-example.ts'

/** Where the prose of a sheet differs from a specification, by the numbers of its examples; anything not listed must agree. */
export interface Differences {
  /** Agree with the specification's HTML after what a sheet may not hold has been left out of it. */
  readonly leftOut: Readonly<Record<string, readonly number[]>>
  /** HTML that may not stand on the page is shown as written, so that nothing is lost without a trace. */
  readonly shownAsWritten: readonly number[]
  /** Differ for the reason that is the key. */
  readonly otherwise: Readonly<Record<string, readonly number[]>>
}

/** Holds the prose of a sheet against every example of a specification. */
export function holdsAgainst(examples: readonly Example[], differences: Differences): void {
  const leftOut = new Set(Object.values(differences.leftOut).flat())
  const shown = new Set(differences.shownAsWritten)
  const otherwise = new Set(Object.values(differences.otherwise).flat())
  const listed = [...leftOut, ...shown, ...otherwise]
  const wanted = ({ number, html }: Example) => (leftOut.has(number) ? sanitised(html) : specified(html))

  it('has each example in one list at most', () => {
    expect(listed).toHaveLength(new Set(listed).size)
    expect(listed.filter((number) => !examples.some((example) => example.number === number))).toEqual([])
  })

  const sections = [...new Set(examples.map(({ section }) => section))]
  it.each(sections)('gives the HTML of the specification: %s', (section) => {
    const wrong = examples
      .filter((example) => example.section === section)
      .filter(({ number }) => !shown.has(number) && !otherwise.has(number))
      .map((example) => ({ ...example, is: printed(example.markdown), wanted: wanted(example) }))
      .filter(({ is, wanted }) => is !== wanted)
    expect(wrong).toEqual([])
  })

  it('differs where it is said to differ', () => {
    const same = examples
      .filter(({ number }) => listed.includes(number))
      .filter(({ markdown, html }) => printed(markdown) === specified(html))
    expect(same.map(({ number }) => number)).toEqual([])
  })

  describe('HTML that may not stand on the page', () => {
    it.each(differences.shownAsWritten)('is shown as written: example %i', (number) => {
      const { markdown = '' } = examples.find((example) => example.number === number) ?? {}
      const tags = foreignTags(markdown)
      const html = printed(markdown).replaceAll('&#x3C;', '<')
      expect(tags.length).toBeGreaterThan(0)
      for (const tag of tags) expect(html).toContain(tag)
    })
  })
}
