import { describe, expect, test } from 'vitest'
import { z } from 'zod'
import { prepareSheet } from '../../src/pipeline.ts'
import { calculationJson } from '../../src/record/calculation-json.ts'
import { calculationSchema } from '../../src/record/calculation-schema.ts'
import { digestOf } from '../../src/record/digest.ts'
import { stableJson } from '../../src/record/stable-json.ts'
import { frontMatterSchema } from '../../src/sheet/front-matter.ts'
import { readdirSync } from 'node:fs'

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
    expect(json.values['v']).toMatchObject({ si: [1, 2], dimension: 'length' })
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

  test('keys are sorted and the same sheet gives the same bytes', () => {
    const once = stableJson(calculationJson(prepared(SHEET)))
    expect(stableJson(calculationJson(prepared(SHEET)))).toBe(once)
    const keys = Object.keys(JSON.parse(once) as object)
    expect(keys).toEqual([...keys].sort())
  })

  test.each(readdirSync(samples).filter((file) => file.endsWith('.md')))(
    'the published schema accepts the sample %s',
    (file) => {
      const json: unknown = JSON.parse(
        stableJson(calculationJson(prepareSheet({ path: file }, { cwd: samples }))),
      )
      expect(calculationSchema.safeParse(json).error).toBeUndefined()
    },
  )

  test('and what an erroneous or unreadable sheet gives', () => {
    for (const text of [SHEET, SHEET.replace('285 kN', '285 m'), 'no sheet', '']) {
      const json: unknown = JSON.parse(stableJson(calculationJson(prepared(text))))
      expect(calculationSchema.safeParse(json).error).toBeUndefined()
    }
  })
})

describe('the digest', () => {
  const digest = (text: string) => digestOf(prepared(text).calculation ?? expect.fail('not calculated'))
  const base = digest(SHEET)
  test('does not depend on line endings', () => expect(digest(SHEET.replaceAll('\n', '\r\n'))).toBe(base))
  test('changes with any word of the sheet', () => {
    expect(digest(SHEET.replace('design force', 'force'))).not.toBe(base)
    expect(digest(SHEET.replace('285', '286'))).not.toBe(base)
  })
})

describe('the JSON Schemas', () => {
  test('are made, and say what each key is', () => {
    const schema = z.toJSONSchema(frontMatterSchema, { io: 'input' }) as {
      properties: Record<string, unknown>
      required: string[]
    }
    expect(schema.required.sort()).toEqual(['sheet', 'title'])
    expect(Object.keys(schema.properties)).toContain('published')
    expect(z.toJSONSchema(calculationSchema, { io: 'input' })).toHaveProperty('properties.values')
  })
})
