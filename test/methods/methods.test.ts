import { describe, expect, it } from 'vitest'
import { kindOfDimension } from '../../src/quantity/kinds.ts'
import { fromSi, isUnitProblem, parseUnit } from '../../src/quantity/units.ts'
import type { FrontMatter, PublishedCase, Sheet } from '../../src/sheet/types.ts'
import { builtInIds, SheetLibrary } from '../../src/sheet/library.ts'
import { expectWithin, problems, results, useMethod, type Bindings } from './use-method.ts'
import { OUTSIDE } from './outside.ts'

const library = new SheetLibrary()

function methodSheet(id: string): Sheet {
  const found = library.find(id, 'trial.md', process.cwd())
  if ('rule' in found) throw new Error(found.message)
  expect(found.parsed.findings.map(String)).toEqual([])
  if (found.parsed.sheet === undefined) throw new Error(`${id} is not a sheet`)
  return found.parsed.sheet
}

const published = ({ published = [] }: FrontMatter): readonly PublishedCase[] => published

function toleranceOf(one: PublishedCase, name: string): number {
  const tolerance = typeof one.tolerance === 'number' ? one.tolerance : one.tolerance[name]
  if (tolerance === undefined) throw new Error(`${one.title ?? ''}: no tolerance for ${name}`)
  return tolerance
}

describe('the list of methods', () => {
  it('holds the clauses that are carried', () => {
    expect(builtInIds()).toEqual(['aisc360-22/e3', 'en1993-1-1-2005/6.3.1'])
  })

  it('finds a method without its edition while one edition is carried, and no other standard with that beginning', () => {
    const find = (id: string) => library.find(id, 'trial.md', process.cwd())
    expect(find('en1993-1-1/6.3.1')).toMatchObject({ id: 'en1993-1-1-2005/6.3.1' })
    expect(find('aisc360/e3')).toMatchObject({ id: 'aisc360-22/e3' })
    for (const id of ['en1993-1/6.3.1', 'en1993/6.3.1', 'aisc/e3', 'en1993-1-1-2022/6.3.1'])
      expect([id, 'rule' in find(id)]).toEqual([id, true])
  })
})

describe.each(builtInIds())('%s', (id) => {
  const sheet = methodSheet(id)
  const { meta } = sheet

  it('says what it is: id, source, edition, clause, what it returns, what is not verified', () => {
    const [folder = '', clause = ''] = id.split('/')
    expect(meta.sheet).toBe(id)
    expect(folder.endsWith(`-${meta.edition ?? 'no edition'}`)).toBe(true)
    expect(meta.clause?.toLowerCase()).toBe(clause)
    expect(meta.source).toContain(meta.edition)
    expect(meta.units).toBeDefined()
    expect(meta.unverified).toMatch(/memory|printed/)
    expect(meta.returns?.length).toBeGreaterThan(0)
  })

  it('defines every name it returns', () => {
    const defined = sheet.blocks.flatMap((block) =>
      block.kind === 'working' || block.kind === 'given'
        ? block.statements.map((statement) => statement.name)
        : [],
    )
    for (const name of meta.returns ?? []) expect(defined).toContain(name)
  })

  it('gives a meaning to every input and a clause to every limit', () => {
    for (const block of sheet.blocks) {
      if (block.kind === 'given')
        for (const { name, meaning } of block.statements)
          expect([name, meaning ?? '']).not.toEqual([name, ''])
      if (block.kind === 'check')
        for (const { text, reference } of block.statements)
          expect([text, reference ?? '']).not.toEqual([text, ''])
    }
  })

  it('carries published check values with their source and how they are known', () => {
    expect(published(meta).length).toBeGreaterThan(2)
    const titles = published(meta).map(({ title }) => title)
    expect(new Set(titles).size).toBe(titles.length)
    for (const { origin } of published(meta))
      expect(origin).toMatch(/^(printed in the source|from memory of the source|computed)$/)
  })

  it.each(published(meta).map((one) => [one.title ?? '', one] as const))('meets: %s', (_, one) => {
    const names = Object.keys(one.expected)
    const read = names.flatMap((name) => [`m.${name}`, String(one.expected[name])])
    const prepared = useMethod(id, one.given, read)
    expect(problems(prepared)).toEqual([])
    const values = results(prepared, read)
    for (const [i, name] of names.entries())
      expectWithin(name, values[2 * i] ?? NaN, values[2 * i + 1] ?? NaN, toleranceOf(one, name))
  })

  it('gives the same answers whether its inputs come in SI or in US units', () => {
    for (const { given } of published(meta)) {
      const returned = (meta.returns ?? []).map((name) => `m.${name}`)
      const first = results(useMethod(id, given, returned), returned)
      for (const system of ['si', 'us'] as const) {
        const prepared = useMethod(id, inUnitsOf(system, id, given), returned)
        for (const [i, value] of results(prepared, returned).entries())
          expectWithin(`${system} ${returned[i] ?? ''}`, value, first[i] ?? NaN, 1e-12)
      }
    }
  })

  it('flags an input just outside each of its limits, and accepts one at the limit', () => {
    const cases = OUTSIDE[id] ?? []
    const limits = sheet.blocks.flatMap((block) =>
      block.kind === 'check' && block.validity ? block.statements.map(({ text }) => text) : [],
    )
    expect(cases.map(({ limit }) => limit)).toEqual(limits)
    const [base] = published(meta)
    for (const { limit, at, beyond } of cases) {
      expect([limit, problems(useMethod(id, { ...base?.given, ...at }))]).toEqual([limit, []])
      const prepared = useMethod(id, { ...base?.given, ...beyond })
      expect(prepared.verdict).toBe('fail')
      expect(prepared.findings.map(({ ruleId }) => ruleId)).toContain('validity-failed')
      expect(problems(prepared).join()).toContain(`\`${limit}\` does not hold`)
    }
  })
})

/** The bindings with every quantity retyped in another system's units, to all its digits. */
function inUnitsOf(system: 'si' | 'us', id: string, given: Bindings): Bindings {
  const [used] = [...(useMethod(id, given).calculation?.usedSheets.values() ?? [])]
  if (used === undefined) throw new Error(`${id} was not calculated`)
  const retyped = Object.keys(given).map((name) => {
    const value = used.calculation.names.get(name)?.value
    if (value?.type === 'text') return [name, `"${value.value}"`]
    if (value?.type !== 'quantity') throw new Error(`${name} has no value`)
    const kind = kindOfDimension(value.dimension)
    const unit = kind === undefined ? undefined : UNITS_OF[system][kind]
    if (unit === undefined) throw new Error(`no unit for ${name}`)
    const parsed = unit === '' ? [] : parseUnit(unit)
    if (isUnitProblem(parsed)) throw new Error(parsed.problem)
    return [name, `${fromSi(value.si, parsed)} ${unit}`]
  })
  return Object.fromEntries(retyped) as Bindings
}

const UNITS_OF: Readonly<Record<'si' | 'us', Readonly<Record<string, string>>>> = {
  si: { number: '', length: 'm', area: 'm^2', stress: 'Pa', force: 'N' },
  us: { number: '', length: 'in', area: 'in^2', stress: 'psi', force: 'lbf' },
}
