import type { CheckLine } from '../../calculate/types.ts'
import type { Prepared } from '../../pipeline.ts'
import type { Profile } from '../../quantity/profile.ts'
import { showComparison } from '../../quantity/show-comparison.ts'
import { showUtilisation } from '../../quantity/show.ts'
import { calculationJson } from '../../record/calculation-json.ts'
import { profileOf } from '../../record/profile-of.ts'
import { stableJson } from '../../record/stable-json.ts'
import { governingCheck } from '../../verify/verdict.ts'
import { checksOf } from '../../verify/verify.ts'
import { cleanText } from '../clean-text.ts'
import { columns } from '../columns.ts'
import type { ExitStatus, Io, Options } from '../command.ts'
import { failedAt } from '../internal-error.ts'
import { exitStatus, prepareAll, reportFindings, worst } from '../sheets.ts'

export async function run(args: readonly string[], options: Options, io: Io): Promise<ExitStatus> {
  const prepared: Prepared[] = []
  const objects: ReturnType<typeof calculationJson>[] = []
  for await (const given of prepareAll(args, io)) {
    let sheet = given
    try {
      if (options['json']) objects.push(calculationJson(sheet))
      else io.out(reportText(sheet))
    } catch (cause) {
      sheet = failedAt(sheet, cause)
      if (options['json']) objects.push(calculationJson(withoutCalculation(sheet)))
    }
    prepared.push(sheet)
  }
  const [only, ...others] = objects
  if (only) io.out(stableJson(others.length === 0 ? only : objects))
  reportFindings(prepared, io, options['debug'] === true)
  return worst(prepared.map(exitStatus))
}

function withoutCalculation({ path, findings, verdict }: Prepared): Omit<Prepared, 'texts'> {
  return { path, findings, verdict }
}

const VERDICTS = {
  pass: 'every check passes',
  fail: 'a check does not pass',
  error: 'not calculated',
} as const

const NO_CHECKS = 'calculated; there is no check'

/** The sheet's name, a row for each check with the governing one marked, and the verdict in words. */
function reportText({ path, calculation, verdict }: Prepared): string {
  if (!calculation) return cleanText(`${path}\n  ${VERDICTS[verdict]}\n\n`)
  const { meta } = calculation.sheet
  const checks = checksOf(calculation)
  const profile = profileOf(calculation)
  const governing = governingCheck(checks)
  const table = columns(checks.map((line) => checkRow(line, line === governing, profile)))
  const words = verdict === 'pass' && checks.length === 0 ? NO_CHECKS : VERDICTS[verdict]
  const lines = [...table, `${words}${governing ? '  (* governs)' : ''}`]
  return cleanText(`${meta.sheet}  ${meta.title}\n${lines.map((line) => `  ${line}\n`).join('')}\n`)
}

function checkRow(line: CheckLine, governs: boolean, profile: Profile): string[] {
  const [demand, capacity] = showComparison(line.demand, line.capacity, profile)
  const utilisation = line.utilisation === undefined ? '–' : showUtilisation(line.utilisation)
  return [
    governs ? '*' : '',
    line.title,
    demand.text,
    relationFound(line),
    capacity.text,
    line.validity ? 'limit of use' : utilisation,
    line.verdict === 'pass' ? 'OK' : 'NOT OK',
  ]
}

/** How demand and capacity do stand to each other: the relation asked for, or its opposite. */
function relationFound({ statement, verdict }: CheckLine): string {
  const strict = statement.relation.length === 1
  if (verdict === 'pass') return strict ? '<' : '<='
  return strict ? '>=' : '>'
}
