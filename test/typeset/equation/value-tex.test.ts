import fc from 'fast-check'
import katex from 'katex'
import { describe, expect, test } from 'vitest'
import type { Value } from '../../../src/calculate/types.ts'
import { parseUnit, type UnitExpression } from '../../../src/quantity/units.ts'
import { valueTex } from '../../../src/typeset/equation/value-tex.ts'
import { metric } from './lines.ts'

const force = (si: number): Value => ({ type: 'quantity', si, dimension: [1, 1, -2, 0] })
const plain = (si: number): Value => ({ type: 'quantity', si, dimension: [0, 0, 0, 0] })

describe('values in TeX', () => {
  test('a quantity has digits in groups, a hyphen-minus for KaTeX, and its unit upright', () => {
    expect(valueTex(force(1234567), metric)).toBe('1\\,235\\,\\mathrm{kN}')
    expect(valueTex(force(-2000), metric)).toBe('-2\\,\\mathrm{kN}')
    expect(valueTex(plain(1.2e-7), metric)).toBe('1.2{\\times}10^{-7}')
    const degrees = parseUnit('deg') as UnitExpression
    expect(valueTex(plain(Math.PI / 6), metric, { unit: degrees })).toBe('30{}^{\\circ}')
  })

  test('an array is a column or a matrix in one unit', () => {
    expect(valueTex({ type: 'array', si: [1000, 2500], dimension: [1, 1, -2, 0] }, metric)).toBe(
      '\\begin{pmatrix}1\\\\2.5\\end{pmatrix}\\,\\mathrm{kN}',
    )
    const rows: Value = {
      type: 'array',
      si: [
        [1, 2],
        [3, 4],
      ],
      dimension: [0, 0, 0, 0],
    }
    expect(valueTex(rows, metric)).toBe('\\begin{pmatrix}1&2\\\\3&4\\end{pmatrix}')
  })

  test('a large matrix is cut, and shows that it is', () => {
    const si = Array.from({ length: 9 }, (_, i) => Array.from({ length: 8 }, (_, j) => 10 * i + j))
    const tex = valueTex({ type: 'array', si, dimension: [0, 0, 0, 0] }, metric)
    expect(tex).toContain('0&1&2&3&\\cdots&7')
    expect(tex).toContain('\\vdots&\\vdots&\\vdots&\\vdots&\\vdots&\\vdots')
    expect(tex).toContain('80&81&82&83&\\cdots&87')
    katex.renderToString(tex, { throwOnError: true })
  })

  test('states of one make are a table; what is left out is told', () => {
    const state = (theta: number): Value => ({
      type: 'record',
      of: 'record',
      title: 'record',
      fields: { theta: plain(theta), stable: { type: 'truth', value: true } },
    })
    const items = Array.from({ length: 9 }, (_, i) => state(i))
    const tex = valueTex({ type: 'list', items }, metric)
    expect(tex).toContain('\\theta&\\mathrm{stable}\\\\\\hline 0&\\text{true}\\\\1&')
    expect(tex).toContain('and\\ 3\\ more')
    expect(valueTex({ type: 'list', items: [] }, metric)).toBe('\\text{none}')
  })

  test('any values give TeX that KaTeX accepts', () => {
    const { value } = fc.letrec<{ value: Value }>((tie) => ({
      value: fc.oneof(
        { depthSize: 'small', withCrossShrink: true },
        fc.double({ noNaN: true, noDefaultInfinity: true }).map(plain),
        fc.double({ noNaN: true, noDefaultInfinity: true, min: -1e30, max: 1e30 }).map(force),
        fc.string({ unit: 'binary' }).map((text): Value => ({ type: 'text', value: text })),
        fc.boolean().map((truth): Value => ({ type: 'truth', value: truth })),
        fc
          .array(fc.double({ noNaN: true, min: -1e9, max: 1e9 }), { minLength: 1, maxLength: 9 })
          .map((si): Value => ({ type: 'array', si, dimension: [0, 1, 0, 0] })),
        fc.array(tie('value'), { maxLength: 8 }).map((items): Value => ({ type: 'list', items })),
        fc
          .dictionary(fc.string(), tie('value'), { maxKeys: 8 })
          .map((fields): Value => ({ type: 'record', of: 'record', title: 'record', fields })),
        fc.string().map((description): Value => ({ type: 'model', of: 'column', description, model: {} })),
      ),
    }))
    fc.assert(
      fc.property(value, (any) => {
        katex.renderToString(valueTex(any, metric), { throwOnError: true, strict: 'ignore', output: 'html' })
      }),
      { numRuns: 500 },
    )
  })
})
