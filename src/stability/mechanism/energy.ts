/** A structure with a few coordinates under one load, given by its total potential energy and its exact derivatives. Plain SI. */
export interface Energy {
  readonly coordinates: readonly string[]
  /** The size that each coordinate is measured by: 1 for an angle (rad). Above zero. */
  readonly scale: readonly number[]
  energy(q: readonly number[], load: number): number
  /** The partial derivative of the given order in each coordinate and in the load. */
  partial(orders: readonly number[], loadOrder: number): (q: readonly number[], load: number) => number
}

/** The energy's derivatives in scaled coordinates x = q/scale, so that angles and lengths can be held against each other. */
export class ScaledEnergy {
  readonly n: number
  private readonly source: Energy

  constructor(source: Energy) {
    this.source = source
    this.n = source.coordinates.length
  }

  get names(): readonly string[] {
    return this.source.coordinates
  }

  /** The coordinates themselves. */
  unscaled(x: readonly number[]): number[] {
    return x.map((value, i) => value * (this.source.scale[i] as number))
  }

  value(x: readonly number[], load: number): number {
    return this.source.energy(this.unscaled(x), load)
  }

  /** The derivative by the coordinates with the given indices, and `loadOrder` times by the load. */
  derivative(indices: readonly number[], loadOrder: number, x: readonly number[], load: number): number {
    const orders = new Array<number>(this.n).fill(0)
    let factor = 1
    for (const i of indices) {
      orders[i] = (orders[i] as number) + 1
      factor *= this.source.scale[i] as number
    }
    return factor * this.source.partial(orders, loadOrder)(this.unscaled(x), load)
  }

  gradient(x: readonly number[], load: number, loadOrder = 0): number[] {
    return Array.from({ length: this.n }, (_, i) => this.derivative([i], loadOrder, x, load))
  }

  hessian(x: readonly number[], load: number, loadOrder = 0): number[][] {
    const H = Array.from({ length: this.n }, () => new Array<number>(this.n).fill(0))
    for (let i = 0; i < this.n; i++) {
      for (let j = i; j < this.n; j++) {
        const value = this.derivative([i, j], loadOrder, x, load)
        ;(H[i] as number[])[j] = value
        ;(H[j] as number[])[i] = value
      }
    }
    return H
  }

  /** The form V,ijk a_i b_j · (a vector), from the third derivatives. */
  third(
    a: readonly number[],
    b: readonly number[],
    x: readonly number[],
    load: number,
    loadOrder = 0,
  ): number[] {
    return Array.from({ length: this.n }, (_, k) => {
      let sum = 0
      for (let i = 0; i < this.n; i++)
        for (let j = 0; j < this.n; j++)
          sum += this.derivative([i, j, k], loadOrder, x, load) * (a[i] as number) * (b[j] as number)
      return sum
    })
  }

  /** The form V,ijkl a_i a_j a_k a_l. */
  fourth(a: readonly number[], x: readonly number[], load: number): number {
    let sum = 0
    const indices = Array.from({ length: this.n }, (_, i) => i)
    for (const i of indices)
      for (const j of indices)
        for (const k of indices)
          for (const l of indices) {
            const weight = (a[i] as number) * (a[j] as number) * (a[k] as number) * (a[l] as number)
            if (weight !== 0) sum += weight * this.derivative([i, j, k, l], 0, x, load)
          }
    return sum
  }
}
