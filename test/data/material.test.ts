import { describe, expect, it } from 'vitest'
import { findMaterial, materialGrades, type MaterialRow } from '../../src/data/material.ts'

function material(grade: string, thickness?: number): MaterialRow {
  const found = findMaterial(grade, thickness)
  if (!('ok' in found)) throw new Error(found.problem)
  return found.ok
}

const si = (row: MaterialRow) =>
  Object.fromEntries(Object.entries(row.fields).map(([symbol, field]) => [symbol, field.si]))

/** 1 ksi = 1000 lbf/in², lbf = 0.45359237 kg × 9.80665 m/s², in = 0.0254 m, all exact (NIST SP 811, appendix B). */
const KSI = (1000 * 0.45359237 * 9.80665) / 0.0254 ** 2

describe('findMaterial', () => {
  it('gives the thinnest band without a thickness, and says up to where it holds', () => {
    const row = material('S355')
    expect(si(row)).toEqual({ f_y: 355e6, f_u: 470e6, E: 210e9, G: 81e9, nu: 0.3, t_max: 0.016 })
    expect(row.source).toBe(
      'EN 10025-2, hot-rolled non-alloy, materials-en.csv; for 0 mm < t ≤ 16 mm, the thinnest band, as no thickness is given; ' +
        'f_u is the lower end of 470 to 630 MPa; row from EN 10025-2',
    )
  })

  it('chooses the band by the thickness, its upper limit included (EN 10025-2, Table 7)', () => {
    const yields = [0.001, 0.016, 0.0161, 0.04, 0.05, 0.063, 0.08, 0.1, 0.15, 0.2, 0.25].map(
      (t) => si(material('S355', t))['f_y'],
    )
    expect(yields).toEqual([355, 355, 345, 345, 335, 335, 325, 315, 295, 285, 275].map((f) => f * 1e6))
  })

  it('leaves out a strength that the table does not give', () => {
    expect(Object.keys(material('S355', 0.12).fields)).not.toContain('f_u')
  })

  it('refuses a thickness outside the table and says what the table covers', () => {
    const problem = 'S355 (EN 10025-2) is tabulated for 0 mm < t ≤ 250 mm; the thickness is 300 mm'
    expect(findMaterial('S355', 0.3)).toEqual({ problem, suggestions: [] })
    for (const thickness of [0, -0.01, NaN, Infinity])
      expect(findMaterial('S355', thickness)).toHaveProperty('problem')
  })

  it('gives US grades their exact US values', () => {
    const a992 = si(material('A992'))
    const inKsi = [a992['F_y'], a992['F_u'], a992['E'], a992['G']].map((value) => (value ?? NaN) / KSI)
    for (const [i, expected] of [50, 65, 29000, 11200].entries()) expect(inKsi[i]).toBeCloseTo(expected, 8)
    expect(Object.keys(a992)).not.toContain('t_max')
    expect((si(material('A53 Gr B'))['F_y'] ?? NaN) / KSI).toBeCloseTo(35, 8)
    expect((si(material('a500 gr. c'.replace('.', '')))['F_u'] ?? NaN) / KSI).toBeCloseTo(62, 8)
  })

  it('gives aluminium its own symbol for the characteristic strength', () => {
    expect(si(material('6082-T6', 0.01))).toEqual({
      f_o: 260e6,
      f_u: 310e6,
      E: 70e9,
      G: 27e9,
      nu: 0.3,
      t_max: 0.015,
    })
  })

  it('reads a quality and a standard after the grade', () => {
    expect(material('S355J2').designation).toBe('S355')
    expect(material('S460NL').designation).toBe('S460N')
    expect(material('S355 EN 1993-1-1').standard).toBe('EN 1993-1-1:2005 Table 3.1')
    expect(si(material('S355 EN 1993-1-1'))['f_u']).toBe(490e6)
    expect(material('S355H EN 10219-1').source).toContain('buckling curve c')
  })

  it('does not choose between standards with different values', () => {
    expect(findMaterial('S355H')).toEqual({
      problem: '`S355H` stands in 2 standards with different values',
      suggestions: ['S355H EN 10210-1', 'S355H EN 10219-1'],
    })
  })

  it('names the nearest grades when there is no such grade, and carries no timber', () => {
    expect(findMaterial('S350')).toMatchObject({
      problem: 'no material `S350` in the tables',
      suggestions: ['S355', 'S275', expect.any(String)],
    })
    expect(findMaterial('C24')).toMatchObject({
      problem: expect.stringContaining('is a timber grade') as string,
      suggestions: [],
    })
    expect(findMaterial('')).toHaveProperty('problem')
    expect(findMaterial('constructor')).toHaveProperty('problem')
  })

  it('finds every grade it lists, with strengths that make sense for a metal', () => {
    for (const grade of materialGrades()) {
      const row = material(grade)
      const { E = NaN, G = NaN, nu = NaN } = si(row)
      const strength = row.fields['f_y'] ?? row.fields['F_y'] ?? row.fields['f_o']
      expect([grade, strength !== undefined && strength.si > 100e6 && strength.si < 800e6]).toEqual([
        grade,
        true,
      ])
      // G = E / (2(1 + nu)) within the rounding of the printed constants (elasticity of an isotropic material)
      expect([grade, Math.abs((2 * G * (1 + nu)) / E - 1) < 0.01]).toEqual([grade, true])
      expect(row.source).toContain(row.standard)
    }
  })
})
