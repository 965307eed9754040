import fc from 'fast-check'
import katex from 'katex'
import { describe, expect, it, test } from 'vitest'
import type { Dimension } from '../../src/quantity/dimension.ts'
import {
  fromSi,
  isUnit,
  isUnitProblem,
  nearestUnit,
  parseUnit,
  toSi,
  unitFactor,
  unitGap,
  UNITS,
  unitTex,
  unitText,
  unitWords,
} from '../../src/quantity/units.ts'
import { unit } from './read-unit.ts'

/** Half of the last digit of a factor printed to seven figures, at most. */
const SEVEN_FIGURES = 5.1e-7

// NIST Special Publication 811 (2008), appendix B.8, factors to seven figures. Those of force, length, mass and angle were
// compared with a transcription of the table; the others are from memory of it.
describe('factors agree with NIST SP 811 appendix B.8', () => {
  test.each([
    ['in', 2.54e-2],
    ['ft', 3.048e-1],
    ['yd', 9.144e-1],
    ['in^2', 6.4516e-4],
    ['ft^2', 9.290304e-2],
    ['in^3', 1.638706e-5],
    ['ft^3', 2.831685e-2],
    ['in^4', 4.162314e-7],
    ['ft^4', 8.630975e-3],
    ['lb', 4.535924e-1],
    ['t', 1e3],
    ['lb/ft', 1.488164],
    ['lb/ft^2', 4.882428],
    ['lb/ft^3', 1.601846e1],
    ['lb/in^3', 2.76799e4],
    ['lbf', 4.448222],
    ['kip', 4.448222e3],
    ['tonf', 8.896443e3],
    ['kgf', 9.80665],
    ['lbf/ft', 1.45939e1],
    ['lbf/in', 1.751268e2],
    ['lbf*ft', 1.355818],
    ['lbf*in', 1.129848e-1],
    ['kgf*m', 9.80665],
    ['psi', 6.894757e3],
    ['ksi', 6.894757e6],
    ['psf', 4.788026e1],
    ['kgf/cm^2', 9.80665e4],
    ['bar', 1e5],
    ['mbar', 1e2],
    ['deg', 1.745329e-2],
    ['ft/s', 3.048e-1],
    ['ft/s^2', 3.048e-1],
    ['min', 60],
    ['h', 3600],
  ])('%s', (text, published) => {
    expect(unitFactor(unit(text)).factor / published - 1).toBeCloseTo(0, 5)
    expect(Math.abs(unitFactor(unit(text)).factor / published - 1)).toBeLessThan(SEVEN_FIGURES)
  })
})

// python3 -c "from fractions import Fraction as F; f=F('0.45359237')*F('9.80665'); i=F('0.0254'); t=F('0.3048')
// for v in (f, 1000*f, 2000*f, f/i**2, 1000*f/i**2, f/t**2, 1000*f/t**2, f/t, 1000*f/t, f/t**3, i**4, i**6, F(1,100)**4): print(repr(float(v)))"
describe('factors are the doubles nearest to the exact ratios', () => {
  test.each([
    ['lbf', 4.4482216152605],
    ['kip', 4448.2216152605],
    ['tonf', 8896.443230521],
    ['psi', 6894.757293168362],
    ['ksi', 6894757.293168361],
    ['psf', 47.880258980335846],
    ['ksf', 47880.25898033584],
    ['plf', 14.593902937206364],
    ['klf', 14593.902937206365],
    ['pcf', 157.0874638462462],
    ['in^4', 4.162314256e-7],
    ['in^6', 2.68535866540096e-10],
    ['cm^4', 1e-8],
    ['mm^6', 1e-18],
    ['N/mm^2', 1e6],
    ['kN/cm^2', 1e7],
    ['mm/m', 1e-3],
  ])('%s', (text, exact) => {
    expect(unitFactor(unit(text)).factor).toBe(exact)
  })
})

// SI Brochure, 9th edition (BIPM 2019), table 7.
test('prefixes multiply as the SI Brochure says', () => {
  const prefixes: [string, string, number][] = [
    ['GN', 'N', 1e9],
    ['MN', 'N', 1e6],
    ['kN', 'N', 1e3],
    ['GPa', 'Pa', 1e9],
    ['MPa', 'Pa', 1e6],
    ['kPa', 'Pa', 1e3],
    ['mbar', 'bar', 1e-3],
    ['km', 'm', 1e3],
    ['dm', 'm', 1e-1],
    ['cm', 'm', 1e-2],
    ['mm', 'm', 1e-3],
    ['um', 'm', 1e-6],
    ['kg', 'g', 1e3],
    ['ms', 's', 1e-3],
    ['mrad', 'rad', 1e-3],
    ['kJ', 'J', 1e3],
  ]
  for (const [large, small, ratio] of prefixes) {
    expect(toSi(1, unit(large)) / toSi(1, unit(small)), large).toBeCloseTo(ratio, 12)
  }
})

test('an angle has no dimension, so a rotational stiffness has that of a moment', () => {
  expect(unitFactor(unit('kN*m/rad'))).toMatchObject({ factor: 1000, dimension: [1, 2, -2, 0] })
  expect(unitFactor(unit('kN*m/deg')).factor).toBeCloseTo((1000 * 180) / Math.PI, 8)
})

test('ksi, psf, plf, klf, pcf have the dimensions of stress, line load and unit weight', () => {
  const dimensions: [string, Dimension][] = [
    ['ksi', [1, -1, -2, 0]],
    ['psf', [1, -1, -2, 0]],
    ['plf', [1, 0, -2, 0]],
    ['klf', [1, 0, -2, 0]],
    ['pcf', [1, -2, -2, 0]],
    ['lb', [1, 0, 0, 0]],
    ['lbf', [1, 1, -2, 0]],
    ['tf', [1, 1, -2, 0]],
    ['t', [1, 0, 0, 0]],
  ]
  for (const [text, dimension] of dimensions)
    expect(unitFactor(unit(text)).dimension, text).toEqual(dimension)
})

const anyUnit = fc.constantFrom(...Object.keys(UNITS))
const anyValue = fc.double({ min: 1e-12, max: 1e12, noNaN: true })

test('a value comes back through SI to within two units in its last place', () => {
  fc.assert(
    fc.property(anyUnit, fc.integer({ min: -6, max: 6 }), anyValue, (name, exponent, value) => {
      fc.pre(exponent !== 0)
      const expression = [{ unit: name, exponent }]
      expect(Math.abs(fromSi(toSi(value, expression), expression) / value - 1)).toBeLessThanOrEqual(4.5e-16)
    }),
  )
})

test('whole millimetres are the nearest double in metres, as if typed there', () => {
  fc.assert(
    fc.property(fc.integer({ min: 1, max: 999_999 }), (millimetres) => {
      expect(toSi(millimetres, unit('mm'))).toBe(Number(`${String(millimetres)}e-3`))
    }),
  )
})

describe('reading a unit', () => {
  it('accepts the ways of writing that the trade uses', () => {
    expect(unit('N/mm^2')).toEqual([
      { unit: 'N', exponent: 1 },
      { unit: 'mm', exponent: -2 },
    ])
    for (const text of ['kN*m/rad', 'kN·m/rad', ' kN * m / rad ', 'kN⋅m/rad', 'kN*m*rad^-1', 'kN*m*rad⁻¹']) {
      expect(unitText(unit(text)), text).toBe('kN·m/rad')
    }
    for (const text of [
      'kN/m^2',
      'kN/m²',
      'kN/m**2',
      'kN*m^-2',
      'kN*m^(-2)',
      'kN·m⁻²',
      'kN/(m*m)',
      'kN/m/m',
    ]) {
      expect(unitFactor(unit(text)).dimension, text).toEqual([1, -1, -2, 0])
    }
    expect(unitText(unit('1/K'))).toBe('K⁻¹')
    expect(unitText(unit('m^0.5'))).toBe('m^(1/2)')
    expect(unitText(unit('inch'))).toBe('in')
    expect(unitText(unit('µm'))).toBe('µm')
    expect(unit('')).toEqual([])
  })

  it('divides by the one factor after the stroke', () => {
    expect(unitFactor(unit('kN/m*s')).dimension).toEqual([1, 0, -1, 0])
    expect(unitFactor(unit('kN/(m*s)')).dimension).toEqual([1, 0, -3, 0])
  })

  it('keeps a moment per metre as written', () => {
    expect(unitText(unit('kN*m/m'))).toBe('kN·m/m')
  })

  test.each([
    ['KN', 'there is no unit `KN`', 'did you mean `kN`?'],
    ['Mpa', 'there is no unit `Mpa`', 'did you mean `MPa`?'],
    ['cm4', 'a power in `cm4` has no `^`', 'write `cm^4`'],
    ['N/mm2', 'a power in `N/mm2` has no `^`', 'write `N/mm^2`'],
    ['kNm', 'there is no unit `kNm`', 'did you mean `kN*m`?'],
    ['kN m', 'a product in `kN m` is not written with `*`', 'write `kN*m`'],
    ['kip-ft', 'a product in `kip-ft` is not written with `*`', 'write `kip*ft`'],
    ['zzz', 'there is no unit `zzz`', undefined],
    ['constructor', 'there is no unit `constructor`', undefined],
    ['N/', '`N/` ends where a unit should follow', 'write units as `kN*m`, `N/mm^2` or `kN*m/rad`'],
    ['(N', 'a bracket in `(N` is not closed', undefined],
    ['m^0', 'the power 0 in `m^0` is out of range', 'write units as `kN*m`, `N/mm^2` or `kN*m/rad`'],
    ['m$', '`$` cannot stand in a unit', 'write units as `kN*m`, `N/mm^2` or `kN*m/rad`'],
  ])('says what is wrong with %s', (text, problem, suggestion) => {
    expect(parseUnit(text)).toEqual(suggestion === undefined ? { problem } : { problem, suggestion })
  })

  it('refuses offset temperatures, percent and tons, and says why', () => {
    for (const text of ['degC', '°C', 'degF', '%', 'percent', 'ton', 'tons', 'kN/degC']) {
      const result = parseUnit(text)
      expect(isUnitProblem(result) && result.suggestion, text).toMatch(/^write /)
      expect(isUnit(text)).toBe(false)
    }
  })

  it('answers any text with a unit or a problem in lower case without a full stop', () => {
    const pieces = fc.array(
      fc.constantFrom('kN', 'm', '*', '/', '^', '(', ')', '2', '-', '²', ' ', '1', 'x', '.'),
    )
    fc.assert(
      fc.property(
        fc.oneof(
          fc.string(),
          pieces.map((p) => p.join('')),
        ),
        (text) => {
          const result = parseUnit(text)
          if (!isUnitProblem(result)) return Number.isFinite(unitFactor(result).factor)
          return /^[^A-Z]/.test(result.problem) && !result.problem.endsWith('.')
        },
      ),
      { numRuns: 2000 },
    )
  })

  it('refuses powers that would take the factor out of range', () => {
    const text = 'km^24*km^24*um^-24*um^-23'
    expect(parseUnit(text)).toEqual({ problem: `the powers in \`${text}\` add up to more than 24` })
    const beyond = [...unit('km^24'), ...unit('km^24'), ...unit('um^-24'), ...unit('um^-23')]
    expect(() => unitFactor(beyond)).toThrow(RangeError)
    expect(() => unitFactor([{ unit: 'furlong', exponent: 1 }])).toThrow('there is no unit `furlong`')
  })

  it('reads back everything it prints', () => {
    const exponent = fc.oneof(
      fc.integer({ min: 1, max: 4 }),
      fc.constantFrom(1 / 2, 3 / 2, 1 / 3, 2 / 3, 1 / 4),
    )
    const part = fc.record({
      unit: fc.constantFrom('kN', 'm', 'mm', 'rad', 's', 'um', 'kip', 'deg', 'K'),
      exponent,
    })
    fc.assert(
      fc.property(fc.array(part, { maxLength: 3 }), fc.array(part, { maxLength: 3 }), (over, under) => {
        const written = [...over, ...under.map((p) => ({ unit: p.unit, exponent: -p.exponent }))]
        expect(unit(unitText(written))).toEqual(written)
      }),
    )
  })
})

test('a slip of case, a word or a letter leads to the unit that was meant', () => {
  const meant: [string, string | undefined][] = [
    ['KN', 'kN'],
    ['kn', 'kN'],
    ['Mpa', 'MPa'],
    ['mpa', 'MPa'],
    ['Kips', 'kip'],
    ['kips', 'kip'],
    ['KSI', 'ksi'],
    ['inches', 'in'],
    ['feet', 'ft'],
    ['metres', 'm'],
    ['Newtons', 'N'],
    ['pounds', 'lbf'],
    ['cm4', 'cm^4'],
    ['kNm', 'kN*m'],
    ['kNmm', 'kN*mm'],
    ['kippp', undefined],
    ['', undefined],
    ['toString', undefined],
  ]
  for (const [slip, expected] of meant) expect(nearestUnit(slip), slip).toBe(expected)
})

test('the list has no unit that it need not have, and every entry is complete', () => {
  for (const name of [
    'l',
    'L',
    'b',
    'B',
    'e',
    'E',
    'I',
    'A',
    'P',
    'q',
    'u',
    'mi',
    'toString',
    '__proto__',
    'constructor',
  ]) {
    expect(isUnit(name), name).toBe(false)
  }
  for (const [name, entry] of Object.entries(UNITS)) {
    expect(entry.factor, name).toBeGreaterThan(0)
    expect(entry.words, name).toMatch(/^[a-z][a-z0-9 -]+$/)
    expect(entry.dimension, name).toHaveLength(4)
  }
})

test('units print upright and KaTeX accepts them all', () => {
  expect(unitTex(unit('kN*m/rad'))).toBe('\\mathrm{kN}{\\cdot}\\mathrm{m}/\\mathrm{rad}')
  expect(unitTex(unit('N/mm^2'))).toBe('\\mathrm{N}/\\mathrm{mm}^{2}')
  for (const name of Object.keys(UNITS)) {
    const tex = `30\\,${unitTex([{ unit: name, exponent: 2 }])}\\;${unitTex([{ unit: name, exponent: -1 }])}`
    expect(() => katex.renderToString(tex, { throwOnError: true, strict: 'error' }), name).not.toThrow()
  }
})

test('only degrees and plain numbers close up to the number', () => {
  expect(unitGap(unit('deg'))).toBe('')
  expect(unitGap([])).toBe('')
  expect(unitGap(unit('kN'))).toBe(' ')
  expect(unitGap(unit('m/deg'))).toBe(' ')
})

test('units are spoken in words', () => {
  const spoken: [string, string][] = [
    ['kN', 'kilonewtons'],
    ['N/mm^2', 'newtons per square millimetre'],
    ['kN*m/rad', 'kilonewton metres per radian'],
    ['cm^4', 'centimetres to the fourth power'],
    ['cm^3', 'cubic centimetres'],
    ['in^6', 'inches to the power 6'],
    ['ksi', 'kips per square inch'],
    ['ft', 'feet'],
    ['lb', 'pounds of mass'],
    ['tonf', 'short tons-force of 2000 pounds-force'],
    ['m/s^2', 'metres per second squared'],
    ['1/m', 'per metre'],
    ['deg', 'degrees'],
    ['', ''],
  ]
  for (const [text, words] of spoken) expect(unitWords(unit(text)), text).toBe(words)
  expect(unitWords(unit('kip*ft'), true)).toBe('kip foot')
})
