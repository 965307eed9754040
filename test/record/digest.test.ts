import { cpSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, test, vi } from 'vitest'
import type { Calculation, NamedLine } from '../../src/calculate/types.ts'
import { prepareSheet } from '../../src/pipeline.ts'
import { digestOf } from '../../src/record/digest.ts'

const version = vi.hoisted(() => ({ now: '1.0.0' }))
vi.mock('../../src/version.ts', () => ({ programVersion: () => version.now }))

let folder: string
beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'stanchion-digest-'))
  cpSync(new URL('../../samples', import.meta.url).pathname, folder, { recursive: true })
})
afterAll(() => rmSync(folder, { recursive: true, force: true }))

const calculated = (cwd = folder): Calculation =>
  prepareSheet({ path: 'raking-shore.md' }, { cwd }).calculation ?? expect.fail('not calculated')
const digest = (cwd?: string) => digestOf(calculated(cwd))

/** The digest after a file of the project is changed, and back. */
function digestWith(file: string, change: (text: string) => string): string {
  const path = join(folder, file)
  const before = readFileSync(path, 'utf8')
  const after = change(before)
  expect(after).not.toBe(before)
  writeFileSync(path, after)
  try {
    return digest()
  } finally {
    writeFileSync(path, before)
  }
}

/** The same calculation with the number of one line changed by a factor. */
function scaled(calculation: Calculation, name: string, factor: number): Calculation {
  const change = (line: NamedLine): NamedLine =>
    line.name === name && line.value.type === 'quantity'
      ? { ...line, value: { ...line.value, si: line.value.si * factor } }
      : line
  return {
    ...calculation,
    blocks: calculation.blocks.map((block) => ({
      ...block,
      lines: block.lines.map((line) => (line.kind === 'named' ? change(line) : line)),
    })),
  }
}

describe('the digest', () => {
  test('is of the form sha256:…', () => {
    expect(digest()).toMatch(/^sha256:[0-9a-f]{64}$/)
  })

  test('does not depend on the folder or on line endings', () => {
    const other = mkdtempSync(join(tmpdir(), 'stanchion-elsewhere-'))
    cpSync(folder, other, { recursive: true })
    expect(digest(other)).toBe(digest())
    rmSync(other, { recursive: true })
    expect(digestWith('raking-shore.md', (text) => text.replaceAll('\n', '\r\n'))).toBe(digest())
  })

  test.each([
    ['a word of the prose', 'raking-shore.md', (text: string) => `${text}\nOne more word.\n`],
    ['the revision', 'raking-shore.md', (text: string) => text.replace(/^revision: .*$/m, 'revision: Z')],
    ['an input', 'raking-shore.md', (text: string) => text.replace('= 118 kN', '= 119 kN')],
    ['a word of a sheet it uses', 'design-basis.md', (text: string) => `${text}\nOne more word.\n`],
  ])('changes with %s', (_what, file, change) => {
    expect(digestWith(file, change)).not.toBe(digest())
  })

  test('changes with the program’s version', () => {
    const before = digest()
    version.now = '1.0.1'
    expect(digest()).not.toBe(before)
    version.now = '1.0.0'
  })

  test('changes with what is shown, and not with the last bits of a number', () => {
    const calculation = calculated()
    const [name = ''] =
      [...calculation.names].find(
        ([, { value, origin }]) => origin === 'derived' && value.type === 'quantity',
      ) ?? []
    expect(digestOf(scaled(calculation, name, 1 + 2 ** -50))).toBe(digestOf(calculation))
    expect(digestOf(scaled(calculation, name, 1.01))).not.toBe(digestOf(calculation))
  })

  test('changes with the row of a table that was read, and with its source', () => {
    const calculation = calculated()
    const withTube = (change: (line: NamedLine) => NamedLine): Calculation => ({
      ...calculation,
      blocks: calculation.blocks.map((block) => ({
        ...block,
        lines: block.lines.map((line) =>
          line.kind === 'named' && line.value.type === 'record' && line.value.of === 'section'
            ? change(line)
            : line,
        ),
      })),
    })
    const record = (line: NamedLine) => (line.value.type === 'record' ? line.value : expect.fail('no record'))
    expect(
      digestOf(withTube((line) => ({ ...line, value: { ...record(line), source: 'another table' } }))),
    ).not.toBe(digestOf(calculation))
    expect(digestOf(withTube((line) => ({ ...line, value: { ...record(line), fields: {} } })))).not.toBe(
      digestOf(calculation),
    )
  })
})
