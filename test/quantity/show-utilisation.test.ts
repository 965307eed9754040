import fc from 'fast-check'
import { expect, test } from 'vitest'
import { showUtilisation } from '../../src/quantity/show.ts'

test.each([
  [0.947, '0.947'],
  [0.94749, '0.947'],
  [0.9475, '0.948'],
  [0, '0.000'],
  [1, '1.000'],
  [1.0004, '1.0004'],
  [1.00049, '1.0005'],
  [0.99996, '0.99996'],
  [0.9995, '0.9995'],
  [0.99949, '0.999'],
  [1.0005, '1.001'],
  [1 + 2 ** -52, '1.0000000000000002'],
  [1 - 2 ** -53, '0.9999999999999999'],
  [12.34567, '12.346'],
  [1234.5678, '1\u202f234.568'],
  [-0.3, '\u22120.300'],
  [-0.0001, '0.000'],
  [-0, '0.000'],
  [1e-300, '0.000'],
  [1.23456e22, '1.235×10²²'],
])('%d is shown as %s', (utilisation, expected) => {
  expect(showUtilisation(utilisation)).toBe(expected)
})

const read = (text: string) => Number(text.replaceAll('\u202f', '').replace('\u2212', '-'))

const nearOne = fc
  .tuple(fc.integer({ min: -17, max: -1 }), fc.double({ min: -9, max: 9, noNaN: true }))
  .map(([power, digit]) => 1 + digit * 10 ** power)
const anyUtilisation = fc.oneof(
  nearOne,
  fc.double({ min: -5, max: 5, noNaN: true }),
  fc.double({ min: 0, max: 9e6, noNaN: true }),
)

test('a pass never reads as a failure, nor a failure as a pass', () => {
  fc.assert(
    fc.property(anyUtilisation, (utilisation) => {
      expect(Math.sign(read(showUtilisation(utilisation)) - 1)).toBe(Math.sign(utilisation - 1))
    }),
    { numRuns: 5000 },
  )
})

test('what is shown differs by at most half of its last digit and has at least three decimals', () => {
  fc.assert(
    fc.property(anyUtilisation, (utilisation) => {
      const text = showUtilisation(utilisation)
      const decimals = text.split('.')[1]?.length ?? 0
      expect(decimals).toBeGreaterThanOrEqual(3)
      expect(Math.abs(read(text) - utilisation)).toBeLessThanOrEqual(
        0.5 * 10 ** -decimals + 4e-16 * Math.abs(utilisation),
      )
    }),
    { numRuns: 5000 },
  )
})

test('what is not finite is refused', () => {
  for (const value of [NaN, Infinity, -Infinity]) expect(() => showUtilisation(value)).toThrow(RangeError)
})
