import type { ElementContent } from 'hast'
import type { VFileMessage } from 'vfile-message'
import type { Calculation, UsedSheet } from '../calculate/types.ts'
import type { Profile } from '../quantity/profile.ts'
import type { LineNumbers } from './line-numbers.ts'

/** What every part of one page shares. */
export interface Page {
  readonly profile: Profile
  readonly numbers: LineNumbers
  readonly forPdf: boolean
  /** What could not be printed as its author meant it; grows while the page is made. */
  readonly problems: VFileMessage[]
  /** The methods whose note on what is not verified is on the page already. */
  readonly cautioned: Set<string>
  /** Mathematics already set: a symbol stands on a page many times. */
  readonly set: Map<string, ElementContent[]>
}

/** The sheet whose lines are being printed: the page's own, or one used by it. */
export interface Scope {
  readonly page: Page
  readonly calculation: Calculation
  /** The sheet that uses it, and how. */
  readonly outer?: Scope
  readonly used?: UsedSheet
}

export const within = (outer: Scope, used: UsedSheet): Scope => ({
  page: outer.page,
  calculation: used.calculation,
  outer,
  used,
})
