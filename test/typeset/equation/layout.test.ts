import { readFileSync } from 'node:fs'
import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import { prepareSheet } from '../../../src/pipeline.ts'
import { resolveProfile, type Profile } from '../../../src/quantity/profile.ts'
import { checkEquation } from '../../../src/typeset/equation/check-equation.ts'
import { equation } from '../../../src/typeset/equation/equation.ts'
import { LANE } from '../../../src/typeset/equation/layout.ts'
import { measure } from '../../../src/typeset/equation/measure.ts'
import { printed } from './lines.ts'

interface Measured {
  /** How the widths were found. */
  readonly origin: string
  readonly widths: readonly (readonly [tex: string, em: number])[]
}

const measured = JSON.parse(readFileSync(new URL('widths.json', import.meta.url), 'utf8')) as Measured

describe('the estimate of a width', () => {
  test('falls short of what a browser measured by 3 % at most, and is not far above it', () => {
    expect(measured.widths.length).toBeGreaterThan(50)
    for (const [tex, em] of measured.widths) {
      expect(measure(tex), tex).toBeGreaterThan(0.97 * em)
      expect(measure(tex), tex).toBeLessThan(1.1 * em + 0.8)
    }
  })

  test('ends for any text', () => {
    const pieces = [
      '\\frac',
      '{',
      '}',
      '\\left(',
      '\\right)',
      '\\begin{array}',
      '\\end{array}',
      '&',
      '\\\\',
      '_',
      '^',
      'x',
      '\\',
      ' ',
    ]
    fc.assert(
      fc.property(fc.array(fc.constantFrom(...pieces)), (parts) => {
        expect(measure(parts.join(''))).toBeGreaterThanOrEqual(0)
      }),
    )
  })
})

describe('long lines', () => {
  const given = 'a = 3.125 m\nb = 2.5 m\nc = 1.875 m'
  const long = 'x = a*b + b*c + c*a + a^2 + b^2 + c^2 + a*(b + c) + b*(c + a) + c*(a + b)'

  test('are broken before operators, aligned at the signs of equality', () => {
    const { tex } = printed(given, long, LANE)
    const rows = tex.slice('\\begin{aligned}'.length, -'\\end{aligned}'.length).split('\\\\')
    expect(rows[0]).toMatch(/^x&=a\\,b/)
    expect(rows.filter((row) => row.startsWith('&='))).not.toHaveLength(0)
    for (const row of rows.slice(1)) expect(row).toMatch(/^&(?:=|\\quad \\;(?:\\quad )*\{\}[+\\-])/)
    for (const row of rows) expect(measure(row.replace('&', '')), row).toBeLessThanOrEqual(LANE)
  })

  test('stay on one line where they fit', () => {
    expect(printed(given, 'x = a*b', LANE).tex).not.toContain('aligned')
  })

  test('keep a wide left side above the rest', () => {
    const { tex } = printed(
      given,
      'very_long_name_of_a_result_that_is_wide = a*b + b*c + c*a + a*b*c/a + b*c',
      20,
    )
    expect(tex).toMatch(/^\\begin\{aligned\}&\\mathrm\{very\}/)
  })

  test('no row of the samples is wider than the lane', () => {
    const rows: string[] = []
    for (const path of ['raking-shore', 'prop-column', 'steel-column-us', 'folding-mast'].map(
      (name) => `samples/${name}.md`,
    )) {
      const { calculation } = prepareSheet({ path })
      const profile = resolveProfile(calculation?.sheet.meta.units) as Profile
      const blocks = calculation?.blocks ?? []
      const used = blocks.flatMap((block) => block.used?.calculation.blocks ?? [])
      for (const line of [...blocks, ...used].flatMap((block) => block.lines))
        rows.push(line.kind === 'named' ? equation(line, profile).tex : checkEquation(line, profile).tex)
    }
    expect(rows.length).toBeGreaterThan(100)
    for (const tex of rows) expect(measure(tex), tex).toBeLessThanOrEqual(LANE * 1.001)
  })

  test('of any make of sums and products fit a lane that holds their largest part', () => {
    const term = fc.constantFrom('a*b', 'c*(a + b)', 'a^2', 'b*c/2', 'a*b*c/(a + b)')
    fc.assert(
      fc.property(
        fc.array(term, { minLength: 1, maxLength: 12 }),
        fc.integer({ min: 17, max: 40 }),
        (terms, width) => {
          const { tex } = printed(given, `x = ${terms.join(' + ')}`, width)
          expect(measure(tex)).toBeLessThanOrEqual(width * 1.001)
        },
      ),
      { numRuns: 60 },
    )
  })
})
