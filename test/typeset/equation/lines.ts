import type { CheckLine, NamedLine } from '../../../src/calculate/types.ts'
import { prepareSheet } from '../../../src/pipeline.ts'
import { resolveProfile, type Profile } from '../../../src/quantity/profile.ts'
import { checkEquation, type CheckEquation } from '../../../src/typeset/equation/check-equation.ts'
import { equation, type Equation } from '../../../src/typeset/equation/equation.ts'

export const metric = resolveProfile('metric') as Profile

/** The lines of a sheet with these statements, all calculated. */
export function linesOf(
  given: string,
  working = '',
  check = '',
): { named: NamedLine[]; checks: CheckLine[] } {
  const block = (kind: string, body: string) => (body === '' ? '' : `\`\`\`${kind}\n${body}\n\`\`\`\n\n`)
  const text = `---\nsheet: T-1\ntitle: Test\n---\n\n${block('given', given)}${block('working', working)}${block('check', check)}`
  const { calculation, findings } = prepareSheet({ path: 'test.md', text })
  const error = findings.find(({ fatal }) => fatal === true)
  if (!calculation || error) throw new Error(error?.reason ?? 'the sheet was not calculated')
  const lines = calculation.blocks.flatMap((calculated) => calculated.lines)
  return {
    named: lines.filter((line): line is NamedLine => line.kind === 'named'),
    checks: lines.filter((line): line is CheckLine => line.kind === 'check'),
  }
}

/** The last line of a `working` block, printed on as wide a lane as it takes. */
export function printed(given: string, working: string, width = 200): Equation {
  const line = linesOf(given, working).named.at(-1)
  if (!line) throw new Error('no line')
  return equation(line, metric, { width })
}

/** The last check, printed. */
export function printedCheck(given: string, check: string, width = 200): CheckEquation {
  const line = linesOf(given, '', check).checks.at(-1)
  if (!line) throw new Error('no check')
  return checkEquation(line, metric, { width })
}
