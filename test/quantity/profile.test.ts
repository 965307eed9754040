import fc from 'fast-check'
import { describe, expect, it, test } from 'vitest'
import { sameDimension, type Dimension } from '../../src/quantity/dimension.ts'
import { DISPLAY_UNITS } from '../../src/quantity/display-units.ts'
import { KINDS, QUANTITY_KINDS, type KindName } from '../../src/quantity/kinds.ts'
import { displayUnit, resolveProfile } from '../../src/quantity/profile.ts'
import { toSi, unitFactor, unitText } from '../../src/quantity/units.ts'
import type { UnitProfile } from '../../src/sheet/types.ts'
import { profile, quantity, unit } from './read-unit.ts'

const metric = profile('metric')
const us = profile('us')

const shownIn = (value: number, given: string, asked: UnitProfile, kind?: string) =>
  unitText(displayUnit(quantity(value, given), profile(asked), kind))

describe('units by kind and size (common practice)', () => {
  test.each([
    [285, 'kN', 'kN', 'kip'],
    [50, 'N', 'N', 'lbf'],
    [2e5, 'kN', 'MN', 'kip'],
    [0, 'kN', 'kN', 'kip'],
    [-285, 'kN', 'kN', 'kip'],
    [4.6, 'm', 'm', 'ft'],
    [139.7, 'mm', 'mm', 'in'],
    [2640, 'mm^2', 'mm²', 'in²'],
    [589, 'cm^4', 'cm⁴', 'in⁴'],
    [84.3, 'cm^3', 'cm³', 'in³'],
    [125_900, 'cm^6', 'cm⁶', 'in⁶'],
    [3, 'dm^6', 'dm⁶', 'in⁶'],
    [355, 'MPa', 'N/mm²', 'ksi'],
    [150, 'kPa', 'kN/m²', 'psi'],
    [0.5, 'kPa', 'kN/m²', 'psf'],
    [12, 'kN*m', 'kN·m', 'kip·ft'],
    [5, 'kN/m', 'kN/m', 'lbf/ft'],
    [25, 'kN/m^3', 'kN/m³', 'lbf/ft³'],
    [7850, 'kg/m^3', 'kg/m³', 'lb/ft³'],
    [1200, 'kN*m^2', 'kN·m²', 'kip·in²'],
    [0.734, '', '', ''],
    [30, 'deg', '', ''],
    [20, 'K', 'K', 'K'],
  ])('%d %s is shown in %s and %s', (value, given, inMetric, inUs) => {
    expect(shownIn(value, given, 'metric')).toBe(inMetric)
    expect(shownIn(value, given, 'us')).toBe(inUs)
  })
})

test('a moment is never shown as energy, at any size', () => {
  fc.assert(
    fc.property(
      fc.double({ noNaN: true, noDefaultInfinity: true }),
      fc.constantFrom(metric, us),
      (si, which) => {
        expect(unitText(displayUnit({ si, dimension: [1, 2, -2, 0] }, which))).toMatch(
          /^(M|k)?N·m$|^(kip|lbf)·ft$/,
        )
      },
    ),
  )
})

test('a kind says more than the dimension, and is passed over when it does not fit', () => {
  expect(shownIn(12, 'kN*m', 'metric', 'rotational-stiffness')).toBe('kN·m/rad')
  expect(shownIn(0.1, 'rad', 'metric', 'angle')).toBe('rad')
  expect(shownIn(20, 'MPa', 'metric', 'pressure')).toBe('kN/m²')
  expect(shownIn(20, 'kip/ft', 'us', 'stiffness')).toBe('kip/in')
  for (const kind of ['force', 'section', 'no-such-kind', 'constructor']) {
    expect(shownIn(4.6, 'm', 'metric', kind), kind).toBe('m')
  }
})

test('a value that floating point leaves a hair below a change of unit is shown in the larger unit', () => {
  expect(shownIn(0.1 * 3 + 0.7 - 2e-16, 'm', 'metric')).toBe('m')
  expect(shownIn(0.999999, 'm', 'metric')).toBe('mm')
})

test('a quantity of no named kind gets a unit of its own dimension', () => {
  const exponent = fc.oneof(fc.integer({ min: -6, max: 6 }), fc.constantFrom(0.5, -0.5, 1.5, 1 / 3))
  const dimension = fc.tuple(exponent, exponent, exponent, exponent)
  fc.assert(
    fc.property(dimension, fc.constantFrom(metric, us), (asked, which) => {
      const got = unitFactor(displayUnit({ si: 1, dimension: asked }, which)).dimension
      expect(sameDimension(got, asked)).toBe(true)
    }),
  )
  const rootOfStress: Dimension = [0.5, -0.5, -1, 0]
  expect(unitText(displayUnit({ si: 1, dimension: rootOfStress }, metric))).toBe('kN^(1/2)/m')
  expect(unitText(displayUnit({ si: 1, dimension: [1, 0, -1, 0] }, metric))).toBe('kg/s')
  expect(unitText(displayUnit({ si: 1, dimension: [1, 0, -1, 0] }, us))).toBe('lb/s')
})

test('both profiles have a unit of the right dimension for every kind, from small to large', () => {
  for (const [name, { dimension }] of QUANTITY_KINDS) {
    if (name === 'number') continue
    for (const base of ['metric', 'us'] as const) {
      const row = DISPLAY_UNITS[base].kinds[name]
      if (row === undefined) throw new Error(`${base} has no unit for ${name}`)
      expect(row.rungs.map(([text]) => text)).toContain(row.usual)
      const sizes = row.rungs.map(([text, from]) => toSi(from, unit(text)))
      expect(sizes[0]).toBe(0)
      expect(sizes, `${base} ${name}`).toEqual([...sizes].sort((a, b) => a - b))
      for (const [text] of row.rungs) {
        expect(sameDimension(unitFactor(unit(text)).dimension, dimension), `${base} ${name} ${text}`).toBe(
          true,
        )
      }
    }
  }
})

describe("a sheet's own map", () => {
  it('lies over metric, or over the profile it names', () => {
    const own: UnitProfile = { length: 'mm', force: 'MN', 'rotational-stiffness': 'N*mm/rad' }
    expect(shownIn(4.6, 'm', own)).toBe('mm')
    expect(shownIn(3, 'kN', own)).toBe('MN')
    expect(shownIn(3, 'kN*m', own)).toBe('kN·m')
    expect(shownIn(3, 'kN*m', own, 'rotational-stiffness')).toBe('N·mm/rad')
    expect(shownIn(4.6, 'm', { base: 'us', force: 'kN' })).toBe('ft')
    expect(shownIn(3, 'kip', { base: 'us', force: 'kN' })).toBe('kN')
  })

  it('serves a kind that stands for no dimension only where that kind is known', () => {
    expect(shownIn(3, 'kN*m', { energy: 'J' })).toBe('kN·m')
    expect(shownIn(3, 'kN*m', { energy: 'J' }, 'energy')).toBe('J')
    expect(shownIn(3, 'deg', { angle: 'deg' })).toBe('')
    expect(shownIn(3, 'deg', { angle: 'deg' }, 'angle')).toBe('°')
  })

  test.each([
    ['imperial', undefined, 'there is no unit profile `imperial`', /^write `metric`, `us`/],
    [{ base: 'si' }, 'base', 'there is no unit profile `si`', /^write `metric`, `us`/],
    [{ forse: 'kN' }, 'forse', 'there is no kind of quantity `forse`', /^did you mean `force`\?$/],
    [{ constructor: 'kN' }, 'constructor', 'there is no kind of quantity `constructor`', /explain units/],
    [{ length: 'kN' }, 'length', '`length: kN` gives a length the unit of a force', /`length: m`$/],
    [{ length: 'KM' }, 'length', 'there is no unit `KM`', /^did you mean `km`\?$/],
    [{ length: '' }, 'length', '`length: ` gives a length the unit of a number without unit', /`length: m`$/],
    [{ moment: 'kJ' }, 'moment', '`moment: kJ` would show a moment as energy', /`moment: kN\*m`$/],
    [{ section: 'm' }, 'section', 'a section has no unit, but `section` gives it one', /leave/],
    [{ number: 'deg' }, 'number', 'a number without unit cannot be given one, as `number` does', /leave/],
  ] as [UnitProfile, string | undefined, string, RegExp][])(
    'says what is wrong with %j',
    (asked, key, problem, suggestion) => {
      const result = resolveProfile(asked)
      expect(result).toMatchObject(key === undefined ? { problem } : { problem, key })
      expect('suggestion' in result && result.suggestion).toMatch(suggestion)
    },
  )
})

test('no profile asked for is metric', () => {
  expect(resolveProfile(undefined)).toBe(resolveProfile('metric'))
})

test('every kind but the plain number can be given its usual unit', () => {
  for (const kind of Object.keys(KINDS) as KindName[]) {
    const usual = DISPLAY_UNITS.us.kinds[kind]?.usual
    if (usual !== undefined) expect(resolveProfile({ [kind]: usual }), kind).toMatchObject({ name: 'own' })
  }
})
