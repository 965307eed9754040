import type { Calculation, CheckLine, UsedSheet } from '../calculate/types.ts'
import { governingCheck } from '../verify/verdict.ts'

/** The checks of a sheet, sorted by what they say of it. */
export interface PageChecks {
  /** Acceptance of the design, in document order, with those of full used sheets. */
  readonly own: readonly CheckLine[]
  /** Checks that another sheet of the project makes of itself. */
  readonly others: readonly { readonly sheet: string; readonly check: CheckLine }[]
  /** Limits of use, of the sheet itself and of the methods it uses. */
  readonly limits: readonly { readonly method: string; readonly check: CheckLine }[]
  readonly governing: CheckLine | undefined
}

export function checksOfPage(calculation: Calculation): PageChecks {
  const direct = checksIn(calculation)
  const own = direct.filter(({ validity }) => !validity)
  const used = usedBy(calculation)
  const others = used.flatMap(({ calculation: inner }) =>
    checksIn(inner)
      .filter(({ validity }) => !validity)
      .map((check) => ({ sheet: inner.sheet.meta.sheet, check })),
  )
  const limits = [
    ...direct.filter(({ validity }) => validity).map((check) => ({ method: 'this sheet', check })),
    ...used.flatMap(({ as, calculation: inner }) =>
      checksIn(inner)
        .filter(({ validity }) => validity)
        .map((check) => ({ method: `${inner.sheet.meta.sheet}, used as ${as}`, check })),
    ),
  ]
  // A failed check governs wherever it stands; else the sheet's own checks say how far its design is used.
  const failed = others.map(({ check }) => check).filter(({ verdict }) => verdict === 'fail')
  return { own, others, limits, governing: governingCheck([...own, ...failed]) }
}

export const failedChecks = ({ own, others, limits }: PageChecks): readonly CheckLine[] =>
  [...own, ...others.map(({ check }) => check), ...limits.map(({ check }) => check)].filter(
    ({ verdict }) => verdict === 'fail',
  )

function checksIn({ blocks }: Calculation): CheckLine[] {
  return blocks.flatMap(({ lines, block }) =>
    block.kind === 'check' ? lines.filter((line): line is CheckLine => line.kind === 'check') : [],
  )
}

/** Every sheet used, and those used by them, in document order. */
export function usedBy({ usedSheets }: Calculation): UsedSheet[] {
  return [...usedSheets.values()].flatMap((used) => [used, ...usedBy(used.calculation)])
}
