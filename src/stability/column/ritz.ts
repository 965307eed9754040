import { generalisedEigen } from '../dense.ts'
import { freeMotions, reduce, springStiffness, type Column } from './ends.ts'

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

/** The n lowest critical loads as P L²/(EI), ascending; fewer when the column has fewer. Upper bounds. */
export function ritzLoads(column: Column, n: number): number[] {
  const bubbles = 14 + 4 * n
  const size = bubbles + 4
  const K = Array.from({ length: size }, () => new Array<number>(size).fill(0))
  const G = Array.from({ length: size }, () => new Array<number>(size).fill(0))
  for (const { x, w } of gauss(bubbles + 4)) {
    const { slope, curvature } = shapes(x, bubbles)
    for (let i = 0; i < size; i++) {
      const [k, g] = [K[i] as number[], G[i] as number[]]
      for (let j = 0; j < size; j++) {
        k[j] = (k[j] as number) + (w / 2) * (curvature[i] as number) * (curvature[j] as number)
        g[j] = (g[j] as number) + (w / 2) * (slope[i] as number) * (slope[j] as number)
      }
    }
  }
  springStiffness(column).forEach((row, i) =>
    row.forEach((value, j) => ((K[i] as number[])[j] = ((K[i] as number[])[j] as number) + value)),
  )
  const unit = (i: number) => Array.from({ length: size }, (_, j) => (i === j ? 1 : 0))
  const motions = [
    ...freeMotions(column).map((motion) => [...motion, ...new Array<number>(bubbles).fill(0)]),
    ...Array.from({ length: bubbles }, (_, j) => unit(4 + j)),
  ]
  const inverse = generalisedEigen(reduce(G, motions), reduce(K, motions))
  if (!inverse) return []
  return inverse.values
    .filter((value) => value > 0)
    .reverse()
    .slice(0, n)
    .map((value) => 1 / value)
}
