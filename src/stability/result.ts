/** How an iteration ended. */
export type Status = 'converged' | 'bad-bracket' | 'iteration-limit' | 'not-finite' | 'closed-form'

/** A result obtained a second time by an independent route. */
export interface SecondRoute {
  readonly route: string
  readonly value: number
  /** |second − first| / |first| */
  readonly difference: number
  /** The largest difference that is accepted. */
  readonly allowed: number
}

/** A number with how it was obtained. Plain SI. */
export interface SolverResult {
  readonly value: number
  readonly route: string
  readonly status: Status
  readonly iterations: number
  /** Relative: width of the final bracket, or what is left of the equation over its largest term. */
  readonly residual: number
  readonly bracket?: readonly [number, number]
  readonly second: SecondRoute
}

/** A structure that the method does not apply to, or an iteration without a result: what is the matter and one act to try. */
export class StabilityError extends Error {
  override readonly name = 'StabilityError'
  readonly hint: string
  readonly kind: 'input' | 'solver'

  constructor(message: string, hint: string, kind: 'input' | 'solver' = 'input') {
    super(message)
    this.hint = hint
    this.kind = kind
  }
}

/** Refuses what is not a finite number above zero. */
export function expectPositive(value: number, what: string): void {
  if (Number.isFinite(value) && value > 0) return
  throw new StabilityError(`${what} is ${value}, and must be above zero`, 'check its value and unit')
}

export function secondRoute(route: string, value: number, first: number, allowed: number): SecondRoute {
  return { route, value, difference: Math.abs(value - first) / Math.abs(first), allowed }
}
