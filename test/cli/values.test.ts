import { execFileSync } from 'node:child_process'
import { cpSync, mkdirSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { bundleSource } from '../../.config/import-source.js'
import { runCli } from './run-cli.ts'

const SHEET =
  '---\nsheet: T-1\ntitle: Trial\n---\n```given\nN_Ed = 285 kN   # force [loads]\n```\n```working\nf(x) = 2*x\nv = [1 m, 2 m]\nok = N_Ed < 300 kN\n```\n```check\nN_Ed <= 301 kN   # strength\n```\n'

let folder: string
beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'stanchion-values-'))
  writeFileSync(join(folder, 'good.md'), SHEET)
  writeFileSync(join(folder, 'bad.md'), SHEET.replace('301 kN', '301 m'))
})
afterAll(() => rmSync(folder, { recursive: true, force: true }))

describe('values', () => {
  test('are one line each, in the order of the document', async () => {
    const { out, status } = await runCli(['values', 'good.md'], folder)
    expect(status).toBe(0)
    expect(out.split('\n')).toEqual([
      'N_Ed = 285 kN  # force',
      'f = function of x',
      'v = [1 m, 2 m]',
      'ok = true',
      'check strength: 285 kN against 301 kN 0.947 OK',
      '',
    ])
  })

  test('of several sheets stand under their sheets', async () => {
    const { out, status } = await runCli(['values', 'good.md', 'bad.md', 'missing.md'], folder)
    expect(status).toBe(2)
    expect(out.match(/^sheet .*$/gm)).toEqual(['sheet good.md', 'sheet bad.md', 'sheet missing.md'])
  })

  test('are lines of plain text, whatever a sheet says', async () => {
    const { out } = await runCli(['values', '-'], folder, SHEET.replace('# force', '# fo\u001b[2Jrce\u2028x'))
    expect(out).toContain('# fo\\x1b[2Jrce\\u2028x\n')
  })
})

describe('git compares values', () => {
  let project: string
  const git = (...args: string[]) =>
    execFileSync('git', ['-c', 'user.name=T', '-c', 'user.email=t@example.org', ...args], {
      cwd: project,
      encoding: 'utf8',
      env: { ...process.env, GIT_CONFIG_GLOBAL: '/dev/null', GIT_CONFIG_SYSTEM: '/dev/null' },
    })
  const change = (from: string | RegExp, to: string) => {
    const path = join(project, 'sheets/raking-shore.md')
    const before = readFileSync(path, 'utf8')
    writeFileSync(path, before.replace(from, to))
    expect(readFileSync(path, 'utf8')).not.toBe(before)
  }
  const lines = (sign: '+' | '-') =>
    git('diff')
      .split('\n')
      .filter((line) => line.startsWith(sign) && !line.startsWith(sign.repeat(3)))

  beforeAll(async () => {
    project = mkdtempSync(join(tmpdir(), 'stanchion-git-'))
    mkdirSync(join(project, 'sheets'))
    cpSync(new URL('../../samples', import.meta.url).pathname, join(project, 'sheets'), { recursive: true })
    writeFileSync(join(project, '.gitattributes'), '*.md diff=sheet\n')
    git('init', '-q')
    const main = await bundleSource('src/cli/main.ts')
    git('config', 'diff.sheet.textconv', `"${process.execPath}" "${main}" values --textconv sheets`)
    git('add', '-A')
    git('commit', '-qm', 'Start')
  })
  afterAll(() => rmSync(project, { recursive: true, force: true }))

  test('of a sheet that uses another, between a revision and the working copy', () => {
    change(/^H_G = 118 kN/m, 'H_G = 119 kN')
    expect(lines('-')).toContainEqual(expect.stringMatching(/^-H_G = 118 kN {2}#/))
    expect(lines('+')).toContainEqual(expect.stringMatching(/^\+H_G = 119 kN {2}#/))
    expect(lines('+')).toContainEqual(expect.stringMatching(/^\+check flexural buckling: .* OK$/))
    expect(git('diff')).not.toMatch(/error/)
  })

  test('of a sheet whose check fails', () => {
    change(/^H_G = 119 kN/m, 'H_G = 900 kN')
    expect(lines('+')).toContainEqual(expect.stringMatching(/^\+check flexural buckling: .* NOT OK$/))
  })

  test('of a sheet with an error, which is a line among them', () => {
    change(/^H_G = 900 kN/m, 'H_G = 900 kg')
    expect(lines('+')).toContainEqual(expect.stringMatching(/^\+error unit-mismatch: /))
  })
})
