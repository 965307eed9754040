import { describe, expect, test } from 'vitest'
import { printedCheck } from './lines.ts'

const GIVEN = 'N = 285 kN\nR = 734 kN\nL = 4.60 m\nf = 355 MPa\nb = -2 kN'

describe('a check shows both sides with their numbers', () => {
  test('of two names', () => {
    const { tex, words } = printedCheck(GIVEN, 'N <= R')
    expect(tex).toBe('N=285\\,\\mathrm{kN}\\leq R=734\\,\\mathrm{kN}')
    expect(words).toBe('N equals 285 kilonewtons, is at most, R equals 734 kilonewtons')
  })

  test('of formulas, as symbols = numbers put in = value', () => {
    expect(printedCheck(GIVEN, 'N/R <= 1.0').tex).toBe(
      '\\frac{N}{R}=\\frac{285\\,\\mathrm{kN}}{734\\,\\mathrm{kN}}=0.388\\leq 1.0',
    )
    expect(printedCheck(GIVEN, 'R >= 1.1*N').tex).toBe(
      'R=734\\,\\mathrm{kN}\\geq 1.1\\,N=1.1\\times 285\\,\\mathrm{kN}=313.5\\,\\mathrm{kN}',
    )
  })

  test('a typed side keeps its text, and the other takes its unit', () => {
    expect(printedCheck(GIVEN, 'f <= 460 MPa').tex).toBe('f=355\\,\\mathrm{MPa}\\leq 460\\,\\mathrm{MPa}')
    expect(printedCheck(GIVEN, 'L/10 <= 500 mm').tex).toBe(
      '\\frac{L}{10}=\\frac{4.60\\,\\mathrm{m}}{10}=460\\,\\mathrm{mm}\\leq 500\\,\\mathrm{mm}',
    )
  })

  test('with figures enough to see which is larger', () => {
    const { tex } = printedCheck(GIVEN, 'N*1.00001 <= 285 kN')
    expect(tex).toContain('=285.003\\,\\mathrm{kN}\\nleq 285\\,\\mathrm{kN}')
  })

  test.each([
    ['R <= N', '\\nleq ', 'is not at most'],
    ['R < N', '\\nless ', 'is not less than'],
    ['N >= R', '\\ngeq ', 'is not at least'],
    ['N > R', '\\ngtr ', 'is not greater than'],
  ])('the relation of %s is struck, since it does not hold', (check, sign, words) => {
    const printed = printedCheck(GIVEN, check)
    expect(printed.tex).toContain(sign)
    expect(printed.words).toContain(words)
  })

  test('a side that is a negative number keeps its sign', () => {
    expect(printedCheck(GIVEN, 'b <= -1 kN').tex).toBe('b=-2\\,\\mathrm{kN}\\leq -1\\,\\mathrm{kN}')
  })

  test('a long one is in rows aligned at the relation', () => {
    const { tex } = printedCheck(GIVEN, 'N/R + N/R*L/(2 m) <= R/N*L/(1 m)', 20)
    expect(tex).toMatch(/^\\begin\{aligned\}&.*\\\\&\\quad \\leq .*\\end\{aligned\}$/)
  })
})
