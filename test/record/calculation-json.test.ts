import { describe, expect, test } from 'vitest'
import { prepareSheet } from '../../src/pipeline.ts'
import { calculationJson } from '../../src/record/calculation-json.ts'
import { stableJson } from '../../src/record/stable-json.ts'

const samples = new URL('../../samples/', import.meta.url).pathname
const prepared = (text: string) => prepareSheet({ path: 'shore.md', text }, { cwd: samples })
const SHEET = `---
sheet: TW-014
title: Shore
revision: B
---
\`\`\`given
N_Ed = 285 kN   # design force [loads]
curve = "a"     # buckling curve [Table 6.2]
\`\`\`
\`\`\`working
N_cr = 1234567.8 N   # critical force [6.3.1.2]
v = [1 m, 2 m]
f(x) = 2*x
ok = N_Ed < N_cr
\`\`\`
\`\`\`method en1993-1-1/6.3.1 as minor
A = 26.4 cm^2
f_y = 355 MPa
N_cr = N_cr
curve = curve
\`\`\`
\`\`\`check
N_Ed <= minor.N_b_Rd   # flexural buckling [EN 1993-1-1 6.3.1.1(1)]
v[1] <= f(v[1])
ok == true ? 1 m : 2 m <= 1 m
\`\`\`
`

describe('check --json', () => {
  test('has the form of the contract', () => {
    const json = JSON.parse(
      stableJson(calculationJson(prepared(SHEET.replace('ok == true ? 1 m : 2 m <= 1 m\n', '')))),
    ) as Record<string, unknown> & {
      values: Record<string, unknown>
      checks: Record<string, unknown>[]
    }
    expect(json['schema']).toBe('stanchion/calculation/1')
    expect(json['sheet']).toEqual({ id: 'TW-014', title: 'Shore', revision: 'B', source: 'shore.md' })
    expect(json['verdict']).toBe('pass')
    expect(json.values['N_cr']).toEqual({
      kind: 'derived',
      si: 1234567.8,
      dimension: 'force',
      unit: 'kN',
      shown: '1 235 kN',
      line: 11,
      meaning: 'critical force',
      reference: '6.3.1.2',
    })
    expect(json.values['minor.chi']).toMatchObject({
      kind: 'derived',
      dimension: '1',
      unit: '',
      line: 16,
      sheet: 'en1993-1-1-2005/6.3.1',
    })
    expect(json.values['curve']).toMatchObject({ kind: 'given', value: 'a' })
    expect(json.values['ok']).toMatchObject({ value: true })
    expect(json.values['v']).toMatchObject({ si: [1, 2], dimension: 'length', shown: '[1 m, 2 m]' })
    expect(json.values['f']).toMatchObject({ kind: 'function' })
    const check = json.checks.find(({ title }) => title === 'flexural buckling')
    expect(check).toMatchObject({
      demand: { si: 285000, shown: '285 kN' },
      relation: '<=',
      verdict: 'pass',
      reference: 'EN 1993-1-1 6.3.1.1(1)',
      line: 23,
    })
    expect(json['digest']).toMatch(/^sha256:[0-9a-f]{64}$/)
  })

  test('numbers are given in full, and strings, lists, functions and models by what they are', () => {
    const text = `${SHEET.slice(0, SHEET.indexOf('```given'))}\`\`\`working
third = 1 m/3
M = [1, 2; 3, 4]
V(q, P) = 5 N*m*q^2 - P*(1 m)*(1 - cos(q))
arm = mechanism(V)
states = equilibrium(arm, 5 N)
tube = section("CHS 139.7x6.3")
\`\`\`
`
    expect(JSON.parse(stableJson(calculationJson(prepared(text))))).toMatchObject({
      values: {
        third: { si: 1 / 3, shown: '333.3 mm', unit: 'mm' },
        M: {
          si: [
            [1, 2],
            [3, 4],
          ],
          dimension: '1',
          shown: '[1, 2; 3, 4]',
        },
        V: { kind: 'function', parameters: ['q', 'P'] },
        arm: { kind: 'model', model: 'mechanism' },
        states: { value: [{ value: 'q = 0: stable', fields: { stable: { value: true } } }] },
        tube: {
          kind: 'looked-up',
          value: 'CHS 139.7x6.3',
          of: 'section',
          fields: { A: { dimension: 'area' } },
        },
      },
      solutions: [{ question: 'equilibrium(arm, 5 N)', status: 'converged', si: 5, dimension: 'force' }],
    })
  })

  test('keys are sorted and the same sheet gives the same bytes', () => {
    const once = stableJson(calculationJson(prepared(SHEET)))
    expect(stableJson(calculationJson(prepared(SHEET)))).toBe(once)
    const inOrder = (value: unknown): boolean => {
      if (value === null || typeof value !== 'object') return true
      const keys = Object.keys(value)
      const isSorted = Array.isArray(value) || keys.every((key, i) => i === 0 || (keys[i - 1] ?? '') < key)
      return isSorted && Object.values(value).every(inOrder)
    }
    expect(inOrder(JSON.parse(once))).toBe(true)
  })
})
