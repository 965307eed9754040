import fc from 'fast-check'
import katex from 'katex'
import { describe, expect, test } from 'vitest'
import type { Formula } from '../../../src/calculate/types.ts'
import { resolveProfile, type Profile } from '../../../src/quantity/profile.ts'
import { formulaTex, printFormula, printingOf } from '../../../src/typeset/equation/formula-tex.ts'
import { rowsOf } from '../../../src/typeset/equation/rows.ts'
import { formula, NAMES, OPERANDS, valueOf } from './random-formula.ts'
import { readTex } from './read-tex.ts'

const profile = resolveProfile('metric') as Profile
const names = new Map(NAMES.map(({ tex, si }) => [tex, si]))

/** The same but for the rounding of operations done in another order. */
function agree(printed: number, calculated: number): boolean {
  return (
    Object.is(printed + 0, calculated + 0) || Math.abs(printed - calculated) <= 1e-9 * Math.abs(calculated)
  )
}

function branchesOf(tree: Formula): Map<Formula, boolean> {
  const branches = new Map<Formula, boolean>()
  valueOf(tree, branches)
  return branches
}

describe('a printed formula means what was calculated', () => {
  test('in symbols', () => {
    fc.assert(
      fc.property(formula, (tree) => {
        const tex = formulaTex(tree, { profile, operands: OPERANDS })
        expect(agree(readTex(tex, names), valueOf(tree)), tex).toBe(true)
      }),
      { numRuns: 1500 },
    )
  })

  test('with the numbers put in', () => {
    fc.assert(
      fc.property(formula, (tree) => {
        const tex = formulaTex(tree, { profile, operands: OPERANDS, mode: 'numbers' })
        expect(agree(readTex(tex, names), valueOf(tree)), tex).toBe(true)
      }),
      { numRuns: 1500 },
    )
  })

  test('with the numbers put in along the branch that was taken', () => {
    fc.assert(
      fc.property(formula, (tree) => {
        const tex = formulaTex(tree, {
          profile,
          operands: OPERANDS,
          mode: 'numbers',
          branches: branchesOf(tree),
        })
        expect(agree(readTex(tex, names), valueOf(tree)), tex).toBe(true)
        expect(tex).not.toContain('dcases')
      }),
      { numRuns: 500 },
    )
  })

  test('broken over rows of any width', () => {
    fc.assert(
      fc.property(formula, fc.integer({ min: 1, max: 25 }), fc.boolean(), (tree, width, inNumbers) => {
        const printing = printingOf({ profile, operands: OPERANDS, mode: inNumbers ? 'numbers' : 'symbols' })
        const tex = rowsOf(printFormula(tree, printing), width, width).join('\\\\')
        expect(agree(readTex(tex, names), valueOf(tree)), tex).toBe(true)
      }),
      { numRuns: 1500 },
    )
  })

  test('and KaTeX accepts it, on one line and broken', () => {
    fc.assert(
      fc.property(formula, fc.integer({ min: 1, max: 25 }), (tree, width) => {
        const print = printFormula(
          tree,
          printingOf({ profile, operands: OPERANDS, branches: branchesOf(tree) }),
        )
        const broken = rowsOf(print, width, width).map((row) => `&${row}`)
        for (const tex of [print.tex, `\\begin{aligned}${broken.join('\\\\')}\\end{aligned}`])
          katex.renderToString(tex, {
            throwOnError: true,
            strict: 'error',
            displayMode: true,
            output: 'html',
          })
      }),
      { numRuns: 400 },
    )
  })
})

describe('the reader that these tests use', () => {
  test('takes printed mathematics as it is meant', () => {
    expect(readTex('\\frac{1+2}{4}\\cdot x', new Map([['x', 2]]))).toBe(1.5)
    expect(readTex('2\\,\\mathrm{m}^{2}', names)).toBe(2)
    expect(readTex('(2\\,\\mathrm{mm})^{2}', names)).toBeCloseTo(4e-6, 12)
  })

  test('refuses what could be read in two ways', () => {
    for (const tex of [
      'a/b\\cdot a',
      'a--b',
      'a\\cdot -b',
      'a b',
      '1{\\times}10^{-2}^{2}',
      '\\sin(a)^{2}',
      '\\frac{a}{b}^{2}',
    ])
      expect(() => readTex(tex, names), tex).toThrow()
  })
})
