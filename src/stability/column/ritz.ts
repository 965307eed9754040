import { negativeCount } from '../inertia.ts'
import type { Column } from './ends.ts'
import { addProduct, freeMotions, springStiffness, type Motion } from './motions.ts'

/*
 * An energy method that shares nothing with the exact member but the springs: the deflected shape is a polynomial, made of
 * the four end motions (two cubics, two straight lines) and of bubbles whose curvatures are Legendre polynomials. Its critical loads are
 * upper bounds (Rayleigh and Ritz), and converge faster than any power of the degree.
 */

/** Points and weights of Gauss–Legendre quadrature on [−1, 1], by Newton's method on the Legendre polynomial. */
function gauss(n: number): { x: number; w: number }[] {
  return Array.from({ length: n }, (_, i) => {
    let x = Math.cos((Math.PI * (i + 0.75)) / (n + 0.5))
    let slope = 0
    for (let iteration = 0; iteration < 50; iteration++) {
      const p = legendre(n, x)
      slope = (n * (x * (p[n] as number) - (p[n - 1] as number))) / (x * x - 1)
      const dx = (p[n] as number) / slope
      x -= dx
      if (Math.abs(dx) < 1e-16) break
    }
    return { x, w: 2 / ((1 - x * x) * slope * slope) }
  })
}

/** P0 … Pn at x. */
function legendre(n: number, x: number): number[] {
  const p = [1, x]
  for (let k = 1; k < n; k++)
    p.push(((2 * k + 1) * x * (p[k] as number) - k * (p[k - 1] as number)) / (k + 1))
  return p
}

/** First and second derivatives by s = x/L of the shapes, at ξ = 2s − 1: the four end motions, then the bubbles. */
function shapes(xi: number, bubbles: number): { slope: number[]; curvature: number[] } {
  const s = (xi + 1) / 2
  const slope = [1 - 6 * s + 6 * s * s, 1 - 2 * s, 1, 0]
  const curvature = [-6 + 12 * s, -2, 0, 0]
  const p = legendre(bubbles + 3, xi)
  for (let j = 2; j < bubbles + 2; j++) {
    // A curvature P_j is orthogonal to 1 and ξ, so its first and second integrals from the base vanish at both ends.
    slope.push(((p[j + 1] as number) - (p[j - 1] as number)) / (2 * (2 * j + 1)))
    curvature.push(p[j] as number)
  }
  return { slope, curvature }
}

/**
 * The energy of bending with the springs, and that of the end load by unit load, of the free motions followed by bubbles:
 * dimensionless, full matrices.
 */
function energies(column: Column, bubbles: number): { K: number[][]; G: number[][] } {
  const motions = freeMotions(column)
  const size = motions.length + bubbles
  const square = () => Array.from({ length: size }, () => new Array<number>(size).fill(0))
  const [K, G] = [square(), square()]
  for (const { x, w } of gauss(bubbles + 4)) {
    const { slope, curvature } = shapes(x, bubbles)
    addProduct(K, w / 2, seenBy(motions, curvature))
    addProduct(G, w / 2, seenBy(motions, slope))
  }
  for (const [i, row] of springStiffness(column, motions).entries())
    for (const [j, value] of row.entries()) (K[i] as number[])[j] = ((K[i] as number[])[j] as number) + value
  return { K, G }
}

/** The four end motions' values combined to the free motions, the bubbles' kept. */
const seenBy = (motions: readonly Motion[], values: readonly number[]) => [
  ...motions.map((motion) => motion.reduce((sum, part, i) => sum + part * (values[i] as number), 0)),
  ...values.slice(4),
]

/** Below this relative width of its bracket a load is found. */
const WIDTH = 1e-11

/**
 * The n-th critical load as P L²/(EI): the energy K − P G has n − 1 negative eigenvalues below it and n above. An upper
 * bound; undefined when the column has no n-th.
 */
export function ritzLoad(column: Column, n: number): number | undefined {
  const { K, G } = energies(column, 14 + 2 * n)
  const below = (load: number) =>
    negativeCount(K.map((row, i) => row.map((value, j) => value - load * ((G[i] as number[])[j] as number))))
  let [low, high] = [1, 1]
  for (let i = 0; below(low) >= n; i++, low /= 16) if (i > 200) return undefined
  for (let i = 0; below(high) < n; i++, high *= 2) if (i > 200) return undefined
  for (let i = 0; (high - low) / high > WIDTH && i < 200; i++) {
    const middle = low > high / 4 ? (low + high) / 2 : Math.sqrt(low) * Math.sqrt(high)
    if (below(middle) >= n) high = middle
    else low = middle
  }
  return (low + high) / 2
}
