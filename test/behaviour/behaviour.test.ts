import { readdirSync, readFileSync } from 'node:fs'
import { describe, expect, test } from 'vitest'
import { withUsed } from '../../src/calculate/use-sheet.ts'
import { prepareSheet, type Prepared } from '../../src/pipeline.ts'
import { resolveProfile, type Profile } from '../../src/quantity/profile.ts'
import { show, showUtilisation } from '../../src/quantity/show.ts'

/*
 * Each Markdown file here says in prose how the language behaves. A `sheet` fence is the input (front matter is put before
 * it when it has none, so that its first line is line 5), and the `expect` fence after it says what must come out, a line
 * each, and nothing else of that sort:
 *
 *   name = value as printed       a value; true and false, texts and kinds of model are written as they are
 *   verdict pass                  the verdict of the sheet
 *   check title: 0.947 pass       a check with its utilisation
 *   7:12 rule: message            a finding; all findings of the sheet must be listed
 *   hint: text                    the hint of the finding before
 *   clean                         there are no findings
 */
const folder = new URL('.', import.meta.url).pathname
const HEAD = '---\nsheet: T-1\ntitle: Trial\n---\n'

for (const file of readdirSync(folder).filter((name) => name.endsWith('.md'))) {
  describe(file.replace('.md', ''), () => {
    for (const { title, input, expected } of examples(readFileSync(folder + file, 'utf8'))) {
      test(title, () => {
        const text = input.startsWith('---') ? input : HEAD + input
        const prepared = prepareSheet({ path: 'trial.md', text }, { cwd: folder })
        const lines = expected.split('\n').filter((line) => line.trim() !== '')
        expect(lines.length).toBeGreaterThan(0)
        expect(lines.map((line) => actual(line, prepared))).toEqual(lines)
        if (lines.some((line) => /^(\d|clean)/.test(line))) {
          const listed = lines.filter((line) => /^\d/.test(line)).length
          expect(listed, `findings: ${prepared.findings.map(String).join('\n')}`).toBe(
            prepared.findings.length,
          )
        }
      })
    }
  })
}

function examples(markdown: string): { title: string; input: string; expected: string }[] {
  const pattern = /^#+ (.+)$|^````sheet\n([\s\S]*?)^````\n+```expect\n([\s\S]*?)^```$/gm
  let title = ''
  let count = 0
  const found = []
  for (const [, heading, input, expected] of markdown.matchAll(pattern)) {
    if (heading !== undefined) {
      title = heading
      count = 0
    } else
      found.push({
        title: ++count > 1 ? `${title} (${count})` : title,
        input: input ?? '',
        expected: expected ?? '',
      })
  }
  return found
}

/** What the sheet has to say in answer to an expected line, in the same form. */
function actual(line: string, { findings, calculation, verdict }: Prepared): string {
  if (line.startsWith('verdict ')) return `verdict ${verdict}`
  if (line === 'clean') return findings.length === 0 ? 'clean' : findings.map(String).join('; ')
  const place = /^(\d+):(\d+) ([a-z-]+): /.exec(line)
  if (place) {
    const found = findings.find(
      (f) => `${f.line}:${f.column}` === `${place[1]}:${place[2]}` && f.ruleId === place[3],
    )
    return found
      ? `${place[0]}${found.reason}`
      : `not found among: ${findings.map((f) => `${f.line}:${f.column} ${f.ruleId}: ${f.reason}`).join('; ')}`
  }
  if (line.startsWith('hint: '))
    return findings.some((f) => `hint: ${f.note}` === line)
      ? line
      : findings.map((f) => `hint: ${f.note}`).join('; ')
  if (!calculation) return `not calculated: ${findings.map(String).join('; ')}`
  if (line.startsWith('check ')) {
    const checks = withUsed(calculation).flatMap(({ blocks }) =>
      blocks.flatMap((block) => block.lines.filter((l) => l.kind === 'check')),
    )
    const shown = checks.map(
      (c) =>
        `check ${c.title}: ${c.utilisation === undefined ? 'none' : showUtilisation(c.utilisation)} ${c.verdict}`,
    )
    return shown.find((text) => text === line) ?? shown.join('; ')
  }
  const name = line.slice(0, line.indexOf(' = ')).trim()
  const [first, second] = name.split('.') as [string, string?]
  const names =
    second === undefined ? calculation.names : calculation.usedSheets.get(first)?.calculation.names
  const named = names?.get(second ?? first)
  if (!named) return `${name} has no value: ${findings.map(String).join('; ')}`
  return `${name} = ${shownValue(named.value, named.unit, resolveProfile(calculation.sheet.meta.units) as Profile)}`
}

type Line = NonNullable<ReturnType<NonNullable<Prepared['calculation']>['names']['get']>>

function shownValue(value: Line['value'], unit: Line['unit'], profile: Profile): string {
  switch (value.type) {
    case 'quantity':
      return show(value, profile, unit ? { unit } : {}).text
    case 'text':
    case 'truth':
      return String(value.value)
    case 'array':
      return JSON.stringify(value.si)
    case 'model':
      return value.of
    case 'list':
      return `list of ${value.items.length}`
    case 'record':
      return value.title
    case 'function':
      return `${value.name}(${value.parameters.join(', ')})`
  }
}
