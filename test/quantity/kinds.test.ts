import { expect, test } from 'vitest'
import type { Dimension } from '../../src/quantity/dimension.ts'
import {
  dimensionName,
  isKind,
  kindOfDimension,
  KINDS,
  QUANTITY_KINDS,
  withArticle,
} from '../../src/quantity/kinds.ts'
import { unitFactor } from '../../src/quantity/units.ts'
import { unit } from './read-unit.ts'

// Dimensions by definition: F = m·a, stress = force/area, moment = force·length, EI = stress·length⁴, and so on.
test('each kind has the dimension of its defining formula', () => {
  const definitions: [keyof typeof KINDS, string][] = [
    ['number', ''],
    ['angle', 'rad'],
    ['length', 'm'],
    ['area', 'm^2'],
    ['section-modulus', 'm^3'],
    ['volume', 'm^3'],
    ['second-moment', 'm^4'],
    ['torsion-constant', 'm^4'],
    ['warping-constant', 'm^6'],
    ['curvature', 'rad/m'],
    ['force', 'kg*m/s^2'],
    ['axial-rigidity', 'Pa*m^2'],
    ['stress', 'N/m^2'],
    ['pressure', 'N/m^2'],
    ['foundation-modulus', 'N/m/m'],
    ['moment', 'N*m'],
    ['rotational-stiffness', 'N*m/rad'],
    ['energy', 'J'],
    ['line-load', 'N/m'],
    ['stiffness', 'N/m'],
    ['unit-weight', 'N/m^3'],
    ['flexural-rigidity', 'Pa*m^4'],
    ['torsional-rigidity', 'Pa*m^4'],
    ['warping-rigidity', 'Pa*m^6'],
    ['mass', 'kg'],
    ['mass-per-length', 'kg/m'],
    ['mass-per-area', 'kg/m^2'],
    ['density', 'kg/m^3'],
    ['time', 's'],
    ['frequency', 'Hz'],
    ['speed', 'm/s'],
    ['acceleration', 'm/s^2'],
    ['temperature-difference', 'K'],
    ['thermal-expansion', '1/K'],
  ]
  for (const [name, text] of definitions) {
    const kind = KINDS[name]
    expect('dimension' in kind && kind.dimension, name).toEqual(unitFactor(unit(text)).dimension)
  }
  expect(definitions.map(([name]) => name)).toEqual(QUANTITY_KINDS.map(([name]) => name))
})

test('a dimension has one name in the record, and SI base units where there is no name', () => {
  const names: [Dimension, string, string][] = [
    [[0, 0, 0, 0], '1', 'a number without unit'],
    [[1, 1, -2, 0], 'force', 'a force'],
    [[0, 1, 0, 0], 'length', 'a length'],
    [[1, 2, -2, 0], 'moment', 'a moment'],
    [[1, -1, -2, 0], 'stress', 'a stress'],
    [[1, 0, -2, 0], 'line-load', 'a force per length'],
    [[0, 4, 0, 0], 'second-moment', 'a second moment of area'],
    [[1, 0, -1, 0], 'kg/s', 'a quantity in kg/s'],
    [[1, 1, -1, 0], 'kg·m/s', 'a quantity in kg·m/s'],
    [[0, 5, 0, 0], 'm⁵', 'a quantity in m⁵'],
    [[-1, 0, 2, 0], 's²/kg', 'a quantity in s²/kg'],
    [[0, -2, -1, 0], '1/(m²·s)', 'a quantity in 1/(m²·s)'],
    [[0.5, -0.5, -1, 0], 'kg^(1/2)/(m^(1/2)·s)', 'a quantity in kg^(1/2)/(m^(1/2)·s)'],
  ]
  for (const [dimension, name, words] of names) {
    expect(dimensionName(dimension)).toBe(name)
    expect(withArticle(dimension)).toBe(words)
  }
})

test('exponents that come back from roots by floating point still find their name', () => {
  const third: Dimension = [1 / 3 + 1 / 3 + 1 / 3, 0.1 * 3 + 0.7, -2 + 1e-12, -0]
  expect(dimensionName(third)).toBe('force')
})

test('only the names of the list are kinds', () => {
  expect(isKind('force')).toBe(true)
  expect(isKind('section')).toBe(true)
  for (const name of ['forse', 'toString', '__proto__', 'constructor', ''])
    expect(isKind(name), name).toBe(false)
  expect(kindOfDimension([3, 3, 3, 3])).toBeUndefined()
})
