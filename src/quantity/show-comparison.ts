import { displayUnit, type Profile } from './profile.ts'
import { show, type Quantified, type ShowOptions, type Shown } from './show.ts'

const FIGURES = 4
/** Beyond these the digits are noise of the arithmetic, and the two are told apart by the verdict alone. */
const MOST_FIGURES = 14

/**
 * The two sides of a check, ready to stand side by side: in one unit (that of the larger, or the one asked for) and with as
 * many figures as it takes to see which is larger, so that 285.04 kN against 285 kN is not printed as 285.0 ≤ 285.
 */
export function showComparison(
  demand: Quantified,
  capacity: Quantified,
  profile: Profile,
  options: Omit<ShowOptions, 'asTyped' | 'figures'> = {},
): readonly [demand: Shown, capacity: Shown] {
  const larger = Math.abs(demand.si) > Math.abs(capacity.si) ? demand : capacity
  const unit = options.unit ?? displayUnit(larger, profile, options.kind)
  const at = (figures: number | undefined) =>
    [show(demand, profile, { unit, figures }), show(capacity, profile, { unit, figures })] as const
  let pair = at(undefined)
  for (let figures = FIGURES + 1; figures <= MOST_FIGURES && looksEqual(pair, demand, capacity); figures++) {
    pair = at(figures)
  }
  return pair
}

function looksEqual([a, b]: readonly [Shown, Shown], demand: Quantified, capacity: Quantified): boolean {
  return (
    demand.si !== capacity.si &&
    a.exponent === b.exponent &&
    withoutEndZeros(a.number) === withoutEndZeros(b.number)
  )
}

function withoutEndZeros(number: string): string {
  return number.includes('.') ? number.replace(/\.?0+$/, '') : number
}
