import fc from 'fast-check'
import { describe, expect, it, test } from 'vitest'
import { showComparison } from '../../src/quantity/show-comparison.ts'
import { show, type Shown } from '../../src/quantity/show.ts'
import { fromSi, toSi, unitFactor } from '../../src/quantity/units.ts'
import { profile, quantity, unit } from './read-unit.ts'

const metric = profile('metric')
const us = profile('us')

const text = (value: number, given: string, to?: string) =>
  show(quantity(value, given), metric, to === undefined ? {} : { unit: unit(to) }).text

/** The number that a reader takes from what is printed. */
function read(shown: Shown): number {
  const digits = shown.number.replaceAll('\u202f', '').replace('\u2212', '-')
  return Number(`${digits}e${String(shown.exponent ?? 0)}`)
}

/** One unit of the last digit printed. */
function lastDigit(shown: Shown): number {
  const decimals = shown.number.split('.')[1]?.length ?? 0
  return Number(`1e${String((shown.exponent ?? 0) - decimals)}`)
}

describe('rounding for print', () => {
  test.each([
    [1_234_567.8, 'N', '1 235 kN'],
    [301_000, 'N', '301 kN'],
    [12.301, 'kN', '12.30 kN'],
    [6, 'm', '6 m'],
    [12_345.6, 'kN', '12 346 kN'],
    [589, 'cm^4', '589 cm⁴'],
    [210_000, 'N/mm^2', '210 000 N/mm²'],
    [0, 'kN', '0 kN'],
    [-0, 'kN', '0 kN'],
    [-1234.56, 'kN', '-1 235 kN'],
    [9.99996, 'kN', '10.00 kN'],
    [0.734123, '', '0.734'],
    [1.234567, '', '1.235'],
    [12.34567, '', '12.35'],
    [0.0123456, '', '0.0123'],
    [0.9996, '', '1.000'],
    [1, '', '1'],
    [0.5, '', '0.5'],
    [0.001234, '', '0.00123'],
    [0.00012345, '', '1.23×10⁻⁴'],
    [1.2e-5, '1/K', '1.2×10⁻⁵ K⁻¹'],
    [9_999_999.4, '', '9 999 999'],
    [9_999_999.6, '', '1.000×10⁷'],
    [123_456_789, '', '1.235×10⁸'],
    [3, 'kN*m', '3 kN·m'],
  ])('%d %s is shown as %s', (value, given, expected) => {
    expect(text(value, given)).toBe(expected)
  })

  // ISO 80000-1:2009 annex B, rule B (from memory): where two neighbours are equally near, the greater magnitude is taken.
  test.each([
    [12.25, 3, '12.3'],
    [12.35, 3, '12.4'],
    [12.251, 3, '12.3'],
    [12.275, 3, '12.3'],
    [12.223, 3, '12.2'],
    [-12.25, 3, '-12.3'],
    [1.005, 3, '1.01'],
    [2.675, 3, '2.68'],
    [1.45, 2, '1.5'],
    [8.345, 3, '8.35'],
  ])(
    '%d to %d figures is %s: half away from zero, by the decimal and not the binary digits',
    (value, figures, expected) => {
      expect(show({ si: value, dimension: [0, 0, 0, 0] }, metric, { figures }).text).toBe(expected)
    },
  )

  it('does not let noise of the conversion tip a half', () => {
    expect(text(12.345, 'kN')).toBe('12.35 kN')
    expect(text(0.1 + 0.2, 'kN', 'kN')).toBe('0.3 kN')
    expect(show({ si: 1.1 * 1.1 * 1000, dimension: [1, 1, -2, 0] }, metric).text).toBe('1.21 kN')
  })

  it('uses the unit asked for', () => {
    expect(text(30, 'deg', 'deg')).toBe('30°')
    expect(text(285, 'kN', 'MN')).toBe('0.285 MN')
    expect(text(5, 'kN*m', 'kJ')).toBe('5 kJ')
    expect(text(1 / 3, '', 'mrad')).toBe('333.3 mrad')
  })

  it('separates with narrow no-break spaces and a true minus in the number, ordinary ones in the text', () => {
    const shown = show(quantity(-1_234_567, 'kN'), metric, { unit: unit('kN') })
    expect(shown).toEqual({
      number: '\u22121\u202f234\u202f567',
      unit: unit('kN'),
      unitText: 'kN',
      text: '-1 234 567 kN',
    })
    expect(show(quantity(1.5e9, 'kN'), metric, { unit: unit('kN') })).toMatchObject({
      number: '1.5',
      exponent: 9,
    })
  })

  it('refuses what is not finite and a unit of another dimension', () => {
    for (const si of [NaN, Infinity, -Infinity]) {
      expect(() => show({ si, dimension: [0, 0, 0, 0] }, metric)).toThrow(RangeError)
    }
    expect(() => show(quantity(1, 'kN'), metric, { unit: unit('m') })).toThrow(RangeError)
    expect(() => show(quantity(1, 'kN'), metric, { unit: [] })).toThrow(RangeError)
  })
})

describe('a number as typed', () => {
  const typed = (value: number, digits: string, given: string) =>
    show(quantity(value, given), us, { asTyped: { text: digits, unit: unit(given) } }).text

  it('keeps its digits and its unit, whatever the profile', () => {
    expect(typed(4.6, '4.60', 'm')).toBe('4.60 m')
    expect(typed(0.285, '0.2850', 'MN')).toBe('0.2850 MN')
    expect(typed(12345.678, '12345.678', 'mm')).toBe('12 345.678 mm')
    expect(typed(210_000, '2.10e5', 'N/mm^2')).toBe('2.10×10⁵ N/mm²')
    expect(typed(1e-7, '1E-7', 'rad')).toBe('1×10⁻⁷ rad')
    expect(typed(0.5, '.5', 'm')).toBe('0.5 m')
    expect(typed(5, '5.', 'm')).toBe('5 m')
    expect(typed(-3, '-3.0', 'kN')).toBe('-3.0 kN')
    expect(typed(0, '0.00', 'kN')).toBe('0.00 kN')
    expect(typed(0, '-0', 'kN')).toBe('0 kN')
  })

  it('is passed over when it does not say the value', () => {
    const options = (digits: string, given: string) => ({ asTyped: { text: digits, unit: unit(given) } })
    expect(show(quantity(4.6, 'm'), metric, options('4.61', 'm')).text).toBe('4.6 m')
    expect(show(quantity(4.6, 'm'), metric, options('4.6', 'mm')).text).toBe('4.6 m')
    expect(show(quantity(4.6, 'm'), metric, options('4.6', 'kN')).text).toBe('4.6 m')
    expect(show(quantity(4.6, 'm'), metric, options('L', 'm')).text).toBe('4.6 m')
    expect(show(quantity(4.6, 'm'), metric, options('', 'm')).text).toBe('4.6 m')
  })

  it('gives way to the unit asked for', () => {
    const options = { unit: unit('mm'), asTyped: { text: '4.60', unit: unit('m') } }
    expect(show(quantity(4.6, 'm'), metric, options).text).toBe('4 600 mm')
  })
})

const anyValue = fc.oneof(
  fc.double({ noNaN: true, noDefaultInfinity: true, min: -1e200, max: 1e200 }),
  fc.double({ noNaN: true, min: -1e7, max: 1e7 }),
  fc.integer({ min: -10_000_000, max: 10_000_000 }).map((n) => n / 1000),
)
const anyUnit = fc.constantFrom('', 'kN', 'mm', 'N/mm^2', 'cm^4', 'kip', 'ft', 'ksi', 'kN*m', 'deg', 'kN*s')
const anyProfile = fc.constantFrom(metric, us)
/** What the last digits of a double, and the 14 of them that are rounded from, leave open. */
const NOISE = 1e-13

test('what is shown differs from the value by at most half of its last digit', () => {
  fc.assert(
    fc.property(
      anyValue,
      anyUnit,
      anyProfile,
      fc.option(fc.integer({ min: 1, max: 12 })),
      (value, given, which, figures) => {
        const size = quantity(value, given)
        const shown = show(size, which, figures === null ? {} : { figures })
        const exact = fromSi(size.si, shown.unit)
        expect(Math.abs(read(shown) - exact)).toBeLessThanOrEqual(
          lastDigit(shown) / 2 + NOISE * Math.abs(exact),
        )
      },
    ),
    { numRuns: 5000 },
  )
})

test('what is shown is at least as fine as four figures, three below one', () => {
  fc.assert(
    fc.property(anyValue, anyUnit, anyProfile, (value, given, which) => {
      const size = quantity(value, given)
      const shown = show(size, which)
      const exact = fromSi(size.si, shown.unit)
      fc.pre(exact !== 0)
      expect(Math.abs(read(shown) / exact - 1)).toBeLessThanOrEqual(
        (shown.unit.length === 0 ? 5e-3 : 5e-4) + NOISE,
      )
    }),
    { numRuns: 5000 },
  )
})

test('a larger value is never shown smaller in the same unit', () => {
  fc.assert(
    fc.property(anyValue, fc.double({ min: 0, max: 1e-2, noNaN: true }), anyUnit, (value, more, given) => {
      const [a, b] = [value, value + Math.abs(value) * more]
      const options = { unit: unit(given) }
      expect(read(show(quantity(a, given), metric, options))).toBeLessThanOrEqual(
        read(show(quantity(b, given), metric, options)),
      )
    }),
    { numRuns: 5000 },
  )
})

test('a sign changes nothing but the sign', () => {
  fc.assert(
    fc.property(anyValue, anyUnit, (value, given) => {
      const size = quantity(Math.abs(value), given)
      fc.pre(size.si !== 0)
      expect(show({ ...size, si: -size.si }, metric).text).toBe(`-${show(size, metric).text}`)
    }),
  )
})

test('the form is digits in threes, one point, a power of ten only outside 0.001 to ten million', () => {
  fc.assert(
    fc.property(anyValue, anyUnit, anyProfile, (value, given, which) => {
      const shown = show(quantity(value, given), which)
      expect(shown.number).toMatch(/^\u2212?(\d{1,3}|\d{1,3}(\u202f\d{3})+)(\.\d+)?$/)
      expect(shown.number).not.toMatch(/^\u22120(\.0*)?$/)
      const size = Math.abs(read(shown))
      expect(shown.exponent === undefined).toBe(size === 0 || (size >= 0.001 && size < 1e7))
      if (shown.exponent !== undefined) expect(shown.number).toMatch(/^\u2212?[1-9](\.|$)/)
    }),
    { numRuns: 2000 },
  )
})

test('the same quantity says the same in both systems', () => {
  fc.assert(
    fc.property(anyValue, fc.constantFrom('kN', 'm', 'N/mm^2', 'cm^4', 'kN*m'), (value, given) => {
      const size = quantity(value, given)
      const inSi = (shown: Shown) => toSi(read(shown), shown.unit)
      const [a, b] = [show(size, metric), show(size, us)]
      expect(unitFactor(a.unit).dimension).toEqual(unitFactor(b.unit).dimension)
      expect(Math.abs(inSi(a) - inSi(b))).toBeLessThanOrEqual(1e-3 * Math.abs(size.si) + 1e-300)
    }),
  )
})

describe('the two sides of a check', () => {
  const pair = (a: number, b: number) =>
    showComparison(quantity(a, 'kN'), quantity(b, 'kN'), metric).map((shown) => shown.text)

  it('stand in one unit, that of the larger', () => {
    expect(pair(0.05, 285)).toEqual(['0.05 kN', '285 kN'])
    expect(pair(285, 1.2e5)).toEqual(['0.285 MN', '120 MN'])
  })

  it('are told apart when they differ, and look alike when they do not', () => {
    expect(pair(285.04, 285)).toEqual(['285.04 kN', '285 kN'])
    expect(pair(300.0149, 300.0151)).toEqual(['300.01 kN', '300.02 kN'])
    expect(pair(301.234, 301.234)).toEqual(['301.2 kN', '301.2 kN'])
  })

  it('never read in the wrong order', () => {
    fc.assert(
      fc.property(anyValue, fc.double({ min: 1e-12, max: 1e-2, noNaN: true }), (value, more) => {
        const [a, b] = [Math.abs(value) + 1e-9, (Math.abs(value) + 1e-9) * (1 + more)]
        const [small, large] = showComparison(quantity(a, 'kN'), quantity(b, 'kN'), metric)
        expect(small.unit).toBe(large.unit)
        expect(read(small)).toBeLessThan(read(large))
      }),
      { numRuns: 2000 },
    )
  })
})
