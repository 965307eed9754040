import fc from 'fast-check'
import katex from 'katex'
import { describe, expect, test } from 'vitest'
import { pathTex, pathWords, symbolTex, symbolWords } from '../../../src/typeset/equation/symbol.ts'

const accepts = (tex: string) =>
  katex.renderToString(tex, { throwOnError: true, strict: 'error', output: 'html' })

describe('names as symbols', () => {
  // ISO 80000-1:2009, 7.1.1 and 7.1.2: quantities in italics, descriptive subscripts upright.
  test.each([
    ['L', 'L'],
    ['N_Ed', 'N_{\\mathrm{Ed}}'],
    ['N_b_Rd', 'N_{\\mathrm{b,Rd}}'],
    ['theta_0', '\\theta_{0}'],
    ['gamma_M1', '\\gamma_{\\mathrm{M1}}'],
    ['lambda_bar', '\\bar{\\lambda}'],
    ['lambda_bar_z', '\\bar{\\lambda}_{\\mathrm{z}}'],
    ['lambda_z_bar', '\\bar{\\lambda}_{\\mathrm{z}}'],
    ['x_hat', '\\hat{x}'],
    ['f_y_prime', "f'_{\\mathrm{y}}"],
    ['EI', '\\mathrm{EI}'],
    ['EI_bar', '\\overline{\\mathrm{EI}}'],
    ['sigma_cr_theta', '\\sigma_{\\mathrm{cr},\\theta}'],
    ['Delta', '\\Delta'],
    ['Alpha', '\\mathrm{A}'],
    ['theta1', '\\mathrm{theta1}'],
    ['toString', '\\mathrm{toString}'],
  ])('%s is printed as %s', (name, tex) => {
    expect(symbolTex(name)).toBe(tex)
    accepts(tex)
  })

  test.each([
    ['N_b_Rd', 'N sub b Rd'],
    ['lambda_bar_z', 'lambda bar sub z'],
    ['f_y_prime', 'f prime sub y'],
  ])('%s is spoken as %s', (name, words) => expect(symbolWords(name)).toBe(words))

  test('a part of something named carries its owner as the last subscript, in italics', () => {
    expect(pathTex(['tube', 'A'])).toBe('A_{\\textit{tube}}')
    expect(pathTex(['minor', 'N_b_Rd'])).toBe('N_{\\mathrm{b,Rd};\\textit{minor}}')
    expect(pathTex(['tube', 'A'])).not.toBe(symbolTex('A_tube'))
    expect(pathWords(['minor', 'N_b_Rd'])).toBe('N sub b Rd of minor')
  })
})

/** Every name that the language allows, with the parts that have a meaning here made likely. */
const part = fc.oneof(
  fc.constantFrom('bar', 'hat', 'prime', 'alpha', 'Omega', 'Rd', '1', '', 'x', 'A', 'constructor'),
  fc.stringMatching(/^[A-Za-z0-9]{0,6}$/),
)
const legalName = fc
  .tuple(fc.stringMatching(/^[A-Za-z][A-Za-z0-9]{0,5}$/), fc.array(part, { maxLength: 4 }))
  .map(([base, parts]) => [base, ...parts].join('_'))

/** A name with its marks moved to the end, where they mean the same. */
function normal(name: string): string {
  const [base = '', ...rest] = name.split('_')
  const isMark = (text: string | undefined) => text === 'bar' || text === 'hat' || text === 'prime'
  const marks: string[] = []
  while (isMark(rest[0])) marks.push(rest.shift() ?? '')
  const last: string[] = []
  while (isMark(rest.at(-1))) last.unshift(rest.pop() ?? '')
  const all = [...marks, ...last]
  const primes = all.filter((mark) => mark === 'prime')
  return [base, ...rest, '|', ...all.filter((mark) => mark !== 'prime'), ...primes].join('_')
}

describe('any legal name', () => {
  test('gives TeX that KaTeX accepts, alone, with an owner, and with a power', () => {
    fc.assert(
      fc.property(legalName, legalName, (name, owner) => {
        accepts(symbolTex(name))
        accepts(pathTex([owner, name]))
        accepts(`(${symbolTex(name)})^{2}`)
      }),
    )
  })

  test('is told from any other', () => {
    fc.assert(
      fc.property(legalName, legalName, (a, b) => {
        expect(symbolTex(a) === symbolTex(b)).toBe(normal(a) === normal(b))
      }),
      { numRuns: 3000 },
    )
  })

  test('is told from a part of something', () => {
    fc.assert(
      fc.property(legalName, legalName, legalName, (a, owner, b) => {
        expect(pathTex([owner, a])).not.toBe(symbolTex(b))
      }),
    )
  })
})
