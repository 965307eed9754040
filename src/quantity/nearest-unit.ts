import { sameDimension } from './dimension.ts'
import { UNITS } from './unit-table.ts'

/** Spellings people use, with the unit of the table that is most likely meant. */
const SPELLINGS: Readonly<Record<string, string>> = Object.assign(Object.create(null) as object, {
  metre: 'm',
  meter: 'm',
  kilometre: 'km',
  kilometer: 'km',
  centimetre: 'cm',
  centimeter: 'cm',
  millimetre: 'mm',
  millimeter: 'mm',
  micron: 'um',
  micrometre: 'um',
  micrometer: 'um',
  foot: 'ft',
  feet: 'ft',
  inches: 'in',
  yard: 'yd',
  kilogram: 'kg',
  kilo: 'kg',
  kgs: 'kg',
  gram: 'g',
  tonne: 't',
  pound: 'lbf',
  pounds: 'lbf',
  lbs: 'lbf',
  lbm: 'lb',
  radian: 'rad',
  degree: 'deg',
  degs: 'deg',
  second: 's',
  sec: 's',
  secs: 's',
  minute: 'min',
  hour: 'h',
  hr: 'h',
  hrs: 'h',
  hertz: 'Hz',
  newton: 'N',
  kilonewton: 'kN',
  meganewton: 'MN',
  kp: 'kgf',
  k: 'kip',
  pascal: 'Pa',
  megapascal: 'MPa',
  kilopascal: 'kPa',
  gigapascal: 'GPa',
  pli: 'plf',
  joule: 'J',
  kelvin: 'K',
} satisfies Record<string, string>)

const LONGEST = 24

/**
 * The unit, as it should be typed, that `name` is most likely a slip for: a slip of case (`Mpa`, `KN`), a word (`inches`),
 * a power or product without its sign (`cm4`, `kNm`), or one letter too many, too few, wrong or swapped in a name of three
 * letters or more. Undefined when nothing is near.
 */
export function nearestUnit(name: string): string | undefined {
  if (UNITS[name] !== undefined) return name
  if (name.length > LONGEST) return undefined
  return (
    sameButCase(name) ?? spelledOut(name) ?? powerWithoutSign(name) ?? runTogether(name) ?? oneLetterOff(name)
  )
}

function powerWithoutSign(name: string): string | undefined {
  const [, base, power] = /^(\D+)(\d)$/.exec(name) ?? []
  if (base === undefined || power === undefined) return undefined
  const near = sameButCase(base) ?? spelledOut(base)
  return near === undefined ? undefined : `${near}^${power}`
}

/** `kNm` as `kN*m`: two units of unlike dimension written without a sign. */
function runTogether(name: string): string | undefined {
  for (let cut = name.length - 1; cut > 0; cut--) {
    const [first, second] = [name.slice(0, cut), name.slice(cut)]
    const [a, b] = [UNITS[first], UNITS[second]]
    if (a !== undefined && b !== undefined && !sameDimension(a.dimension, b.dimension))
      return `${first}*${second}`
  }
  return undefined
}

function sameButCase(name: string): string | undefined {
  const lower = name.toLowerCase()
  return Object.keys(UNITS).find((unit) => unit.toLowerCase() === lower)
}

function spelledOut(name: string): string | undefined {
  const lower = name.toLowerCase()
  const singular = lower.endsWith('s') ? lower.slice(0, -1) : lower
  return SPELLINGS[lower] ?? SPELLINGS[singular] ?? (singular === lower ? undefined : sameButCase(singular))
}

function oneLetterOff(name: string): string | undefined {
  if (name.length < 3 || name.length > 8) return undefined
  const lower = name.toLowerCase()
  return Object.keys(UNITS).find((unit) => unit.length >= 2 && isOneEdit(lower, unit.toLowerCase()))
}

/** Whether one insertion, deletion, replacement or swap of neighbours turns `a` into `b`. */
function isOneEdit(a: string, b: string): boolean {
  if (Math.abs(a.length - b.length) > 1) return false
  let start = 0
  while (start < a.length && a[start] === b[start]) start++
  const [restA, restB] = [a.slice(start), b.slice(start)]
  if (a.length > b.length) return restA.slice(1) === restB
  if (a.length < b.length) return restA === restB.slice(1)
  const swapped = restA.slice(1, 2) + restA.slice(0, 1) + restA.slice(2)
  return restA.slice(1) === restB.slice(1) || swapped === restB
}
