import type { KindName } from './kinds.ts'

/**
 * The units one kind is shown in, from small to large: each with the size, in that unit, from which it is used.
 * Zero is shown in `usual`.
 */
export interface DisplayUnits {
  readonly usual: string
  readonly rungs: readonly (readonly [unit: string, from: number])[]
}

const always = (unit: string): DisplayUnits => ({ usual: unit, rungs: [[unit, 0]] })

const bySize = (usual: string, ...rungs: readonly (readonly [string, number])[]): DisplayUnits => ({
  usual,
  rungs,
})

type DisplayTable = Readonly<Partial<Record<KindName, DisplayUnits>>>

/**
 * What European and British calculations use; N/mm² for stress as in EN 1993-1-1, cm for section properties as in the tables
 * of EN 10365 sections. The sizes at which a unit changes are common practice.
 */
const METRIC: DisplayTable = {
  angle: always('rad'),
  length: bySize('m', ['mm', 0], ['m', 1]),
  area: bySize('mm^2', ['mm^2', 0], ['m^2', 0.1]),
  'section-modulus': bySize('cm^3', ['mm^3', 0], ['cm^3', 0.1], ['m^3', 0.1]),
  volume: bySize('m^3', ['cm^3', 0], ['m^3', 0.001]),
  'second-moment': bySize('cm^4', ['mm^4', 0], ['cm^4', 0.1], ['m^4', 0.1]),
  'torsion-constant': bySize('cm^4', ['mm^4', 0], ['cm^4', 0.1], ['m^4', 0.1]),
  'warping-constant': bySize('cm^6', ['cm^6', 0], ['dm^6', 1]),
  curvature: always('1/m'),
  force: bySize('kN', ['N', 0], ['kN', 0.1], ['MN', 100]),
  'axial-rigidity': bySize('kN', ['N', 0], ['kN', 0.1], ['MN', 100]),
  stress: bySize('N/mm^2', ['kN/m^2', 0], ['N/mm^2', 1]),
  pressure: always('kN/m^2'),
  'foundation-modulus': always('kN/m^2'),
  moment: bySize('kN*m', ['N*m', 0], ['kN*m', 0.1], ['MN*m', 100]),
  'rotational-stiffness': bySize('kN*m/rad', ['N*m/rad', 0], ['kN*m/rad', 0.1], ['MN*m/rad', 100]),
  energy: bySize('kN*m', ['N*m', 0], ['kN*m', 0.1]),
  'line-load': bySize('kN/m', ['N/m', 0], ['kN/m', 0.1], ['MN/m', 100]),
  stiffness: bySize('kN/m', ['N/m', 0], ['kN/m', 0.1], ['MN/m', 100]),
  'unit-weight': always('kN/m^3'),
  'flexural-rigidity': bySize('kN*m^2', ['N*m^2', 0], ['kN*m^2', 0.1], ['MN*m^2', 100]),
  'torsional-rigidity': bySize('kN*m^2', ['N*m^2', 0], ['kN*m^2', 0.1], ['MN*m^2', 100]),
  'warping-rigidity': bySize('kN*m^4', ['N*m^4', 0], ['kN*m^4', 0.1]),
  mass: bySize('kg', ['kg', 0], ['t', 10]),
  'mass-per-length': always('kg/m'),
  'mass-per-area': always('kg/m^2'),
  density: always('kg/m^3'),
  time: bySize('s', ['ms', 0], ['s', 0.1]),
  frequency: always('Hz'),
  speed: always('m/s'),
  acceleration: always('m/s^2'),
  'temperature-difference': always('K'),
  'thermal-expansion': always('1/K'),
}

/** What calculations in the United States use: kip, inch and foot. The sizes at which a unit changes are common practice. */
const US: DisplayTable = {
  angle: always('rad'),
  length: bySize('in', ['in', 0], ['ft', 5]),
  area: bySize('in^2', ['in^2', 0], ['ft^2', 10]),
  'section-modulus': always('in^3'),
  volume: bySize('ft^3', ['in^3', 0], ['ft^3', 0.1]),
  'second-moment': always('in^4'),
  'torsion-constant': always('in^4'),
  'warping-constant': always('in^6'),
  curvature: always('1/in'),
  force: bySize('kip', ['lbf', 0], ['kip', 1]),
  'axial-rigidity': always('kip'),
  stress: bySize('ksi', ['psf', 0], ['psi', 10], ['ksi', 1]),
  pressure: always('psf'),
  'foundation-modulus': bySize('ksi', ['psi', 0], ['ksi', 1]),
  moment: bySize('kip*ft', ['lbf*ft', 0], ['kip*ft', 1]),
  'rotational-stiffness': bySize('kip*ft/rad', ['lbf*ft/rad', 0], ['kip*ft/rad', 1]),
  energy: bySize('kip*ft', ['lbf*ft', 0], ['kip*ft', 1]),
  'line-load': bySize('kip/ft', ['lbf/ft', 0], ['kip/ft', 1]),
  stiffness: bySize('kip/in', ['lbf/in', 0], ['kip/in', 1]),
  'unit-weight': always('lbf/ft^3'),
  'flexural-rigidity': always('kip*in^2'),
  'torsional-rigidity': always('kip*in^2'),
  'warping-rigidity': always('kip*in^4'),
  mass: always('lb'),
  'mass-per-length': always('lb/ft'),
  'mass-per-area': always('lb/ft^2'),
  density: always('lb/ft^3'),
  time: bySize('s', ['ms', 0], ['s', 0.1]),
  frequency: always('Hz'),
  speed: always('ft/s'),
  acceleration: always('ft/s^2'),
  'temperature-difference': always('K'),
  'thermal-expansion': always('1/K'),
}

/** Units from which the unit of a quantity of no named kind is put together. */
export interface BuildingUnits {
  readonly force: string
  readonly length: string
  readonly mass: string
}

export const DISPLAY_UNITS: Readonly<Record<'metric' | 'us', { kinds: DisplayTable; parts: BuildingUnits }>> =
  {
    metric: { kinds: METRIC, parts: { force: 'kN', length: 'm', mass: 'kg' } },
    us: { kinds: US, parts: { force: 'kip', length: 'in', mass: 'lb' } },
  }
