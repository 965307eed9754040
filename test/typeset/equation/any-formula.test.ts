import fc from 'fast-check'
import { expect, test } from 'vitest'
import type { BinaryOperator, Formula, RelationOperator } from '../../../src/calculate/types.ts'
import { formulaTex, printFormula, printingOf } from '../../../src/typeset/equation/formula-tex.ts'
import { formulaWords } from '../../../src/typeset/equation/formula-words.ts'
import { layChain } from '../../../src/typeset/equation/layout.ts'
import { measure } from '../../../src/typeset/equation/measure.ts'
import type { Printing } from '../../../src/typeset/equation/print.ts'
import { renderMath } from '../../../src/typeset/equation/render.ts'
import { metric } from './lines.ts'
import { binary, call, caseOf, group, name, negative, number, OPERANDS, relation } from './random-formula.ts'

const at = { line: 1, column: 1, offset: 0 }
const span = { start: at, end: at }

const legalName = fc.oneof(
  fc.constantFrom('a', 'b', 'L', 'lambda_bar', 'f_prime', 'EI', 'x_1', 'kN', 'constructor', 'N__Ed_'),
  fc.stringMatching(/^[A-Za-z][A-Za-z0-9_]{0,8}$/),
)
const functionName = fc.oneof(
  legalName,
  fc.constantFrom(
    'lookup',
    'section',
    'sqrt',
    'nthRoot',
    'abs',
    'inv',
    'transpose',
    'log10',
    'euler_load',
    'hypot',
  ),
)
const anyText = fc.string({ unit: 'binary', maxLength: 12 })
const text = anyText.map((value): Formula => ({ type: 'text', value, span }))

/** Trees of every make that the parser can build, and many that no calculation would get through. */
const { formula } = fc.letrec<{ formula: Formula }>((tie) => ({
  formula: fc.oneof(
    { depthSize: 'small', withCrossShrink: true },
    fc.oneof(
      text,
      fc.array(legalName, { minLength: 1, maxLength: 3 }).map((path) => name(...path)),
      fc.constantFrom('0', '1e300', '1e-300', '007', '.5', '123456789.123').map(number),
      fc.boolean().map((value): Formula => ({ type: 'truth', value, span })),
      fc.constant<Formula>({ type: 'constant', name: 'pi', span }),
    ),
    fc
      .tuple(
        fc.constantFrom<BinaryOperator>('+', '-', '*', '/', '^', 'and', 'or'),
        tie('formula'),
        tie('formula'),
      )
      .map((parts) => binary(...parts)),
    fc
      .tuple(
        fc.array(fc.constantFrom<RelationOperator>('<', '<=', '>', '>=', '==', '!='), {
          minLength: 2,
          maxLength: 2,
        }),
        fc.array(tie('formula'), { minLength: 3, maxLength: 3 }),
      )
      .map(([operators, operands]) => relation(operators, ...operands)),
    tie('formula').map(group),
    tie('formula').map(negative),
    tie('formula').map((body): Formula => ({ type: 'unary', operator: 'not', body, span })),
    fc.tuple(functionName, fc.array(tie('formula'), { maxLength: 4 })).map(([fn, args]) => call(fn, ...args)),
    fc.tuple(tie('formula'), tie('formula'), tie('formula')).map((parts) => caseOf(...parts)),
    fc.array(tie('formula'), { maxLength: 8 }).map((items): Formula => ({ type: 'list', items, span })),
    fc.dictionary(fc.oneof(legalName, anyText), tie('formula'), { maxKeys: 7 }).map((entries): Formula => ({
      type: 'record',
      fields: Object.entries(entries).map(([key, value]) => ({ key, value })),
      span,
    })),
    fc.tuple(tie('formula'), legalName).map(([of, key]): Formula => ({ type: 'field', of, key, span })),
    fc
      .tuple(tie('formula'), fc.array(tie('formula'), { minLength: 1, maxLength: 2 }))
      .map(([of, indices]): Formula => ({ type: 'item', of, indices, span })),
    fc
      .tuple(
        tie('formula'),
        fc.dictionary(anyText, fc.oneof(tie('formula'), fc.constant(number('0.21'))), { maxKeys: 9 }),
      )
      .map(([key, entries]) =>
        call('lookup', key, {
          type: 'record',
          fields: Object.entries(entries).map(([field, value]) => ({ key: field, value })),
          span,
        }),
      ),
  ),
}))

test('any formula gives TeX that KaTeX accepts, in symbols, in numbers and on a lane of any width', () => {
  fc.assert(
    fc.property(formula, fc.integer({ min: 1, max: 40 }), fc.boolean(), (tree, width, inNumbers) => {
      const mode = inNumbers ? 'numbers' : 'symbols'
      const print = printFormula(tree, printingOf({ profile: metric, operands: OPERANDS, mode }))
      const laid = layChain('x', [{ sign: '=', print, startsRow: true }], width)
      for (const tex of [formulaTex(tree, { profile: metric, mode }), laid])
        renderMath(tex, { display: true, words: '', forPdf: true })
      expect(Number.isFinite(measure(laid))).toBe(true)
    }),
    { numRuns: 400 },
  )
})

test('any formula can be spoken', () => {
  fc.assert(
    fc.property(formula, (tree) => {
      const words = formulaWords(tree, {
        ...printingOf({ profile: metric, operands: OPERANDS }),
        mode: 'numbers',
      })
      expect(words).not.toMatch(/undefined|\[object/)
    }),
    { numRuns: 300 },
  )
})

test('no part of a formula is printed over and over, however deep it lies', () => {
  const nestings: readonly ((inner: Formula) => Formula)[] = [
    (inner) => caseOf(relation(['<'], number('1'), inner), number('1'), number('2')),
    (inner) => call('sqrt', inner),
    (inner) => binary('/', number('1'), group(binary('+', number('1'), inner))),
    (inner) => binary('and', relation(['<'], number('1'), number('2')), group(inner)),
    (inner) => call('euler_load', number('1'), number('2'), inner),
    (inner) => call('lookup', name('key'), { type: 'record', fields: [{ key: 'a', value: inner }], span }),
  ]
  for (const nest of nestings) {
    let tree = name('x')
    for (let depth = 0; depth < 40; depth++) tree = nest(tree)
    let count = 0
    const print: Printing['print'] = (part, printing) => {
      count++
      return printFormula(part, printing)
    }
    layChain(
      'x',
      [{ sign: '=', print: print(tree, { ...printingOf({ profile: metric }), print }), startsRow: true }],
      20,
    )
    expect(count).toBeLessThan(40 * 20)
    expect(formulaWords(tree, printingOf({ profile: metric })).length).toBeLessThan(40 * 200)
  }
})
