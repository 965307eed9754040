import type { Prepared } from '../../pipeline.ts'
import { valuesText } from '../../record/values-text.ts'
import { cleanText } from '../clean-text.ts'
import type { Command } from '../command.ts'
import { exitStatus, prepareAll, reportFindings, worst } from '../sheets.ts'

export const values: Command = {
  name: 'values',
  args: '<sheet...>',
  summary: 'print one stable line a value, for version control’s text conversion',
  details:
    'With `git config diff.stanchion.textconv "npx stanchion values"` and `*.md diff=stanchion` in `.gitattributes`, `git diff` compares values instead of text.',
  flags: [],
  async run(args, options, io) {
    const prepared: Prepared[] = []
    for await (const sheet of prepareAll(args, io)) {
      prepared.push(sheet)
      if (sheet.calculation) io.out(cleanText(valuesText(sheet.calculation)))
    }
    reportFindings(prepared, io, options['debug'] === true)
    return worst(prepared.map(exitStatus))
  },
}
