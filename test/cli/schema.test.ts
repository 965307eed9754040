import { Ajv2020, type ValidateFunction } from 'ajv/dist/2020.js'
import { readdirSync, readFileSync } from 'node:fs'
import { join } from 'node:path'
import { beforeAll, describe, expect, test } from 'vitest'
import { parse } from 'yaml'
import { prepareSheet } from '../../src/pipeline.ts'
import { calculationJson } from '../../src/record/calculation-json.ts'
import { stableJson } from '../../src/record/stable-json.ts'
import { builtInIds } from '../../src/sheet/library.ts'
import { parseSheet } from '../../src/sheet/parse-sheet.ts'
import { runCli } from './run-cli.ts'

const ROOT = new URL('../..', import.meta.url).pathname
const markdownIn = (folder: string) =>
  readdirSync(join(ROOT, folder))
    .filter((file) => file.endsWith('.md'))
    .map((file) => join(folder, file))

let calculation: ValidateFunction
let frontMatter: ValidateFunction
beforeAll(async () => {
  const ajv = new Ajv2020({ allowUnionTypes: true, formats: { date: /^\d{4}-\d{2}-\d{2}$/ } })
  const schemaNamed = async (name: string) =>
    ajv.compile(JSON.parse((await runCli(['schema', name], '.')).out) as object)
  calculation = await schemaNamed('calculation')
  frontMatter = await schemaNamed('front-matter')
})

function refusals(validate: ValidateFunction, value: unknown): unknown[] {
  validate(value)
  return validate.errors ?? []
}

describe('the published schema of the calculation accepts what check --json prints', () => {
  const json = (path: string, text?: string) =>
    JSON.parse(
      stableJson(
        calculationJson(prepareSheet({ path, ...(text === undefined ? {} : { text }) }, { cwd: ROOT })),
      ),
    ) as unknown

  test.each([...markdownIn('samples'), ...markdownIn('templates/starters')])('for %s', (path) => {
    expect(refusals(calculation, json(path))).toEqual([])
  })

  const head = '---\nsheet: T-1\ntitle: Trial\n---\n'
  test.each([
    [
      'every kind of value',
      `${head}\`\`\`working\na = 2 m\nv = [1 m, 2 m]\nM = [1, 2; 3, 4]\nt = "text"\nb = 1 < 2\nf(x) = 2*x\nV(q, P) = 5 N*m*q^2 - P*1 m*(1 - cos(q))\nm = mechanism(V)\nS = equilibrium(m, 12 N)\ns = section("IPE 330")\n\`\`\`\n`,
    ],
    ['a check without a quotient', `${head}\`\`\`check\n1 m <= 0 m\n0 m <= 0 m\n-1 m <= 2 m\n\`\`\`\n`],
    ['errors', `${head}\`\`\`working\na = 2 m + 3 s\nb = 1/0\nc = nothing\n\`\`\`\n`],
    ['no sheet', 'no sheet'],
    ['nothing', ''],
  ])('for %s', (_name, text) => {
    expect(refusals(calculation, json('t.md', text))).toEqual([])
  })

  test('and refuses what it does not print', () => {
    const good = json('samples/raking-shore.md') as Record<string, unknown>
    for (const change of [
      { verdict: 'approved' },
      { checks: {} },
      { digest: 'sha256:0' },
      { schema: 'other' },
    ])
      expect(refusals(calculation, { ...good, ...change })).not.toEqual([])
  })
})

describe('the published schema of the front matter agrees with the program', () => {
  const yamlOf = (text: string) => /^---\n([\s\S]*?)\n---\n/.exec(text)?.[1] ?? ''
  const read = (path: string) => readFileSync(join(ROOT, path), 'utf8')
  const files = [
    ...markdownIn('samples'),
    ...markdownIn('templates/starters'),
    ...builtInIds().map((id) => `src/methods/${id}.md`),
  ]

  test.each(files)('on %s, read as an editor reads it', (path) => {
    expect(refusals(frontMatter, parse(yamlOf(read(path))))).toEqual([])
  })

  const least = 'sheet: T-1\ntitle: Trial'
  test.each([
    [`${least}`, true],
    [`${least}\nrevision: 2\nproject: 4711\ndate: 2026-03-02`, true],
    [`${least}\nchecker:\napprover: A. Example\nunits:\npaper:`, true],
    [`${least}\noriginator: {name: A. Example, date: 2026-03-02}\nunits: {force: kip}`, true],
    [
      `${least}\nreturns: [a, b]\npublished: [{given: {a: 1 m}, expected: {b: 2}, tolerance: 0.01, source: book}]`,
      true,
    ],
    ['title: Trial', false],
    [`${least}\npaper: A5`, false],
    [`${least}\nunits: imperial`, false],
    [`${least}\ndate: 2026-02-30`, false],
    [`${least}\nproyect: x`, false],
    [`${least}\noriginator: {nam: A. Example}`, false],
    [`${least}\nlanguage: not a tag`, false],
    [`${least}\nreturns: a`, false],
    [`${least}\npublished: [{given: {a: 1 m}, expected: {b: 2}, tolerance: -1, source: book}]`, false],
  ])('on %j', (yaml, isGood) => {
    expect(refusals(frontMatter, parse(yaml)).length === 0).toBe(isGood)
    expect(parseSheet(`---\n${yaml}\n---\n`, 't.md').sheet !== undefined).toBe(isGood)
  })
})
