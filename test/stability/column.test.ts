import { readFileSync } from 'node:fs'
import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import { columnCriticalLoad, columnEffectiveLength } from '../../src/stability/column/column.ts'
import { END_CONDITIONS, type Column, type End, type Restraint } from '../../src/stability/column/ends.ts'
import { columnModeShape } from '../../src/stability/column/mode-shape.ts'
import { countBelow } from '../../src/stability/column/exact.ts'
import { eulerLoad } from '../../src/stability/euler.ts'
import { StabilityError } from '../../src/stability/result.ts'

/* Published values, each with its source in the file; and transcendental equations solved by mpmath (recompute-stability.py). */

interface Case {
  id: string
  statement: string
  given: Record<string, { value: number }>
  target: number
  rel_tol: number
  printed?: string
}
const read = (name: string): unknown =>
  JSON.parse(readFileSync(new URL(`../published/${name}`, import.meta.url), 'utf8'))
const published = read('columns.json') as Case[]

const unit = (base: End, top: End): Column => ({ L: 1, EI: 1, base, top })
const { pinned, fixed, free, guided } = END_CONDITIONS
const turning = (rotation: Restraint): End => ({ rotation, translation: 'fixed' })
const swaying = (translation: Restraint): End => ({ rotation: 'free', translation })
const ENDS: Readonly<Record<string, Column>> = {
  ff: unit(fixed, fixed),
  fp: unit(fixed, pinned),
  fg: unit(fixed, guided),
  pp: unit(pinned, pinned),
  fr: unit(fixed, free),
  pg: unit(pinned, guided),
}

function calculated({ id, given }: Case): number {
  const spring = given['alpha*L/EI']?.value ?? given['beta*L^3/EI']?.value ?? NaN
  const load = (column: Column, n = 1) => columnCriticalLoad(column, n).value
  if (id.startsWith('euler-k-')) return columnEffectiveLength(ENDS[id.slice(-2)] as Column).value
  if (id.startsWith('rotspring-equal')) return load(unit(turning(spring), turning(spring)))
  if (id.startsWith('rotspring-one')) return load(unit(turning(spring), pinned))
  if (id.startsWith('rotspring-cantilever')) return load(unit(turning(spring), free))
  if (id.startsWith('topspring-fixedbase')) return load(unit(fixed, swaying(spring)))
  switch (id) {
    case 'euler-load-multiplier-fp':
      return load(ENDS['fp'] as Column) / Math.PI ** 2
    case 'euler-fp-kl':
      return Math.sqrt(load(ENDS['fp'] as Column))
    case 'euler-fp-load':
      return load(ENDS['fp'] as Column)
    case 'euler-pp-sway-mode-2':
      return load(ENDS['pp'] as Column, 2)
    case 'gere-11-4-10-inertia': {
      // I in mm⁴ for n·P = critical load of the cantilever; the load is proportional to I.
      const { Pallow, n, E, L } = given as Record<'Pallow' | 'n' | 'E' | 'L', { value: number }>
      const perInertia = columnCriticalLoad({ L: L.value, EI: E.value * 1e9, base: fixed, top: free }).value
      return ((n.value * Pallow.value * 1e3) / perInertia) * 1e12
    }
    default:
      throw new Error(`no calculation for ${id}`)
  }
}

describe('uniform columns against published values', () => {
  test.each(published.map((one) => [one.id, one.statement, one] as const))(
    '%s: %s',
    (_id, _statement, one) => {
      const value = calculated(one)
      expect(Math.abs(value / one.target - 1)).toBeLessThan(Math.max(one.rel_tol, 1e-11))
      const printed = Number(one.printed)
      if (one.printed !== undefined && Number.isFinite(printed)) {
        const decimals = /\.(\d+)/.exec(one.printed)?.[1]?.length ?? 0
        const exponent = Number(/e(\d+)/.exec(one.printed)?.[1] ?? 0)
        // Half a unit of the last printed digit; "0.7" for 0.699 is the usual rounding.
        expect(Math.abs(value - printed)).toBeLessThanOrEqual(0.5001 * 10 ** (exponent - decimals))
      }
    },
  )

  test('every published case of the file is calculated', () => expect(published.length).toBeGreaterThan(30))
})

interface Solved {
  base_rotation: string
  base_translation: string
  top_rotation: string
  top_translation: string
  n: number
  load: number
  mode?: number[]
}
const recomputed = read('stability-recomputed.json') as {
  springs: Solved[]
  extremes: Solved[]
  high: { ends: string; n: number; load: number }[]
}
const restraint = (text: string): Restraint => (text === 'fixed' || text === 'free' ? text : Number(text))
const columnOf = (s: Solved): Column =>
  unit(
    { rotation: restraint(s.base_rotation), translation: restraint(s.base_translation) },
    { rotation: restraint(s.top_rotation), translation: restraint(s.top_translation) },
  )

describe('columns against transcendental equations solved by mpmath', () => {
  test('random end springs over ten orders of magnitude, modes 1 to 4, to 1e-13', () => {
    expect(recomputed.springs.length).toBeGreaterThan(100)
    for (const s of recomputed.springs)
      expect(Math.abs(columnCriticalLoad(columnOf(s), s.n).value / s.load - 1)).toBeLessThan(1e-13)
  })

  test('springs over twenty orders of magnitude keep all digits, by both routes', () => {
    expect(recomputed.extremes.length).toBeGreaterThan(60)
    for (const s of recomputed.extremes) {
      const { value, second } = columnCriticalLoad(columnOf(s), s.n)
      expect(Math.abs(value / s.load - 1)).toBeLessThan(1e-13)
      expect(Math.abs(second.value / s.load - 1)).toBeLessThan(1e-10)
    }
  })

  test('high modes of columns with fixed ends', () => {
    for (const { ends, n, load } of recomputed.high) {
      const column = unit(fixed, ends === 'fixed_fixed' ? fixed : pinned)
      expect(Math.abs(columnCriticalLoad(column, n).value / load - 1)).toBeLessThan(1e-13)
    }
  })

  test('mode shapes at the quarter points, to 1e-12 of the largest', () => {
    for (const s of recomputed.extremes) {
      const { deflection } = columnModeShape(columnOf(s), s.n)
      const at = [0, 0.25, 0.5, 0.75, 1].map(deflection)
      const largest = Math.max(...at.map(Math.abs))
      // The sign of a mode is free where two deflections are equally large.
      const off = (sign: number) =>
        Math.max(
          ...at.map((value, i) => Math.abs(value / largest - sign * ((s.mode as number[])[i] as number))),
        )
      expect(Math.min(off(1), off(-1))).toBeLessThan(1e-12)
    }
  })
})

describe('mode shapes', () => {
  test.each([
    ['pinned ends', unit(pinned, pinned), 3, (s: number) => Math.sin(3 * Math.PI * s)],
    ['a cantilever', unit(fixed, free), 1, (s: number) => 1 - Math.cos((Math.PI * s) / 2)],
    ['fixed ends', unit(fixed, fixed), 1, (s: number) => (1 - Math.cos(2 * Math.PI * s)) / 2],
  ] as const)('%s (Timoshenko and Gere, Art. 2.1)', (_name, column, n, exact) => {
    const { deflection } = columnModeShape(column, n)
    for (let i = 0; i <= 50; i++) expect(Math.abs(deflection(i / 50) - exact(i / 50))).toBeLessThan(1e-12)
  })

  test('the largest deflection is one, whatever the length', () => {
    const { deflection } = columnModeShape({ L: 7, EI: 3e6, base: turning(1e5), top: pinned }, 2)
    const all = Array.from({ length: 2001 }, (_, i) => deflection((7 * i) / 2000))
    expect(Math.max(...all.map(Math.abs))).toBeCloseTo(1, 5)
    expect(Math.max(...all)).toBeGreaterThan(0.999)
    expect(() => deflection(7.1)).toThrow(RangeError)
  })

  test('modes that share a load have no shape of their own', () => {
    // Translational springs alone: the sway of pinned ends, P = k L/2, meets the bow, P = π² EI/L².
    const both = unit(swaying(2 * Math.PI ** 2), swaying(2 * Math.PI ** 2))
    expect(columnCriticalLoad(both, 1).value / columnCriticalLoad(both, 2).value).toBeCloseTo(1, 12)
    expect(() => columnModeShape(both)).toThrow(/2 modes share the critical load number 1/)
  })
})

describe('laws of columns', () => {
  const spring: fc.Arbitrary<Restraint> = fc.oneof(
    fc.constant<Restraint>('fixed'),
    fc.constant<Restraint>('free'),
    fc.double({ min: -6, max: 6, noNaN: true }).map((p) => 10 ** p),
  )
  const end = fc.record({ rotation: spring, translation: spring })
  const held = fc.tuple(end, end).filter(([base, top]) => {
    try {
      columnCriticalLoad(unit(base, top))
      return true
    } catch (error) {
      if (error instanceof StabilityError) return false
      throw error
    }
  })
  const load = (base: End, top: End, n = 1) => columnCriticalLoad(unit(base, top), n).value

  test('the two routes agree', () => {
    fc.assert(
      fc.property(held, fc.integer({ min: 1, max: 5 }), ([base, top], n) => {
        const { second } = columnCriticalLoad(unit(base, top), n)
        expect(second.difference).toBeLessThanOrEqual(second.allowed)
      }),
      { numRuns: 200 },
    )
  })

  test('base and top may be exchanged', () => {
    fc.assert(
      fc.property(held, ([base, top]) => {
        expect(load(top, base) / load(base, top)).toBeCloseTo(1, 9)
      }),
      { numRuns: 60 },
    )
  })

  test('loads grow with EI and fall with the square of the length', () => {
    fc.assert(
      fc.property(
        held,
        fc.double({ min: 0.1, max: 50, noNaN: true }),
        fc.double({ min: 1, max: 1e9, noNaN: true }),
        ([base, top], L, EI) => {
          const scaled = (e: End): End => ({
            rotation: typeof e.rotation === 'number' ? (e.rotation * EI) / L : e.rotation,
            translation: typeof e.translation === 'number' ? (e.translation * EI) / L ** 3 : e.translation,
          })
          const value = columnCriticalLoad({ L, EI, base: scaled(base), top: scaled(top) }).value
          expect((value * L * L) / EI / load(base, top)).toBeCloseTo(1, 9)
        },
      ),
      { numRuns: 60 },
    )
  })

  test('more restraint never lowers a critical load', () => {
    const stiffer = (r: Restraint): Restraint => (r === 'free' ? 0.5 : r === 'fixed' ? 'fixed' : r * 3)
    fc.assert(
      fc.property(held, fc.integer({ min: 1, max: 3 }), ([base, top], n) => {
        const more = { rotation: stiffer(base.rotation), translation: stiffer(base.translation) }
        expect(load(more, top, n)).toBeGreaterThanOrEqual(load(base, top, n) * (1 - 1e-10))
      }),
      { numRuns: 60 },
    )
  })

  test('the n-th load is the n-th: one fewer lies below it, and none is skipped', () => {
    fc.assert(
      fc.property(held, fc.integer({ min: 1, max: 6 }), ([base, top], n) => {
        const column = unit(base, top)
        const h = Math.sqrt(columnCriticalLoad(column, n).value) / 2
        expect(countBelow(column, h * (1 - 1e-9))).toBeLessThanOrEqual(n - 1)
        expect(countBelow(column, h * (1 + 1e-9))).toBeGreaterThanOrEqual(n)
      }),
      { numRuns: 100 },
    )
  })

  test('a very stiff spring is a fixing and a very weak one is none', () => {
    const stiff: End = { rotation: 1e9, translation: 1e9 }
    expect(load(stiff, stiff) / load(fixed, fixed)).toBeCloseTo(1, 7)
    expect(load({ rotation: 1e-9, translation: 'fixed' }, pinned) / load(pinned, pinned)).toBeCloseTo(1, 8)
  })
})

describe('what is refused', () => {
  test.each([
    ['both ends free to sway', unit(guided, guided), /nothing holds the column sideways/],
    ['pinned and free', unit(pinned, free), /mechanism: it can turn about its base/],
    ['free and pinned', unit(free, pinned), /mechanism: it can turn about its top/],
    ['no length', { ...unit(pinned, pinned), L: 0 }, /length of the column is 0/],
    ['a negative rigidity', { ...unit(pinned, pinned), EI: -1 }, /flexural rigidity is -1/],
    ['no number', { ...unit(pinned, pinned), L: NaN }, /length of the column is NaN/],
    ['a negative spring', unit(turning(-1), pinned), /rotational stiffness at the base is -1/],
    ['an infinite spring', unit(turning(Infinity), pinned), /rotational stiffness at the base is Infinity/],
  ])('%s', (_name, column, message) => {
    expect(() => columnCriticalLoad(column)).toThrow(StabilityError)
    expect(() => columnCriticalLoad(column)).toThrow(message)
  })

  test('a mode that is no whole number, or too high', () => {
    for (const n of [0, 1.5, -1, 21, NaN])
      expect(() => columnCriticalLoad(unit(pinned, pinned), n)).toThrow(StabilityError)
  })

  test('Euler’s load for impossible data', () => {
    expect(() => eulerLoad(210e9, 0, 4)).toThrow(/second moment of area is 0/)
    expect(eulerLoad(210e9, 589e-8, 4.6) / ((Math.PI ** 2 * 210e9 * 589e-8) / 4.6 ** 2)).toBe(1)
  })
})
