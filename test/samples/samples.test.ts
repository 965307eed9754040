import { readdirSync, readFileSync } from 'node:fs'
import { fileURLToPath } from 'node:url'
import { describe, expect, it } from 'vitest'
import type { CheckLine } from '../../src/calculate/types.ts'
import { prepareSheet, type Prepared } from '../../src/pipeline.ts'
import { checksOf } from '../../src/verify/verify.ts'
import { expectWithin } from '../methods/use-method.ts'

const folder = fileURLToPath(new URL('../../samples/', import.meta.url))
const sheets = readdirSync(folder)
  .filter((file) => file.endsWith('.md'))
  .sort()

/** Recomputed from the same inputs by samples.py, beside the file. */
const recomputed = (
  JSON.parse(readFileSync(new URL('../published/samples.json', import.meta.url), 'utf8')) as {
    values: Record<string, Record<string, number>>
  }
).values

const prepared = new Map<string, Prepared>()

function sample(file: string): Prepared {
  const known = prepared.get(file) ?? prepareSheet({ path: file }, { cwd: folder })
  prepared.set(file, known)
  return known
}

function valueOf({ calculation }: Prepared, path: string): number {
  const [first = '', second] = path.split('.')
  const names =
    second === undefined ? calculation?.names : calculation?.usedSheets.get(first)?.calculation.names
  const value = names?.get(second ?? first)?.value
  if (value?.type !== 'quantity') throw new Error(`${path} has no value`)
  return value.si
}

describe('the sample package', () => {
  it('holds the basis and the four sheets that use it', () => {
    expect(sheets).toEqual([
      'design-basis.md',
      'folding-mast.md',
      'prop-column.md',
      'raking-shore.md',
      'steel-column-us.md',
    ])
    for (const file of sheets.filter((name) => name !== 'design-basis.md'))
      expect([file, sample(file).calculation?.usedSheets.get('basis')?.id]).toEqual([file, 'design-basis.md'])
  })

  it.each(sheets)('%s passes all its checks, with nothing amiss but the hold that is meant', (file) => {
    const { findings, verdict } = sample(file)
    expect(findings.map(({ ruleId, reason }) => `${ruleId}: ${reason}`)).toEqual(
      file === 'prop-column.md' ? [expect.stringContaining('hold-open') as string] : [],
    )
    expect(verdict).toBe('pass')
  })

  it.each(sheets)('%s states its purpose first, its project, its number and who made it', (file) => {
    const sheet = sample(file).calculation?.sheet
    const headings = [...(sheet?.text.matchAll(/^# (.+)$/gm) ?? [])].map(([, heading]) => heading)
    expect(headings[0]).toBe('Purpose and scope')
    expect(headings.at(-1)).toMatch(/^(Conclusion|Use by the other sheets)$/)
    expect(sheet?.meta.project).toBe('Tallow Yard basement')
    expect(sheet?.meta.sheet).toMatch(/^TW-1\d\d$/)
    expect(sheet?.meta.originator?.name).toMatch(/Example$/)
  })

  it('numbers its sheets apart', () => {
    const numbers = sheets.map((file) => sample(file).calculation?.sheet.meta.sheet)
    expect(new Set(numbers).size).toBe(sheets.length)
  })

  it.each(Object.keys(recomputed))('%s agrees with its recomputation by other routes', (name) => {
    const result = sample(`${name}.md`)
    for (const [path, expected] of Object.entries(recomputed[name] ?? {})) {
      const value =
        path === 'utilisation' ? (checkOn(result, 'k_yy').utilisation ?? NaN) : valueOf(result, path)
      expectWithin(path, value, expected, 1e-9)
    }
  })

  it('shows how far the second route of each critical load differs, and all agree', () => {
    for (const file of ['folding-mast.md', 'prop-column.md', 'raking-shore.md']) {
      const reports = [...(sample(file).calculation?.names.values() ?? [])].flatMap(({ reports }) => reports)
      expect(reports.length).toBeGreaterThan(0)
      for (const { question, second } of reports) {
        expect([question, second !== undefined]).toEqual([question, true])
        if (second) expect(second.difference).toBeLessThanOrEqual(second.allowed)
      }
    }
  })
})

function checkOn({ calculation }: Prepared, mentioned: string): CheckLine {
  const check =
    calculation && checksOf(calculation).find(({ statement }) => statement.text.includes(mentioned))
  if (check === undefined) throw new Error(`no check on ${mentioned}`)
  return check
}
