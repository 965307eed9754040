import { readFileSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { expectWithin, problems, results, useMethod } from './use-method.ts'

/** Values from outside, each with its source in the file. */
const read = (name: string): unknown =>
  JSON.parse(readFileSync(new URL(`../published/${name}`, import.meta.url), 'utf8'))

interface Curves {
  chi: { lambda_bar: string; curve: string; chi: number }[]
  nominal_stress: { slenderness: string; F_y: string; F_n: number }[]
}

interface Tables {
  reductionFactor: { values: { curve: string; lambda_bar: string; chi: string; tolerance: number }[] }
  criticalStress: {
    values: { format: string; slenderness: string; F_y: string; stress: string; tolerance: number }[]
  }
}

const curves = read('column-curves.json') as Curves
const tables = read('column-tables.json') as Tables

function chi(curve: string, slenderness: string | number): number {
  const bindings = {
    A: '1000 mm^2',
    f_y: '235 MPa',
    N_cr: `(235 kN)/(${slenderness})^2`,
    curve: `"${curve}"`,
  }
  const prepared = useMethod('en1993-1-1-2005/6.3.1', bindings, ['m.chi'])
  expect(problems(prepared)).toEqual([])
  return results(prepared, ['m.chi'])[0] ?? NaN
}

function column(slenderness: string | number, F_y: string | number, format = 'LRFD') {
  const bindings = {
    shape: '"I"',
    A_g: '1 in^2',
    F_y: `${F_y} ksi`,
    E: '29000 ksi',
    r_x: '1 in',
    r_y: '1 in',
    L_cx: `${slenderness} in`,
    L_cy: `${slenderness} in`,
    L_cz: `${slenderness} in`,
    lambda_f: 5,
    lambda_w: 20,
    format: `"${format}"`,
  }
  const wanted = ['m.F_n/(1 ksi)', 'm.P_c/(1 kip)']
  const prepared = useMethod('aisc360-22/e3', bindings, wanted)
  expect(problems(prepared)).toEqual([])
  const [F_n = NaN, P_c = NaN] = results(prepared, wanted)
  return { F_n, P_c }
}

describe('EN 1993-1-1 6.3.1', () => {
  it('agrees with the roots of the Ayrton-Perry equation to 12 digits', () => {
    expect(curves.chi).toHaveLength(50)
    for (const { lambda_bar, curve, chi: expected } of curves.chi)
      expectWithin(`chi, curve ${curve} at ${lambda_bar}`, chi(curve, lambda_bar), expected, 1e-12)
  })

  it('meets every tabulated reduction factor within the rounding of the table', () => {
    expect(tables.reductionFactor.values).toHaveLength(19)
    for (const { lambda_bar, curve, chi: expected, tolerance } of tables.reductionFactor.values)
      expect([curve, lambda_bar, Math.abs(chi(curve, lambda_bar) - Number(expected)) <= tolerance]).toEqual([
        curve,
        lambda_bar,
        true,
      ])
  })

  it('falls with slenderness, and the curves keep their order', () => {
    const order = ['a0', 'a', 'b', 'c', 'd']
    let before = order.map(() => 1)
    for (const slenderness of [0.25, 0.4, 0.7, 1, 1.4, 2, 3, 5]) {
      const now = order.map((curve) => chi(curve, slenderness))
      for (const [i, value] of now.entries()) {
        expect(value).toBeLessThan(before[i] ?? 0)
        expect(value).toBeLessThan(Math.min(1, 1 / slenderness ** 2))
        if (i > 0) expect(value).toBeLessThan(now[i - 1] ?? 0)
      }
      before = now
    }
  })

  it('does not know a curve that the table does not have', () => {
    for (const curve of ['e', 'A', '']) {
      const prepared = useMethod('en1993-1-1-2005/6.3.1', {
        A: '1000 mm^2',
        f_y: '235 MPa',
        N_cr: '235 kN',
        curve: `"${curve}"`,
      })
      expect(prepared.verdict).toBe('error')
      expect(problems(prepared).join()).toContain(`the table has no entry \`${curve}\``)
    }
  })

  it('takes the area of a class 4 section as the effective one only when it is given', () => {
    const given = { A: '1000 mm^2', f_y: '235 MPa', N_cr: '235 kN', curve: '"a"' }
    const [gross = NaN] = results(useMethod('en1993-1-1-2005/6.3.1', given, ['m.N_b_Rd']), ['m.N_b_Rd'])
    const reduced = useMethod('en1993-1-1-2005/6.3.1', { ...given, A_eff: '900 mm^2' }, ['m.N_b_Rd'])
    expect(results(reduced, ['m.N_b_Rd'])[0]).toBeLessThan(gross)
    // chi at slenderness 1 on curve a, by hand: Phi = 0.5(1 + 0.21*0.8 + 1) = 1.084, chi = 1/(1.084 + sqrt(1.084^2 - 1))
    expectWithin('N_b_Rd', gross, 235e3 / (1.084 + Math.sqrt(1.084 ** 2 - 1)), 1e-12)
  })
})

describe('AISC 360-22 E3', () => {
  it('agrees with the curve in the slenderness parameter of the older editions to 12 digits', () => {
    expect(curves.nominal_stress).toHaveLength(24)
    for (const { slenderness, F_y, F_n } of curves.nominal_stress)
      expectWithin(`F_n at ${slenderness}, ${F_y} ksi`, column(slenderness, F_y).F_n, F_n, 1e-12)
  })

  it('meets every readable value of the table of available stresses within its rounding', () => {
    expect(tables.criticalStress.values).toHaveLength(40)
    for (const { format, slenderness, F_y, stress, tolerance } of tables.criticalStress.values) {
      const { P_c } = column(slenderness, F_y, format)
      expect([format, slenderness, F_y, Math.abs(P_c - Number(stress)) <= tolerance]).toEqual([
        format,
        slenderness,
        F_y,
        true,
      ])
    }
  })

  it('steps by less than 5 in 10 000 where the two expressions meet', () => {
    const limit = 4.71 * Math.sqrt(29000 / 50)
    const [below, above] = [column(limit * (1 - 1e-9), 50).F_n, column(limit * (1 + 1e-9), 50).F_n]
    expect(below).not.toBe(above)
    expect(Math.abs(below / above - 1)).toBeLessThan(5e-4)
  })

  it('does not take a misspelt format or shape for another', () => {
    for (const [name, value] of [
      ['format', 'lrfd'],
      ['shape', 'W'],
    ] as const) {
      const bindings = {
        shape: '"I"',
        A_g: '1 in^2',
        F_y: '50 ksi',
        E: '29000 ksi',
        r_x: '1 in',
        r_y: '1 in',
        L_cx: '50 in',
        L_cy: '50 in',
        L_cz: '50 in',
        lambda_f: 5,
        lambda_w: 20,
        format: '"LRFD"',
      }
      const prepared = useMethod('aisc360-22/e3', { ...bindings, [name]: `"${value}"` })
      expect(prepared.verdict).toBe('error')
      expect(problems(prepared).join()).toContain(`the table has no entry \`${value}\``)
    }
  })

  it('is outside its limits for the slender web of a W16X31 (AISC Design Examples v16.0, Example E.1E)', () => {
    const bindings = {
      shape: '"I"',
      A_g: '9.13 in^2',
      F_y: '50 ksi',
      E: '29000 ksi',
      r_x: '6.41 in',
      r_y: '1.17 in',
      L_cx: '10 ft',
      L_cy: '10 ft',
      L_cz: '10 ft',
      lambda_f: '(5.53 in)/(2*(0.440 in))',
      lambda_w: 51.6,
      format: '"LRFD"',
    }
    const prepared = useMethod('aisc360-22/e3', bindings)
    expect(prepared.verdict).toBe('fail')
    expect(problems(prepared).join()).toContain('`lambda_w <= lambda_rw` does not hold')
  })
})
