import type { CheckLine } from '../../calculate/types.ts'
import type { Prepared } from '../../pipeline.ts'
import { showComparison } from '../../quantity/show-comparison.ts'
import { showUtilisation } from '../../quantity/show.ts'
import { calculationJson } from '../../record/calculation-json.ts'
import { profileOf } from '../../record/profile-of.ts'
import { stableJson } from '../../record/stable-json.ts'
import { governingCheck } from '../../verify/verdict.ts'
import { checksOf } from '../../verify/verify.ts'
import { cleanText } from '../clean-text.ts'
import type { Command } from '../command.ts'
import { exitStatus, prepareAll, reportFindings, worst } from '../sheets.ts'
import { columns } from '../columns.ts'

export const check: Command = {
  name: 'check',
  args: '<sheet...>',
  summary: 'calculate sheets and report verdicts and findings; write nothing',
  details:
    'Prints a table of all checks of each sheet, with utilisations, the governing one marked, and the findings. `-` reads a sheet from standard input.',
  flags: [
    {
      flags: '--json',
      summary: 'print the calculation as JSON (one object, or an array for several sheets)',
    },
  ],
  async run(args, options, io) {
    const prepared: Prepared[] = []
    for await (const sheet of prepareAll(args, io)) {
      prepared.push(sheet)
      if (!options['json']) io.out(reportText(sheet))
    }
    if (options['json']) {
      const all = prepared.map(calculationJson)
      io.out(stableJson((all.length === 1 ? all[0] : all) as never))
    }
    reportFindings(prepared, io, options['debug'] === true)
    return worst(prepared.map(exitStatus))
  },
}

const VERDICTS = {
  pass: 'every check passes',
  fail: 'a check does not pass',
  error: 'not calculated',
} as const

const NO_CHECKS = 'calculated; there is no check'

function reportText({ path, calculation, verdict }: Prepared): string {
  const title = calculation ? `${calculation.sheet.meta.sheet}  ${calculation.sheet.meta.title}` : path
  const checks = calculation ? checksOf(calculation) : []
  const profile = calculation && profileOf(calculation)
  const governing = governingCheck(checks)
  const row = (line: CheckLine): string[] => {
    if (!profile) return []
    const [demand, capacity] = showComparison(line.demand, line.capacity, profile)
    const ratio = line.utilisation === undefined ? '–' : showUtilisation(line.utilisation)
    const kind = line.validity ? 'limit of use' : ratio
    return [
      line === governing ? '*' : '',
      line.title,
      demand.text,
      line.verdict === 'pass' ? '<=' : 'over',
      capacity.text,
      kind,
      line.verdict === 'pass' ? 'OK' : 'NOT OK',
    ]
  }
  const table = columns(checks.map(row))
  const mark = governing ? '  (* governs)' : ''
  return cleanText(
    `${title}\n${table.map((line) => `  ${line}\n`).join('')}  ${verdict === 'pass' && checks.length === 0 ? NO_CHECKS : VERDICTS[verdict]}${mark}\n\n`,
  )
}
