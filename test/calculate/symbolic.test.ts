import fc from 'fast-check'
import { derivative, parse } from 'mathjs'
import { describe, expect, test } from 'vitest'
import { Symbolic, type SmoothFunction, type Term } from '../../src/calculate/symbolic.ts'

/* The reference is mathjs's own symbolic differentiation, a different program from ours. */

const SMOOTH: readonly SmoothFunction[] = [
  'acos',
  'acosh',
  'asin',
  'asinh',
  'atan',
  'atanh',
  'cbrt',
  'cos',
  'cosh',
  'exp',
  'log',
  'log10',
  'sin',
  'sinh',
  'sqrt',
  'tan',
  'tanh',
]

describe('differentiation', () => {
  test.each(SMOOTH)('%s has the derivatives that mathjs gives, to the third order', (name) => {
    const graph = new Symbolic()
    let term: Term = graph.call(name, graph.variable(0))
    let node = parse(`${name}(x)`)
    const x = name === 'acosh' ? 1.7 : 0.37
    for (let order = 1; order <= 3; order++) {
      term = graph.derivative(term, 0)
      node = derivative(node, 'x', { simplify: false })
      const expected = Number(node.evaluate({ x }))
      expect(graph.compile(term)([x]) / expected).toBeCloseTo(1, 10)
    }
  })

  test('powers have no 0·∞ left in them at zero', () => {
    const graph = new Symbolic()
    const q = graph.variable(0)
    const square = graph.product(graph.constant(3), graph.power(q, graph.constant(2)))
    const orders = [1, 2, 3, 4].map((order) => {
      let term = square
      for (let i = 0; i < order; i++) term = graph.derivative(term, 0)
      return graph.compile(term)([0])
    })
    expect(orders).toEqual([0, 6, 0, 0])
  })

  test('random polynomials and products of two variables, mixed derivatives', () => {
    const exponent = fc.integer({ min: 0, max: 5 })
    fc.assert(
      fc.property(
        fc.array(fc.tuple(fc.integer({ min: -5, max: 5 }), exponent, exponent), {
          minLength: 1,
          maxLength: 6,
        }),
        exponent,
        exponent,
        (terms, m, n) => {
          const graph = new Symbolic()
          const [x, y] = [graph.variable(0), graph.variable(1)]
          let term = terms
            .map(([c, i, j]) =>
              graph.product(
                graph.constant(c),
                graph.product(graph.power(x, graph.constant(i)), graph.power(y, graph.constant(j))),
              ),
            )
            .reduce((a, b) => graph.sum(a, b))
          for (let k = 0; k < m; k++) term = graph.derivative(term, 0)
          for (let k = 0; k < n; k++) term = graph.derivative(term, 1)
          const falling = (e: number, k: number) =>
            Array.from({ length: k }, (_, i) => e - i).reduce((a, b) => a * b, 1)
          const exact = terms.reduce(
            (sum, [c, i, j]) =>
              sum +
              (falling(i, m) === 0 || falling(j, n) === 0
                ? 0
                : c * falling(i, m) * falling(j, n) * 1.5 ** (i - m) * 0.5 ** (j - n)),
            0,
          )
          expect(graph.compile(term)([1.5, 0.5])).toBeCloseTo(exact, 6)
        },
      ),
    )
  })
})
