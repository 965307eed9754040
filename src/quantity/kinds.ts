import { isDimensionless, type Dimension } from './dimension.ts'
import { raisedExponent } from './exponent.ts'

/** What a quantity is, beyond its dimension: a moment and a rotational stiffness have the same one. */
export interface QuantityKind {
  readonly dimension: Dimension
  /** With its article: 'a force', 'a second moment of area'. */
  readonly words: string
}

/** What an input can be that is no quantity: a section, a text … */
export interface OtherKind {
  readonly dimension?: undefined
  readonly words: string
}

export type Kind = QuantityKind | OtherKind

const kind = (dimension: Dimension, words: string): QuantityKind => ({ dimension, words })
const other = (words: string): OtherKind => ({ words })

/**
 * Every kind that an input can be declared as (`N_Ed : force`) and a unit profile can name. Of the kinds with one
 * dimension the first stands for it where only the dimension is known.
 */
export const KINDS = Object.freeze({
  number: kind([0, 0, 0, 0], 'a number without unit'),
  angle: kind([0, 0, 0, 0], 'an angle'),
  length: kind([0, 1, 0, 0], 'a length'),
  area: kind([0, 2, 0, 0], 'an area'),
  'section-modulus': kind([0, 3, 0, 0], 'a section modulus or volume'),
  volume: kind([0, 3, 0, 0], 'a volume'),
  'second-moment': kind([0, 4, 0, 0], 'a second moment of area'),
  'torsion-constant': kind([0, 4, 0, 0], 'a torsion constant'),
  'warping-constant': kind([0, 6, 0, 0], 'a warping constant'),
  curvature: kind([0, -1, 0, 0], 'a curvature'),
  force: kind([1, 1, -2, 0], 'a force'),
  'axial-rigidity': kind([1, 1, -2, 0], 'an axial rigidity'),
  stress: kind([1, -1, -2, 0], 'a stress'),
  pressure: kind([1, -1, -2, 0], 'a pressure'),
  'foundation-modulus': kind([1, -1, -2, 0], 'a foundation stiffness per length'),
  moment: kind([1, 2, -2, 0], 'a moment'),
  'rotational-stiffness': kind([1, 2, -2, 0], 'a rotational stiffness'),
  energy: kind([1, 2, -2, 0], 'an energy'),
  'line-load': kind([1, 0, -2, 0], 'a force per length'),
  stiffness: kind([1, 0, -2, 0], 'a stiffness'),
  'unit-weight': kind([1, -2, -2, 0], 'a force per volume'),
  'flexural-rigidity': kind([1, 3, -2, 0], 'a flexural rigidity'),
  'torsional-rigidity': kind([1, 3, -2, 0], 'a torsional rigidity'),
  'warping-rigidity': kind([1, 5, -2, 0], 'a warping rigidity'),
  mass: kind([1, 0, 0, 0], 'a mass'),
  'mass-per-length': kind([1, -1, 0, 0], 'a mass per length'),
  'mass-per-area': kind([1, -2, 0, 0], 'a mass per area'),
  density: kind([1, -3, 0, 0], 'a density'),
  time: kind([0, 0, 1, 0], 'a time'),
  frequency: kind([0, 0, -1, 0], 'a frequency'),
  speed: kind([0, 1, -1, 0], 'a speed'),
  acceleration: kind([0, 1, -2, 0], 'an acceleration'),
  'temperature-difference': kind([0, 0, 0, 1], 'a temperature difference'),
  'thermal-expansion': kind([0, 0, 0, -1], 'a coefficient of thermal expansion'),
  section: other('a section'),
  material: other('a material'),
  text: other('a text'),
  truth: other('a truth value'),
  model: other('a model'),
} as const satisfies Record<string, Kind>)

export type KindName = keyof typeof KINDS

export function isKind(name: string): name is KindName {
  return Object.hasOwn(KINDS, name)
}

/** The kinds that are quantities, in the order of `KINDS`. */
export const QUANTITY_KINDS: readonly (readonly [KindName, QuantityKind])[] = (
  Object.entries(KINDS) as [KindName, Kind][]
).filter((entry): entry is [KindName, QuantityKind] => entry[1].dimension !== undefined)

/** One text for each dimension, however its exponents were reached: a key for look-up. */
export function dimensionKey(dimension: Dimension): string {
  let key = ''
  for (const exponent of dimension) key += `${String(Math.round(exponent * 1e8) / 1e8 + 0)},`
  return key
}

const kindOf = new Map<string, KindName>()
for (const [name, { dimension }] of QUANTITY_KINDS) {
  const key = dimensionKey(dimension)
  if (!kindOf.has(key)) kindOf.set(key, name)
}

/** The kind that stands for a dimension, when there is one. */
export function kindOfDimension(dimension: Dimension): KindName | undefined {
  return kindOf.get(dimensionKey(dimension))
}

/** The one name of a dimension in the record: 'force', 'stress', '1' when dimensionless, else SI base units, `kg·m/s²`. */
export function dimensionName(dimension: Dimension): string {
  return isDimensionless(dimension) ? '1' : (kindOfDimension(dimension) ?? baseUnits(dimension))
}

/** For messages: 'a length', 'a number without unit', 'a quantity in kg/s'. */
export function withArticle(dimension: Dimension): string {
  const name = kindOfDimension(dimension)
  return name === undefined ? `a quantity in ${baseUnits(dimension)}` : KINDS[name].words
}

const BASE_UNITS = ['kg', 'm', 's', 'K'] as const

function baseUnits(dimension: Dimension): string {
  const power = (sign: 1 | -1) =>
    BASE_UNITS.flatMap((unit, i) => {
      const exponent = (dimension[i] ?? 0) * sign
      return exponent > 1e-9 ? [unit + raisedExponent(exponent)] : []
    })
  const [over, under] = [power(1), power(-1)]
  if (under.length === 0) return over.join('·')
  const bottom = under.length === 1 ? under.join('') : `(${under.join('·')})`
  return `${over.length === 0 ? '1' : over.join('·')}/${bottom}`
}
