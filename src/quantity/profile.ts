import type { UnitProfile } from '../sheet/types.ts'
import { isDimensionless, sameDimension, type Dimension } from './dimension.ts'
import { DISPLAY_UNITS, type BuildingUnits, type DisplayUnits } from './display-units.ts'
import { dimensionKey, isKind, kindOfDimension, KINDS, withArticle, type KindName } from './kinds.ts'
import { nearestName } from './nearest-name.ts'
import { isUnitProblem, NO_UNIT, parseUnit, toSi, unitFactor, type UnitExpression } from './units.ts'

/** A choice of units, ready for use. Made by `resolveProfile`. */
export interface Profile {
  readonly name: 'metric' | 'us' | 'own'
  readonly base: 'metric' | 'us'
  readonly ladders: ReadonlyMap<KindName, Ladder>
  /** Ladders of dimensions, filled as they are met. */
  readonly met: Map<string, Ladder>
}

/** Units by size: `units[i]` serves from the SI magnitude `from[i]`, ascending; zero takes `usual`. */
interface Ladder {
  readonly usual: UnitExpression
  readonly units: readonly UnitExpression[]
  readonly from: readonly number[]
}

/** Why `units` in the front matter cannot be followed, and under which of its keys. */
export interface ProfileProblem {
  readonly problem: string
  readonly suggestion?: string
  readonly key?: string
}

/** A value that misses a change of unit by no more than this, relatively, counts as there: 0.999…9 m is 1 m, not 1000 mm. */
const AT_RUNG = 1e-12

export function isProfileProblem(result: Profile | ProfileProblem): result is ProfileProblem {
  return 'problem' in result
}

/**
 * The profile that a sheet's `units` asks for: `metric` (also when nothing is asked), `us`, or a map of kind to unit laid over
 * the profile under its key `base`. A map's unit serves every size of its kind, and every quantity of its dimension when
 * the kind is the one that stands for that dimension.
 */
export function resolveProfile(asked: UnitProfile | undefined): Profile | ProfileProblem {
  if (asked === undefined || asked === 'metric') return METRIC
  if (asked === 'us') return US
  if (typeof asked === 'string') return unknownProfile(asked)
  const { base: baseName = 'metric', ...map } = asked
  if (baseName !== 'metric' && baseName !== 'us') return { ...unknownProfile(baseName), key: 'base' }
  const base = baseName === 'us' ? US : METRIC
  const ladders = new Map(base.ladders)
  for (const [kind, text] of Object.entries(map)) {
    const ladder = ownLadder(kind, text)
    if ('problem' in ladder) return { ...ladder, key: kind }
    ladders.set(kind as KindName, ladder)
  }
  return { name: 'own', base: baseName, ladders, met: new Map() }
}

function unknownProfile(name: string): ProfileProblem {
  return {
    problem: `there is no unit profile \`${name}\``,
    suggestion: 'write `metric`, `us`, or a map of kind to unit such as `{base: metric, length: mm}`',
  }
}

function ownLadder(kind: string, text: string): Ladder | ProfileProblem {
  if (!isKind(kind)) return unknownKind(kind)
  const { dimension, words } = KINDS[kind] as { dimension?: Dimension; words: string }
  if (dimension === undefined)
    return { problem: `${words} has no unit, but \`${kind}\` gives it one`, suggestion: LEAVE_OUT }
  if (kind === 'number')
    return { problem: `${words} cannot be given one, as \`${kind}\` does`, suggestion: LEAVE_OUT }
  const unit = parseUnit(text)
  if (isUnitProblem(unit)) return unit
  const given = unitFactor(unit).dimension
  const example = `give it a unit as \`${kind}: ${DISPLAY_UNITS.metric.kinds[kind]?.usual ?? ''}\``
  if (!sameDimension(given, dimension)) {
    return {
      problem: `\`${kind}: ${text}\` gives ${words} the unit of ${withArticle(given)}`,
      suggestion: example,
    }
  }
  if (kind === 'moment' && unit.some((part) => part.unit === 'J' || part.unit === 'kJ')) {
    return { problem: `\`moment: ${text}\` would show a moment as energy`, suggestion: example }
  }
  return single(unit)
}

const LEAVE_OUT = 'leave the line out'

function unknownKind(kind: string): ProfileProblem {
  const near = nearestName(kind, [...METRIC.ladders.keys()])
  const problem = `there is no kind of quantity \`${kind}\``
  return {
    problem,
    suggestion:
      near === undefined ? '`stanchion explain units` lists the kinds' : `did you mean \`${near}\`?`,
  }
}

/**
 * The unit a quantity is shown in, by its kind when that is known and fits, else by its dimension, and by its size.
 * A plain number has none.
 */
export function displayUnit(
  quantity: { readonly si: number; readonly dimension: Dimension },
  profile: Profile,
  kind?: string,
): UnitExpression {
  const { units, from, usual } = ladderFor(quantity.dimension, profile, kind)
  if (quantity.si === 0) return usual
  const size = Math.abs(quantity.si)
  let chosen = units[0] ?? NO_UNIT
  for (let i = 1; i < units.length && size >= (from[i] ?? Infinity); i++) chosen = units[i] ?? chosen
  return chosen
}

function ladderFor(dimension: Dimension, profile: Profile, kind: string | undefined): Ladder {
  if (kind !== undefined && isKind(kind)) {
    const { dimension: expected } = KINDS[kind] as { dimension?: Dimension }
    const ladder = profile.ladders.get(kind)
    if (ladder !== undefined && expected !== undefined && sameDimension(expected, dimension)) return ladder
  }
  const key = dimensionKey(dimension)
  let ladder = profile.met.get(key)
  if (ladder === undefined) profile.met.set(key, (ladder = ladderOfDimension(dimension, profile)))
  return ladder
}

function ladderOfDimension(dimension: Dimension, profile: Profile): Ladder {
  if (isDimensionless(dimension)) return single(NO_UNIT)
  const kind = kindOfDimension(dimension)
  const ladder = kind === undefined ? undefined : profile.ladders.get(kind)
  return ladder ?? single(composed(dimension, DISPLAY_UNITS[profile.base].parts))
}

/** A unit for a dimension of no named kind: in force and length where it can be (√E: kN^(1/2)/m), else in mass, length, time. */
function composed(dimension: Dimension, parts: BuildingUnits): UnitExpression {
  const [mass, length, time, temperature] = dimension
  const isForce = mass !== 0 && Math.abs(time + 2 * mass) < 1e-9
  const powers = isForce
    ? [
        { unit: parts.force, exponent: mass },
        { unit: parts.length, exponent: length - mass },
      ]
    : [
        { unit: parts.mass, exponent: mass },
        { unit: parts.length, exponent: length },
        { unit: 's', exponent: time },
      ]
  return [...powers, { unit: 'K', exponent: temperature }].filter((power) => Math.abs(power.exponent) > 1e-9)
}

function single(unit: UnitExpression): Ladder {
  return { usual: unit, units: [unit], from: [0] }
}

function standard(name: 'metric' | 'us'): Profile {
  const rows = Object.entries(DISPLAY_UNITS[name].kinds) as [KindName, DisplayUnits][]
  return {
    name,
    base: name,
    ladders: new Map(rows.map(([kind, row]) => [kind, ladder(row)])),
    met: new Map(),
  }
}

function ladder({ usual, rungs }: DisplayUnits): Ladder {
  const units = rungs.map(([unit]) => unitOfTable(unit))
  return {
    usual: units[rungs.findIndex(([unit]) => unit === usual)] ?? unitOfTable(usual),
    units,
    from: rungs.map(([, from], i) => toSi(from, units[i] ?? NO_UNIT) * (1 - AT_RUNG)),
  }
}

function unitOfTable(text: string): UnitExpression {
  const unit = parseUnit(text)
  if (isUnitProblem(unit)) throw new Error(`display units: ${unit.problem}`)
  return unit
}

const METRIC = standard('metric')
const US = standard('us')
