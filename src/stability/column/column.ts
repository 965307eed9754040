import { expectPositive, secondRoute, StabilityError, type SolverResult } from '../result.ts'
import { expectHeld, type Column } from './ends.ts'
import { countBelow } from './exact.ts'
import { ritzLoad } from './ritz.ts'

/** The bracket is halved until it is no wider than this, relatively. */
const WIDTH = 4e-16
const MAX_HALVINGS = 400
/** The largest relative difference between the two routes that is accepted. */
const ALLOWED = 1e-8
/** The highest mode that is asked for in earnest; beyond it the second route would need many more terms. */
const MAX_MODE = 20

/**
 * The n-th elastic critical load of a uniform column under a vertical load at its top. First route: the exact member
 * (stability functions), its critical loads counted by Wittrick and Williams and bracketed by halving, so that none is
 * missed and the relative error is of the order of machine precision. Second route: Rayleigh–Ritz with polynomials.
 *
 * @param column lengths in m, EI in N·m², springs in N·m/rad and N/m
 * @param n 1 for the lowest
 * @returns N
 * @throws StabilityError for impossible data and for a column that is a mechanism
 */
export function columnCriticalLoad(column: Column, n = 1): SolverResult {
  const { L, EI } = column
  expectPositive(L, 'the length of the column')
  expectPositive(EI, 'the flexural rigidity')
  expectHeld(column)
  if (!Number.isInteger(n) || n < 1 || n > MAX_MODE) {
    throw new StabilityError(
      `critical load number ${n} was asked for`,
      `use a whole number from 1 to ${MAX_MODE}`,
    )
  }
  let [low, high] = [1e-3, 3]
  let iterations = 0
  while (countBelow(column, high) < n && iterations++ < MAX_HALVINGS) high *= 1.5
  while (countBelow(column, low) >= n && iterations++ < MAX_HALVINGS) low /= 10
  for (; (high - low) / high > WIDTH && iterations < MAX_HALVINGS; iterations++) {
    const middle = low > 0.1 * high ? (low + high) / 2 : Math.sqrt(low * high)
    if (middle <= low || middle >= high) break
    if (countBelow(column, middle) >= n) high = middle
    else low = middle
  }
  const load = (h: number) => (4 * h * h * EI) / (L * L)
  const value = load((low + high) / 2)
  const residual = (high - low) / high
  if (!(Number.isFinite(value) && value > 0 && residual <= 1e-12)) {
    throw new StabilityError(
      `the critical load could not be bracketed (width ${residual} after ${iterations} steps)`,
      'check the column’s data for badly scaled stiffness',
      'solver',
    )
  }
  const ritz = ((ritzLoad(column, n) ?? NaN) * EI) / (L * L)
  return {
    value,
    route: 'exact member, eigenvalues counted',
    status: 'converged',
    iterations,
    residual,
    bracket: [load(low), load(high)],
    second: secondRoute('Rayleigh–Ritz with polynomials', ritz, value, ALLOWED),
  }
}

/** The length of the pinned column with the same critical load, m: sqrt(π² EI / N_cr). */
export function columnEffectiveLength(column: Column, n = 1): SolverResult {
  const result = columnCriticalLoad(column, n)
  const length = (load: number) => Math.PI * Math.sqrt(column.EI / load)
  const [low, high] = result.bracket as [number, number]
  const { second } = result
  return {
    ...result,
    value: length(result.value),
    bracket: [length(high), length(low)],
    second: secondRoute(second.route, length(second.value), length(result.value), second.allowed),
  }
}
