import { readFileSync } from 'node:fs'
import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import {
  cholesky,
  eigen,
  generalisedEigen,
  largest,
  solve,
  times,
  type Matrix,
} from '../../src/stability/dense.ts'
import { equilibrate, negativeCount } from '../../src/stability/inertia.ts'

const { matrices } = JSON.parse(
  readFileSync(new URL('../published/stability-recomputed.json', import.meta.url), 'utf8'),
) as { matrices: { matrix: number[][]; values: number[] }[] }

const entry = fc.double({ min: -3, max: 3, noNaN: true })
const symmetric = fc
  .integer({ min: 1, max: 7 })
  .chain((n) =>
    fc
      .array(entry, { minLength: n * n, maxLength: n * n })
      .map((all) =>
        Array.from({ length: n }, (_, i) =>
          Array.from({ length: n }, (_, j) => all[Math.min(i, j) * n + Math.max(i, j)] as number),
        ),
      ),
  )
const product = (A: Matrix, B: Matrix) =>
  A.map((row) => row.map((_, j) => row.reduce((sum, a, k) => sum + a * ((B[k] as number[])[j] as number), 0)))
const transposed = (A: Matrix) => A.map((_, j) => A.map((row) => row[j] as number))

describe('eigenvalues', () => {
  test('agree with SciPy to 1e-12 of the largest', () => {
    expect(matrices.length).toBeGreaterThan(5)
    for (const { matrix, values } of matrices)
      eigen(matrix).values.forEach((value, i) =>
        expect(Math.abs(value - (values[i] as number))).toBeLessThan(1e-12 * largest(values)),
      )
  })

  test('come with vectors that the matrix only stretches', () => {
    fc.assert(
      fc.property(symmetric, (A) => {
        const { values, vectors } = eigen(A)
        for (const [k, vector] of vectors.entries())
          for (const [i, value] of times(A, vector).entries())
            expect(Math.abs(value - (values[k] as number) * (vector[i] as number))).toBeLessThan(1e-13)
      }),
    )
  })

  test('of a pair of matrices, the second positive definite', () => {
    fc.assert(
      fc.property(symmetric, (A) => {
        const B = product(A, A).map((row, i) => row.map((value, j) => value + (i === j ? 1 : 0)))
        const pairs = generalisedEigen(A, B)
        for (const [k, vector] of (pairs?.vectors ?? []).entries()) {
          const [left, right] = [times(A, vector), times(B, vector)]
          for (const [i, value] of left.entries())
            expect(Math.abs(value - (pairs?.values[k] as number) * (right[i] as number))).toBeLessThan(1e-12)
        }
        expect(pairs?.values).toHaveLength(A.length)
      }),
    )
  })

  test('of a pair are refused when the second is not positive definite', () => {
    expect(generalisedEigen([[1]], [[-1]])).toBeUndefined()
    expect(cholesky([[1, 2], [2, 1]])).toBeUndefined() // prettier-ignore
  })
})

describe('the number of negative eigenvalues', () => {
  test('is that of the eigenvalues themselves, as SciPy finds them', () => {
    for (const { matrix, values } of matrices)
      expect(negativeCount(matrix)).toBe(values.filter((value) => value < 0).length)
  })

  test('is kept by every change of coordinates, also by one over thirty orders of magnitude', () => {
    const exponent = fc.integer({ min: -15, max: 15 })
    fc.assert(
      fc.property(symmetric, fc.array(exponent, { minLength: 7, maxLength: 7 }), (A, powers) => {
        const { values } = eigen(A)
        fc.pre(values.every((value) => Math.abs(value) > 1e-6))
        const size = (i: number) => 10 ** (powers[i] as number)
        const scaled = A.map((row, i) => row.map((value, j) => value * size(i) * size(j)))
        expect(negativeCount(scaled)).toBe(values.filter((value) => value < 0).length)
      }),
    )
  })

  test.each([
    ['nothing', [], 0],
    ['zeros', [[0, 0], [0, 0]], 0], // prettier-ignore
    ['a zero diagonal', [[0, 1], [1, 0]], 1], // prettier-ignore
    ['one negative and a zero', [[-1, 0], [0, 0]], 1], // prettier-ignore
  ] as const)('of %s', (_name, A, count) => expect(negativeCount(A)).toBe(count))
})

describe('equations and scaling', () => {
  test('the solution of A x = b gives b back', () => {
    fc.assert(
      fc.property(symmetric, (A) => {
        const definite = product(transposed(A), A).map((row, i) => row.map((v, j) => v + (i === j ? 1 : 0)))
        const b = A.map((_, i) => i + 1)
        const x = solve(definite, b) as number[]
        for (const [i, value] of times(definite, x).entries()) expect(value).toBeCloseTo(b[i] as number, 8)
      }),
    )
  })

  test('a singular matrix has no solution', () => {
    expect(solve([[1, 2], [2, 4]], [1, 1])).toBeUndefined() // prettier-ignore
    expect(solve([[0]], [1])).toBeUndefined()
  })

  test('nothing that was given is changed', () => {
    const A = [[4, 1e9], [1e9, -3]] // prettier-ignore
    const before = structuredClone(A)
    eigen(A)
    negativeCount(A)
    equilibrate(A)
    solve(A, [1, 2])
    expect(A).toEqual(before)
  })

  test('rows and columns of a scaled matrix have entries of about one', () => {
    const { scaled } = equilibrate([[1e-20, 3], [3, 1e12]]) // prettier-ignore
    for (const row of scaled) expect(Math.abs(Math.log2(largest(row)))).toBeLessThan(2)
  })
})
