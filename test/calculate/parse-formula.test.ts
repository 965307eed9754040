import fc from 'fast-check'
import { all, create, type FactoryFunctionMap } from 'mathjs'
import { describe, expect, test } from 'vitest'
import { evaluate } from '../../src/calculate/evaluate.ts'
import type { Scope } from '../../src/calculate/scope.ts'
import { FormulaError } from '../../src/calculate/formula-error.ts'
import { parseFormula } from '../../src/calculate/parse-formula.ts'
import type { Value } from '../../src/calculate/types.ts'
import { Places } from '../../src/sheet/places.ts'

/** mathjs with exact comparisons, which a check needs; by default it takes 1e-16 and 0 for equal. */
const reference = create(all as FactoryFunctionMap, { relTol: 1e-300, absTol: 0 })
const mathjs = (text: string, scope: object): unknown => reference.evaluate(text, scope)

const NAMES: Readonly<Record<string, number>> = { a: 1.25, b: -0.75, x_1: 3, lambda_bar: 0.5 }

function calculate(text: string): Value {
  const span = new Places(text).span(0, text.length)
  const { formula } = parseFormula({ text, span }, (name) => Object.hasOwn(NAMES, name))
  const scope: Scope = {
    lookup: (name, at) => {
      const si = NAMES[name]
      if (si === undefined)
        throw new FormulaError('undefined-name', `\`${name}\` is not defined`, 'define it', at)
      return { type: 'quantity', si, dimension: [0, 0, 0, 0] }
    },
    source: ({ start, end }) => text.slice(start.offset, end.offset),
    budget: { left: 1e6 },
  }
  return evaluate(formula, scope)
}

/** Text of random formulas with brackets left out where precedence may decide. */
const { formula } = fc.letrec<{ formula: string; leaf: string }>((tie) => ({
  leaf: fc.oneof(
    fc.constantFrom(...Object.keys(NAMES)),
    fc.integer({ min: 0, max: 9 }).map(String),
    fc.constantFrom('2.5', '1e-2', '.5', 'pi'),
  ),
  formula: fc.oneof(
    { depthSize: 'small', withCrossShrink: true },
    tie('leaf'),
    fc
      .tuple(tie('formula'), fc.constantFrom(' + ', ' - ', '*', ' / ', '^'), tie('formula'))
      .map((parts) => parts.join('')),
    tie('formula').map((inner) => `(${inner})`),
    tie('formula').map((inner) => `-${inner}`),
    tie('formula').map((inner) => `sqrt(abs(${inner}))`),
    fc.tuple(tie('formula'), tie('formula')).map(([p, q]) => `max(${p}, ${q})`),
    fc
      .tuple(
        tie('formula'),
        fc.constantFrom('<', '<=', '>', '>='),
        tie('formula'),
        tie('formula'),
        tie('formula'),
      )
      .map(([p, r, q, t, e]) => `(${p} ${r} ${q} ? ${t} : ${e})`),
  ),
}))

describe('formulas are read as mathjs reads them', () => {
  test('random formulas have the value that mathjs gives them, or are refused where mathjs has no real, finite one', () => {
    fc.assert(
      fc.property(formula, (text) => {
        let expected: unknown
        try {
          expected = mathjs(text, { ...NAMES })
        } catch {
          expected = undefined
        }
        let actual: number | undefined
        try {
          const value = calculate(text)
          actual = value.type === 'quantity' ? value.si : undefined
        } catch (error) {
          if (!(error instanceof FormulaError)) throw error
          // 0·∞ and the like: mathjs may pass through an infinite intermediate value that a sheet refuses.
          expect(['not-finite', 'not-real']).toContain(error.rule)
          return
        }
        if (typeof expected === 'number' && Number.isFinite(expected) && actual !== undefined) {
          expect(Math.abs(actual - expected)).toBeLessThanOrEqual(1e-12 * Math.max(1, Math.abs(expected)))
        } else expect(actual).toBeUndefined()
      }),
      { numRuns: 3000 },
    )
  })

  test.each([
    ['-2^2', -4],
    ['2^-1', 0.5],
    ['2^3^2', 512],
    ['8/4/2', 1],
    ['8/4*2', 4],
    ['1 - 2 - 3', -4],
    ['-a^2', -1.5625],
    ['true ? 1 : false ? 2 : 3', 1],
    ['1 < 2 < 3 ? 1 : 0', 1],
    ['3 > 2 > 2 ? 1 : 0', 0],
    ['not true or true ? 1 : 0', 1],
  ])('%s is %d', (text, expected) => {
    expect(calculate(text)).toEqual({ type: 'quantity', si: expected, dimension: [0, 0, 0, 0] })
    expect(Number(mathjs(text, { ...NAMES }))).toBe(expected)
  })
})

describe('any text is a formula or is refused at a place inside it', () => {
  test('random texts', () => {
    const character = fc.constantFrom(
      ...'abxEI_019.+-*/^()[]{},;:?<>=!"\' \\\n#@%&|λ²',
      ' kN',
      ' m',
      'sqrt(',
      'to ',
    )
    fc.assert(
      fc.property(fc.array(character, { maxLength: 40 }), (parts) => {
        const text = parts.join('')
        try {
          calculate(text)
        } catch (error) {
          expect(error).toBeInstanceOf(FormulaError)
          const { span, hint, message } = error as FormulaError
          expect(span.start.offset).toBeGreaterThanOrEqual(0)
          expect(span.end.offset).toBeLessThanOrEqual(text.length + 1)
          expect(hint).not.toBe('')
          expect(message).not.toMatch(/\.$/)
        }
      }),
      { numRuns: 5000 },
    )
  })

  test('a formula that is too deep or too long is refused', () => {
    expect(() => calculate('('.repeat(5000) + '1' + ')'.repeat(5000))).toThrow(FormulaError)
    expect(() => calculate('1' + ' + 1'.repeat(5000))).toThrow(FormulaError)
    expect(() => calculate('-'.repeat(500) + '1')).toThrow(FormulaError)
  })
})
