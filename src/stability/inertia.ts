import type { Matrix } from './dense.ts'

/**
 * The number of negative eigenvalues of a symmetric matrix, from the signs in L D Lᵀ (Sylvester's law of inertia) with the
 * complete pivoting of Bunch and Parlett (SIAM Journal on Numerical Analysis 8, 1971). Rows and columns are first scaled
 * to a common size, which leaves the signs as they are and lets stiffnesses of very unlike size stand in one matrix.
 */
export function negativeCount(symmetric: Matrix): number {
  const A = equilibrate(symmetric).scaled
  const n = A.length
  let negative = 0
  for (let k = 0; k < n;) {
    const [p, q] = largestEntry(A, k)
    if (at(A, p, q) === 0) break
    exchange(A, k, p)
    if (p === q) {
      const pivot = at(A, k, k)
      if (pivot < 0) negative++
      for (let i = k + 1; i < n; i++) subtract(A, i, k + 1, k, at(A, i, k) / pivot)
      k += 1
    } else {
      // A block of two with a negative determinant: one eigenvalue of each sign.
      exchange(A, k + 1, q)
      negative++
      const [a, b, c] = [at(A, k, k), at(A, k, k + 1), at(A, k + 1, k + 1)]
      const determinant = a * c - b * b
      const pairs = A.map((row) => [row[k] as number, row[k + 1] as number] as const)
      for (let i = k + 2; i < n; i++) {
        const [x, y] = pairs[i] as readonly [number, number]
        subtract(A, i, k + 2, k, (c * x - b * y) / determinant)
        subtract(A, i, k + 2, k + 1, (a * y - b * x) / determinant)
      }
      k += 2
    }
  }
  return negative
}

/** Subtracts `factor` times row `from` from row i, from column `start` on. */
function subtract(A: number[][], i: number, start: number, from: number, factor: number): void {
  if (factor === 0) return
  const [row, pivot] = [A[i] as number[], A[from] as number[]]
  for (let j = start; j < row.length; j++) row[j] = (row[j] as number) - factor * (pivot[j] as number)
}

/** The place of the pivot at or beyond row k: the largest diagonal entry unless an entry beside the diagonal is much larger. */
function largestEntry(A: Matrix, k: number): [number, number] {
  let [p, r, q] = [k, k, k]
  let [onDiagonal, beside] = [-1, -1]
  for (let i = k; i < A.length; i++) {
    const row = A[i] as readonly number[]
    const d = Math.abs(row[i] as number)
    if (d > onDiagonal) [onDiagonal, p] = [d, i]
    for (let j = k; j < i; j++) {
      const value = Math.abs(row[j] as number)
      if (value > beside) [beside, r, q] = [value, j, i]
    }
  }
  return onDiagonal >= ((1 + Math.sqrt(17)) / 8) * beside ? [p, p] : [r, q]
}

function exchange(A: number[][], i: number, j: number): void {
  if (i === j) return
  const [a, b] = [A[i] as number[], A[j] as number[]]
  A[i] = b
  A[j] = a
  for (const row of A) {
    const kept = row[i] as number
    row[i] = row[j] as number
    row[j] = kept
  }
}

/**
 * A matrix with its rows and columns scaled until the largest entry of each that is not zero is about 1 (Ruiz, Rutherford
 * Appleton Laboratory report RAL-TR-2001-034); a symmetric one stays symmetric. Column j was multiplied by `columns[j]`.
 */
export function equilibrate(A: Matrix): { scaled: number[][]; columns: number[] } {
  const scaled = A.map((row) => [...row])
  const columns = A.map(() => 1)
  for (let pass = 0; pass < 8; pass++) {
    const down = scaled.map(() => 0)
    const across = scaled.map(() => 0)
    for (const [i, row] of scaled.entries())
      for (let j = 0; j < row.length; j++) {
        const size = Math.abs(row[j] as number)
        if (size > (down[i] as number)) down[i] = size
        if (size > (across[j] as number)) across[j] = size
      }
    if (down.every(isAboutOne) && across.every(isAboutOne)) break
    const factors = across.map((size) => 1 / Math.sqrt(size || 1))
    for (const [i, row] of scaled.entries()) {
      const factor = 1 / Math.sqrt((down[i] as number) || 1)
      for (let j = 0; j < row.length; j++) row[j] = (row[j] as number) * factor * (factors[j] as number)
    }
    factors.forEach((factor, j) => (columns[j] = (columns[j] as number) * factor))
  }
  return { scaled, columns }
}

const isAboutOne = (size: number) => (size > 0.5 && size < 2) || size === 0

const at = (A: Matrix, i: number, j: number): number => (A[i] as readonly number[])[j] as number
