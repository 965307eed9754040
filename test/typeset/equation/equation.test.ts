import { describe, expect, test } from 'vitest'
import { parseFormula } from '../../../src/calculate/parse-formula.ts'
import { Places } from '../../../src/sheet/places.ts'
import { equation } from '../../../src/typeset/equation/equation.ts'
import { formulaTex } from '../../../src/typeset/equation/formula-tex.ts'
import { linesOf, metric, printed } from './lines.ts'

const LENGTHS = 'a = 3 m\nb = -2 m\nL = 4.60 m'

describe('a line is symbols = numbers put in = result', () => {
  test('a product and its quotient', () => {
    // The moment of a uniform load on a simple span, w L²/8, as every statics text prints it.
    const { tex, symbolic, substituted, result } = printed('w = 2.5 kN/m\nL = 4.60 m', 'M = w*L^2/8')
    expect(symbolic).toBe('\\frac{w\\,L^{2}}{8}')
    expect(substituted).toBe('\\frac{2.5\\,\\mathrm{kN}/\\mathrm{m}\\times (4.60\\,\\mathrm{m})^{2}}{8}')
    expect(result).toBe('6.613\\,\\mathrm{kN}{\\cdot}\\mathrm{m}')
    expect(tex).toBe(`M=${symbolic}=${substituted}=${result}`)
  })

  test('an input is put in as it was typed, a result as it is shown', () => {
    expect(printed('L = 4.60 m', 'x = 2*L').tex).toBe('x=2\\,L=2\\times 4.60\\,\\mathrm{m}=9.2\\,\\mathrm{m}')
    expect(printed('L = 4.60 m', 'x = 2*L\ny = x/3').substituted).toBe('\\frac{9.2\\,\\mathrm{m}}{3}')
  })

  test('the unit asked for by `to` is the result’s', () => {
    expect(printed('L = 4.60 m', 'x = L/4 to mm').result).toBe('1\\,150\\,\\mathrm{mm}')
    expect(printed('L = 4.60 m', 'x = L to mm').tex).toBe('x=L=4.60\\,\\mathrm{m}=4\\,600\\,\\mathrm{mm}')
  })

  test('a rounded value does not stand before its own conversion', () => {
    expect(printed('L = 4.60 m', 'x = L/3\ny = x to mm').tex).toBe('y=x=1\\,533\\,\\mathrm{mm}')
  })

  test('nothing is said twice', () => {
    expect(printed(LENGTHS, 'x = 5 kN').tex).toBe('x=5\\,\\mathrm{kN}')
    expect(printed(LENGTHS, 'x = (5 kN)').tex).toBe('x=5\\,\\mathrm{kN}')
    expect(printed(LENGTHS, 'x = -(5 kN)').tex).toBe('x=-5\\,\\mathrm{kN}')
    expect(printed(LENGTHS, 'x = L').tex).toBe('x=L=4.60\\,\\mathrm{m}')
    expect(printed(LENGTHS, 'x = 1/200').tex).toBe('x=\\frac{1}{200}=0.005')
    expect(printed(LENGTHS, 'x = [a, b]').tex).toBe(
      'x=\\lbrack a,\\;b\\rbrack =\\lbrack 3\\,\\mathrm{m},\\;-2\\,\\mathrm{m}\\rbrack ',
    )
    expect(printed(LENGTHS, 'x = "plain"').tex).toBe('x=\\text{“plain”}')
    expect(printed('s = section("HE 160 B")', 'A = s.A').tex).toBe(
      'A=A_{\\textit{s}}=5\\,430\\,\\mathrm{mm}^{2}',
    )
  })

  test('a row of a table is its designation', () => {
    expect(printed('', 'tube = section("CHS 139.7x6.3")').tex).toBe('\\mathrm{tube}=\\text{CHS\\ 139.7x6.3}')
  })

  test('negative numbers put in stand in brackets, save at the beginning', () => {
    expect(printed(LENGTHS, 'x = a - b').substituted).toBe('3\\,\\mathrm{m}-(-2\\,\\mathrm{m})')
    expect(printed(LENGTHS, 'x = b + a').substituted).toBe('-2\\,\\mathrm{m}+3\\,\\mathrm{m}')
    expect(printed(LENGTHS, 'x = b^2').substituted).toBe('(-2\\,\\mathrm{m})^{2}')
    expect(printed(LENGTHS, 'x = -b').substituted).toBe('-(-2\\,\\mathrm{m})')
  })

  test('the author’s brackets go where the layout encloses, and stay elsewhere', () => {
    expect(printed(LENGTHS, 'x = (a - b)/(a + b)').symbolic).toBe('\\frac{a-b}{a+b}')
    expect(printed(LENGTHS, 'x = sqrt((a^2 + b^2))').symbolic).toBe('\\sqrt{a^{2}+b^{2}}')
    expect(printed(LENGTHS, 'x = (a)*(2 m)').symbolic).toBe('a\\cdot 2\\,\\mathrm{m}')
    expect(printed(LENGTHS, 'x = a - (b - L)').symbolic).toBe('a-(b-L)')
    expect(printed(LENGTHS, 'x = a + (b + L)').symbolic).toBe('a+(b+L)')
  })

  test('quotients inside a fraction or an exponent are written with a slash', () => {
    expect(printed(LENGTHS, 'x = 1/(1/a + 1/(2*L))').symbolic).toBe('\\frac{1}{1/a+1/(2\\,L)}')
    expect(printed(LENGTHS, 'x = 0.658^(a/L)').symbolic).toBe('0.658^{a/L}')
  })

  test('numbers are multiplied by a cross, symbols by a thin space or a dot where that could be misread', () => {
    expect(printed(LENGTHS, 'x = a*L').symbolic).toBe('a\\,L')
    expect(printed(LENGTHS, 'x = a*(b + L)').symbolic).toBe('a\\cdot (b+L)')
    expect(printed('EI = 2 kN*m^2', 'x = 2*EI').symbolic).toBe('2\\cdot \\mathrm{EI}')
    expect(printed(LENGTHS, 'x = 2*3*a').tex).toBe(
      'x=2\\times 3\\,a=2\\times 3\\times 3\\,\\mathrm{m}=18\\,\\mathrm{m}',
    )
  })

  test('the figures of a result can be bold, and only those', () => {
    const [line] = linesOf('', 'x = 2*(3 m)').named
    expect(line && equation(line, metric, { boldResult: true }).tex).toBe(
      'x=2\\times 3\\,\\mathrm{m}=\\mathbf{6\\,\\mathrm{m}}',
    )
    const [typed] = linesOf('', 'x = 3 m').named
    expect(typed && equation(typed, metric, { boldResult: true }).tex).toBe('x=3\\,\\mathrm{m}')
  })
})

describe('functions in the form that mathematics has', () => {
  test.each([
    ['sqrt(a)', '\\sqrt{a}'],
    ['cbrt(a)', '\\sqrt[{3}]{a}'],
    ['nthRoot(a, 4)', '\\sqrt[{4}]{a}'],
    ['abs(b)', '\\lvert b\\rvert '],
    ['max(a, b)', '\\max(a,\\;b)'],
    ['log(a/b)', '\\ln\\left(\\frac{a}{b}\\right)'],
    ['log10(a/L)', '\\log_{10}\\left(\\frac{a}{L}\\right)'],
    ['floor(a/b)', '\\left\\lfloor \\frac{a}{b}\\right\\rfloor '],
    ['hypot(a, b)', '\\sqrt{a^{2}+b^{2}}'],
    ['round(a/b)', '\\text{round}\\left(\\frac{a}{b}\\right)'],
    // Euler 1744; S. P. Timoshenko, J. M. Gere, Theory of Elastic Stability, 2nd ed., eq. 2-5.
    ['euler_load(E, I, L)', '\\frac{\\pi ^{2}\\,E\\,I}{L^{2}}'],
    ['critical_load(m, 1)', '\\text{critical\\ load}(m,\\;1)'],
  ])('%s is printed as %s', (text, tex) => {
    const { formula } = parseFormula({ text, span: new Places(text).span(0, text.length) }, () => false)
    expect(formulaTex(formula, { profile: metric })).toBe(tex)
  })

  test('a function of the sheet keeps its name as a symbol, and is printed in symbols where it is defined', () => {
    const { tex, substituted, result } = printed('c = 2 kN', 'V_1(theta, P) = c*theta - P*theta^2')
    expect(tex).toBe('V_{1}(\\theta,\\,P)=c\\,\\theta-P\\,\\theta^{2}')
    expect(substituted).toBeUndefined()
    expect(result).toBeUndefined()
    expect(printed('c = 2 kN', 'V_1(x) = c*x\ny = V_1(c/c)').symbolic).toBe(
      'V_{1}\\left(\\frac{c}{c}\\right)',
    )
  })

  test('angles stand in degrees in a sine, in radians where they are reckoned with', () => {
    expect(printed('beta = 30 deg', 'x = sin(beta)').substituted).toBe('\\sin(30{}^{\\circ})')
    expect(printed('beta = 30 deg', 'x = sin(beta/2)').substituted).toBe(
      '\\sin\\left(\\frac{30{}^{\\circ}}{2}\\right)',
    )
    expect(printed('beta = 30 deg', 'x = beta - 0.1').substituted).toBe('0.5236\\,\\mathrm{rad}-0.1')
    expect(printed('beta = 30 deg', 'x = sin(beta - 0.1)').substituted).toBe(
      '\\sin(0.5236\\,\\mathrm{rad}-0.1)',
    )
  })
})

describe('case distinctions', () => {
  const given = 'a = 3 m\nb = 2 m'

  test('mark the branch taken, put numbers into that one only, and say why', () => {
    const { symbolic, tex, result } = printed(given, 'x = a <= b ? 2*a : a + b')
    expect(symbolic).toBe(
      '\\begin{dcases}2\\,a&\\text{if }a\\leq b\\\\a+b&\\text{otherwise}\\quad\\triangleleft\\;\\text{applies}\\end{dcases}',
    )
    expect(tex).toContain('=3\\,\\mathrm{m}+2\\,\\mathrm{m}=5\\,\\mathrm{m}')
    expect(tex).toContain('\\text{as }3\\,\\mathrm{m}\\nleq 2\\,\\mathrm{m}')
    expect(tex).not.toContain('2\\times')
    expect(result).toBe('5\\,\\mathrm{m}')
  })

  test('a chain of them is one, with one brace', () => {
    const { symbolic } = printed(given, 'x = a < b ? 1 : (a < 4 m ? 2 : a < 5 m ? 3 : 4)')
    expect(symbolic?.match(/dcases/g)).toHaveLength(2)
    expect(symbolic).toContain('2&\\text{if }a<4\\,\\mathrm{m}\\quad\\triangleleft')
  })

  test('a table written in the sheet marks the entry taken', () => {
    // EN 1993-1-1:2005, Table 6.1.
    const { symbolic, substituted, result } = printed(
      'curve = "b"',
      'alpha = lookup(curve, {a0: 0.13, a: 0.21, b: 0.34, c: 0.49, d: 0.76})',
    )
    expect(symbolic).toContain(
      '&\\text{a0}&\\text{a}&\\text{b}&\\text{c}&\\text{d}\\\\\\hline &0.13&0.21&0.34&0.49&0.76',
    )
    expect(symbolic).toContain('\\\\&&&\\triangle&&\\end{array}')
    expect([substituted, result].filter((part) => part !== undefined)).toEqual(['0.34'])
  })

  test('a branch or entry that is a number as typed is not followed by the same number rounded', () => {
    expect(printed(given, 'x = a < b ? a : 1.50 m').tex).toContain('=1.50\\,\\mathrm{m}\\quad\\text{as }')
    expect(printed('k = "p"', 'x = lookup(k, {p: 0.210, q: 0.340})').tex).toMatch(/=0\.210$/)
    expect(printed('a = 3.0 m\nb = 2 m', 'x = a > b ? a : b').tex).not.toContain('=3\\,')
  })

  test('a table of formulas is a case distinction', () => {
    const { symbolic, substituted } = printed(
      `${given}\nshape = "I"`,
      'x = lookup(shape, {I: 2*a, HSS: 3*b})',
    )
    expect(symbolic).toContain('2\\,a&\\text{if }\\mathrm{shape}=\\text{“I”}\\quad\\triangleleft')
    expect(substituted).toBe('2\\times 3\\,\\mathrm{m}')
  })
})

describe('words', () => {
  test.each([
    ['x = a/(b + L)', 'x equals the fraction a divided by b plus L, end of fraction equals'],
    ['x = (a + b)^2', 'x equals open bracket a plus b close bracket squared equals'],
    [
      'x = L^2',
      'x equals L squared equals open bracket 4.60 metres close bracket squared equals 21.16 square metres',
    ],
    ['x = a/L', 'x equals a over L equals 3 metres over 4.60 metres equals 0.652'],
    [
      'x = a - b',
      'x equals a minus b equals 3 metres minus open bracket minus 2 metres close bracket equals 5 metres',
    ],
    [
      'x = a < b or a > b and b < L',
      'x equals a is less than b or open bracket a is greater than b and b is less than L close bracket',
    ],
    ['x = a < b ? a : L', 'end of cases equals 4.60 metres, as 3 metres is not less than minus 2 metres'],
    ['x = sqrt(a*L)', 'x equals the square root of a times L, end of square root equals'],
  ])('%s', (line, words) => expect(printed(LENGTHS, line).words).toContain(words))
})
