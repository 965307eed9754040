/** A unit as written after a number: `kN*m/rad` is [{kN, 1}, {m, 1}, {rad, -1}]; empty for a plain number. */
export type UnitExpression = readonly { readonly unit: string; readonly exponent: number }[]
