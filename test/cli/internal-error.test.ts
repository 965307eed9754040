import { existsSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, test, vi } from 'vitest'
import type * as Pipeline from '../../src/pipeline.ts'
import type * as Digest from '../../src/record/digest.ts'
import type * as Typeset from '../../src/typeset/typeset.ts'
import { runCli } from './run-cli.ts'

/** The program made to fail at one sheet, at one stage. */
vi.mock('../../src/pipeline.ts', async (original) => {
  const real = await original<typeof Pipeline>()
  const prepareSheet: typeof real.prepareSheet = (source, options) => {
    if (source.path === 'broken.md') throw new Error('a fault\u001b[2J in the pipeline')
    return real.prepareSheet(source, options)
  }
  return { ...real, prepareSheet }
})
vi.mock('../../src/typeset/typeset.ts', async (original) => {
  const real = await original<typeof Typeset>()
  const typeset: typeof real.typeset = (calculation, options) => {
    if (calculation.sheet.path === 'unprintable.md') throw new Error('a fault in typesetting')
    return real.typeset(calculation, options)
  }
  return { ...real, typeset }
})
vi.mock('../../src/record/digest.ts', async (original) => {
  const real = await original<typeof Digest>()
  const digestOf: typeof real.digestOf = (calculation) => {
    if (calculation.sheet.path === 'unrecorded.md') throw new Error('a fault in the record')
    return real.digestOf(calculation)
  }
  return { ...real, digestOf }
})

let folder: string
beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'stanchion-fault-'))
  for (const name of ['broken.md', 'unprintable.md', 'unrecorded.md', 'good.md'])
    writeFileSync(join(folder, name), '---\nsheet: T-1\ntitle: Trial\n---\n```check\n1 m <= 2 m\n```\n')
})
afterAll(() => rmSync(folder, { recursive: true, force: true }))

describe('a fault of the program', () => {
  test.each([
    ['check', 'broken.md', 'a fault\\x1b[2J in the pipeline'],
    ['values', 'broken.md', 'a fault\\x1b[2J in the pipeline'],
    ['print', 'unprintable.md', 'a fault in typesetting'],
  ])('in %s is one finding of that sheet, and the rest are done', async (command, sheet, fault) => {
    const { status, err, out } = await runCli([command, sheet, 'good.md'], folder)
    expect(status).toBe(2)
    expect(err).toContain(`${sheet}:1:1: error: the program failed: ${fault}  internal-error\n`)
    expect(err).not.toMatch(/^\s+at /m)
    expect(out).toMatch(command === 'print' ? /good\.html/ : /1 m/)
    expect(existsSync(join(folder, sheet.replace('.md', '.html')))).toBe(false)
  })

  test('in the record leaves the JSON with the finding and without the calculation', async () => {
    const { status, out } = await runCli(['check', '--json', 'unrecorded.md', 'good.md'], folder)
    expect(status).toBe(2)
    expect(JSON.parse(out)).toMatchObject([
      { verdict: 'error', values: {}, findings: [{ rule: 'internal-error' }] },
      { verdict: 'pass' },
    ])
  })

  test('shows where it is only on request', async () => {
    const { err } = await runCli(['check', 'broken.md', '--debug'], folder)
    expect(err).toMatch(/^\s+at .*internal-error\.test\.ts/m)
  })
})
