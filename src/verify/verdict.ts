import type { VFileMessage } from 'vfile-message'
import type { Calculation, CheckLine } from '../calculate/types.ts'
import { checksOf } from './verify.ts'

/** `error`: something could not be calculated; `fail`: all is calculated and a check or limit does not hold; `pass`: all hold. */
export type SheetVerdict = 'pass' | 'fail' | 'error'

/** Rules that report a result that is there but does not satisfy: the sheet is calculated. */
const CALCULATED: readonly (string | null | undefined)[] = ['validity-failed']

export function verdictOf(
  calculation: Calculation | undefined,
  findings: readonly VFileMessage[],
): SheetVerdict {
  if (!calculation || findings.some(({ fatal, ruleId }) => fatal === true && !CALCULATED.includes(ruleId)))
    return 'error'
  return checksOf(calculation).every(({ verdict }) => verdict === 'pass') ? 'pass' : 'fail'
}

/** The acceptance check with the highest utilisation; a failed one without a utilisation comes first. Limits of validity do not govern. */
export function governingCheck(checks: readonly CheckLine[]): CheckLine | undefined {
  const weight = ({ utilisation, verdict }: CheckLine) =>
    utilisation ?? (verdict === 'fail' ? Infinity : -Infinity)
  return checks
    .filter(({ validity }) => !validity)
    .reduce<CheckLine | undefined>(
      (worst, check) => (worst && weight(worst) >= weight(check) ? worst : check),
      undefined,
    )
}
