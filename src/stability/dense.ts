/**
 * Linear algebra for the small, full, symmetric matrices of mechanisms and single members (up to some tens of rows).
 * Matrices are arrays of rows; nothing is changed that was given.
 */
export type Matrix = readonly (readonly number[])[]

export interface Eigen {
  /** Ascending. */
  readonly values: number[]
  /** One vector a value, of unit length. */
  readonly vectors: number[][]
}

export function zeros(n: number): number[][] {
  return Array.from({ length: n }, () => new Array<number>(n).fill(0))
}

export function dot(a: readonly number[], b: readonly number[]): number {
  let sum = 0
  for (let i = 0; i < a.length; i++) sum += (a[i] as number) * (b[i] as number)
  return sum
}

export function times(A: Matrix, x: readonly number[]): number[] {
  return A.map((row) => dot(row, x))
}

/** The largest magnitude in a matrix or vector. */
export function largest(A: Matrix | readonly number[]): number {
  let max = 0
  for (const row of A) for (const a of typeof row === 'number' ? [row] : row) max = Math.max(max, Math.abs(a))
  return max
}

/**
 * All eigenvalues and vectors of a symmetric matrix by cyclic Jacobi rotations (Golub and Van Loan, Matrix Computations,
 * 8.5): accurate to about machine precision times the largest eigenvalue.
 */
export function eigen(symmetric: Matrix): Eigen {
  const n = symmetric.length
  const A = symmetric.map((row) => [...row])
  const V = zeros(n).map((row, i) => row.map((_, j) => (i === j ? 1 : 0)))
  for (let sweep = 0; sweep < 100; sweep++) {
    let off = 0
    for (let p = 0; p < n; p++) for (let q = p + 1; q < n; q++) off = Math.max(off, Math.abs(at(A, p, q)))
    if (!(off > 1e-300)) break
    let rotated = false
    for (let p = 0; p < n; p++) for (let q = p + 1; q < n; q++) rotated = rotate(A, V, p, q) || rotated
    if (!rotated) break
  }
  const order = Array.from({ length: n }, (_, i) => i).sort((a, b) => at(A, a, a) - at(A, b, b))
  return {
    values: order.map((i) => at(A, i, i)),
    vectors: order.map((i) => V.map((row) => row[i] as number)),
  }
}

/** One Jacobi rotation; false when the entry is already negligible beside both diagonals. */
function rotate(A: number[][], V: number[][], p: number, q: number): boolean {
  const apq = at(A, p, q)
  const app = at(A, p, p)
  const aqq = at(A, q, q)
  if (Math.abs(apq) <= 1e-17 * Math.sqrt(Math.abs(app * aqq)) || apq === 0) return false
  const theta = (aqq - app) / (2 * apq)
  const t = (theta >= 0 ? 1 : -1) / (Math.abs(theta) + Math.hypot(theta, 1))
  const c = 1 / Math.hypot(t, 1)
  const s = t * c
  for (let k = 0; k < A.length; k++) {
    const [akp, akq] = [at(A, k, p), at(A, k, q)]
    set(A, k, p, c * akp - s * akq)
    set(A, k, q, s * akp + c * akq)
  }
  for (let k = 0; k < A.length; k++) {
    const [apk, aqk] = [at(A, p, k), at(A, q, k)]
    set(A, p, k, c * apk - s * aqk)
    set(A, q, k, s * apk + c * aqk)
    const [vkp, vkq] = [at(V, k, p), at(V, k, q)]
    set(V, k, p, c * vkp - s * vkq)
    set(V, k, q, s * vkp + c * vkq)
  }
  set(A, p, q, 0)
  set(A, q, p, 0)
  return Math.abs(t) > 1e-17
}

const at = (A: Matrix, i: number, j: number): number => (A[i] as readonly number[])[j] as number
const set = (A: number[][], i: number, j: number, value: number): void => void ((A[i] as number[])[j] = value)

/** The lower Cholesky factor, or undefined when the matrix is not positive definite. */
export function cholesky(A: Matrix): number[][] | undefined {
  const n = A.length
  const L = zeros(n)
  for (let j = 0; j < n; j++) {
    for (let i = j; i < n; i++) {
      let sum = at(A, i, j)
      for (let k = 0; k < j; k++) sum -= at(L, i, k) * at(L, j, k)
      if (i === j) {
        if (!(sum > 0)) return undefined
        set(L, j, j, Math.sqrt(sum))
      } else set(L, i, j, sum / at(L, j, j))
    }
  }
  return L
}

/** Solves L y = b. */
function forward(L: Matrix, b: readonly number[]): number[] {
  const y: number[] = []
  for (let i = 0; i < b.length; i++) {
    let sum = b[i] as number
    for (let k = 0; k < i; k++) sum -= at(L, i, k) * (y[k] as number)
    y.push(sum / at(L, i, i))
  }
  return y
}

/** Solves Lᵀ x = y. */
function backward(L: Matrix, y: readonly number[]): number[] {
  const x = [...y]
  for (let i = y.length - 1; i >= 0; i--) {
    let sum = x[i] as number
    for (let k = i + 1; k < y.length; k++) sum -= at(L, k, i) * (x[k] as number)
    x[i] = sum / at(L, i, i)
  }
  return x
}

/**
 * Solves A x = μ B x for symmetric A and positive definite B, all eigenvalues ascending.
 *
 * @returns undefined when B is not positive definite
 */
export function generalisedEigen(A: Matrix, B: Matrix): Eigen | undefined {
  const L = cholesky(B)
  if (!L) return undefined
  const n = A.length
  const left = Array.from({ length: n }, (_, j) =>
    forward(
      L,
      A.map((row) => row[j] as number),
    ),
  )
  const C = Array.from({ length: n }, (_, i) =>
    forward(
      L,
      left.map((column) => column[i] as number),
    ),
  )
  const symmetric = C.map((row, i) => row.map((value, j) => (value + at(C, j, i)) / 2))
  const { values, vectors } = eigen(symmetric)
  return { values, vectors: vectors.map((vector) => backward(L, vector)) }
}

/** Solves A x = b by Gaussian elimination with row pivoting; undefined when A is singular to machine precision. */
export function solve(A: Matrix, b: readonly number[]): number[] | undefined {
  const n = b.length
  const rows = A.map((row, i) => [...row, b[i] as number])
  const scale = largest(A)
  for (let j = 0; j < n; j++) {
    let pivot = j
    for (let i = j + 1; i < n; i++) if (Math.abs(at(rows, i, j)) > Math.abs(at(rows, pivot, j))) pivot = i
    if (!(Math.abs(at(rows, pivot, j)) > 1e-15 * scale)) return undefined
    const [a, c] = [rows[j] as number[], rows[pivot] as number[]]
    rows[j] = c
    rows[pivot] = a
    for (let i = j + 1; i < n; i++) {
      const factor = at(rows, i, j) / at(rows, j, j)
      if (factor !== 0) for (let k = j; k <= n; k++) set(rows, i, k, at(rows, i, k) - factor * at(rows, j, k))
    }
  }
  const x = new Array<number>(n).fill(0)
  for (let i = n - 1; i >= 0; i--) {
    let sum = at(rows, i, n)
    for (let k = i + 1; k < n; k++) sum -= at(rows, i, k) * (x[k] as number)
    x[i] = sum / at(rows, i, i)
  }
  return x.every(Number.isFinite) ? x : undefined
}
