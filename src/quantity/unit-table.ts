import { DIMENSIONLESS, type Dimension } from './dimension.ts'
import { ONE, rational, timesPower, toNumber, type Rational } from './rational.ts'

export interface Unit {
  /** Multiplies a value in this unit to give coherent SI units; the nearest double to the exact factor. */
  readonly factor: number
  readonly dimension: Dimension
  /** Spoken, in the singular: 'kilonewton'. */
  readonly words: string
  /** Spoken, for more than one; `words` with an `s` when left out. */
  readonly plural?: string
  /** As printed, when that differs from the name typed: 'µm', '°'. */
  readonly text?: string
  /** As TeX, when that differs from the upright name. */
  readonly tex?: string
  /** The factor as an exact ratio; absent for the degree alone, whose factor is π/180. */
  readonly exact?: Rational
}

type Parts = Readonly<Record<string, number>>
type Extra = Pick<Unit, 'plural' | 'text' | 'tex'>

const table: Record<string, Unit> = Object.create(null) as Record<string, Unit>

function base(name: string, dimension: Dimension, words: string, extra: Extra = {}): void {
  table[name] = { factor: 1, dimension, words, exact: ONE, ...extra }
}

/** `name` is exactly `multiple` times the product of the units in `parts`, all of which stand above it. */
function derived(name: string, multiple: string, parts: Parts, words: string, extra: Extra = {}): void {
  let exact = rational(multiple)
  const dimension: [number, number, number, number] = [0, 0, 0, 0]
  for (const [part, exponent] of Object.entries(parts)) {
    const unit = table[part]
    if (unit?.exact === undefined) throw new Error(`unit table: ${name} stands before its part ${part}`)
    exact = timesPower(exact, unit.exact, exponent)
    unit.dimension.forEach((e, i) => (dimension[i] = (dimension[i] ?? 0) + e * exponent))
  }
  table[name] = { factor: toNumber(exact), dimension, words, exact, ...extra }
}

function alias(name: string, of: string): void {
  const unit = table[of]
  if (unit === undefined) throw new Error(`unit table: ${name} stands before ${of}`)
  table[name] = { text: of, ...unit }
}

// Base units and SI prefixes: SI Brochure, 9th edition (BIPM 2019), sections 2.3 and 3.
base('m', [0, 1, 0, 0], 'metre')
base('kg', [1, 0, 0, 0], 'kilogram')
base('s', [0, 0, 1, 0], 'second')
base('K', [0, 0, 0, 1], 'kelvin')
base('rad', DIMENSIONLESS, 'radian')

derived('km', '1000', { m: 1 }, 'kilometre')
derived('dm', '0.1', { m: 1 }, 'decimetre')
derived('cm', '0.01', { m: 1 }, 'centimetre')
derived('mm', '0.001', { m: 1 }, 'millimetre')
derived('um', '0.000001', { m: 1 }, 'micrometre', { text: 'µm', tex: '\\mu\\mathrm{m}' })
alias('µm', 'um')
alias('μm', 'um')

// The international yard and pound agreement of 1959: yd = 0.9144 m, lb = 0.45359237 kg; NIST SP 811 (2008), appendix B.
derived('yd', '0.9144', { m: 1 }, 'yard')
derived('ft', '0.3048', { m: 1 }, 'foot', { plural: 'feet' })
derived('in', '0.0254', { m: 1 }, 'inch', { plural: 'inches' })
alias('inch', 'in')
derived('lb', '0.45359237', { kg: 1 }, 'pound of mass', { plural: 'pounds of mass' })

derived('g', '0.001', { kg: 1 }, 'gram')
derived('t', '1000', { kg: 1 }, 'tonne')

derived('mrad', '0.001', { rad: 1 }, 'milliradian')
table['deg'] = {
  factor: Math.PI / 180,
  dimension: DIMENSIONLESS,
  words: 'degree',
  text: '°',
  tex: '{}^{\\circ}',
}
alias('°', 'deg')

derived('ms', '0.001', { s: 1 }, 'millisecond')
derived('min', '60', { s: 1 }, 'minute')
derived('h', '3600', { s: 1 }, 'hour')
derived('Hz', '1', { s: -1 }, 'hertz', { plural: 'hertz' })

derived('N', '1', { kg: 1, m: 1, s: -2 }, 'newton')
derived('kN', '1000', { N: 1 }, 'kilonewton')
derived('MN', '1000000', { N: 1 }, 'meganewton')
derived('GN', '1000000000', { N: 1 }, 'giganewton')

// Forces by weight: standard gravity g_n = 9.80665 m/s² exactly (3rd CGPM, 1901).
derived('kgf', '9.80665', { kg: 1, m: 1, s: -2 }, 'kilogram-force', { plural: 'kilograms-force' })
derived('tf', '1000', { kgf: 1 }, 'metric tonne-force', { plural: 'metric tonnes-force' })
derived('lbf', '9.80665', { lb: 1, m: 1, s: -2 }, 'pound-force', { plural: 'pounds-force' })
derived('kip', '1000', { lbf: 1 }, 'kip')
derived('tonf', '2000', { lbf: 1 }, 'short ton-force of 2000 pounds-force', {
  plural: 'short tons-force of 2000 pounds-force',
})

derived('Pa', '1', { N: 1, m: -2 }, 'pascal')
derived('kPa', '1000', { Pa: 1 }, 'kilopascal')
derived('MPa', '1000000', { Pa: 1 }, 'megapascal')
derived('GPa', '1000000000', { Pa: 1 }, 'gigapascal')
derived('bar', '100000', { Pa: 1 }, 'bar')
derived('mbar', '100', { Pa: 1 }, 'millibar')
derived('psi', '1', { lbf: 1, in: -2 }, 'pound-force per square inch', {
  plural: 'pounds-force per square inch',
})
derived('ksi', '1', { kip: 1, in: -2 }, 'kip per square inch', { plural: 'kips per square inch' })
derived('psf', '1', { lbf: 1, ft: -2 }, 'pound-force per square foot', {
  plural: 'pounds-force per square foot',
})
derived('ksf', '1', { kip: 1, ft: -2 }, 'kip per square foot', { plural: 'kips per square foot' })
derived('plf', '1', { lbf: 1, ft: -1 }, 'pound-force per foot', { plural: 'pounds-force per foot' })
derived('klf', '1', { kip: 1, ft: -1 }, 'kip per foot', { plural: 'kips per foot' })
derived('pcf', '1', { lbf: 1, ft: -3 }, 'pound-force per cubic foot', {
  plural: 'pounds-force per cubic foot',
})

derived('J', '1', { N: 1, m: 1 }, 'joule')
derived('kJ', '1000', { J: 1 }, 'kilojoule')

/**
 * Every unit a sheet can use, with its exact SI factor. A closed list: litres, bits and the many others that a general
 * list would bring are left out, since each further name is one more symbol of a formula that could be taken for a unit.
 */
export const UNITS: Readonly<Record<string, Unit>> = Object.freeze(table)
