import { spawn, spawnSync } from 'node:child_process'
import { existsSync, mkdtempSync, openSync, readFileSync, readdirSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { dirname, join } from 'node:path'
import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { bundleSource } from '../../.config/import-source.js'
import { programVersion } from '../../src/version.ts'

const HEAD = '---\nsheet: T-1\ntitle: Trial\n---\n'
const MANY = `${HEAD}\`\`\`working\n${Array.from({ length: 3000 }, (_, i) => `value_${i} = ${i} m   # ${'meaning '.repeat(12)}`).join('\n')}\n\`\`\`\n\`\`\`check\n2 m <= 1 m\n\`\`\`\n`

let folder: string
let main: string
beforeAll(async () => {
  folder = mkdtempSync(join(tmpdir(), 'stanchion-main-'))
  main = await bundleSource('src/cli/main.ts')
  writeFileSync(join(folder, 'many.md'), MANY)
  writeFileSync(join(folder, 'good.md'), `${HEAD}\`\`\`check\n1 m <= 2 m\n\`\`\`\n`)
})
afterAll(() => rmSync(folder, { recursive: true, force: true }))

const call = (args: readonly string[], options: object = {}) =>
  spawnSync(process.execPath, [main, ...args], { cwd: folder, encoding: 'utf8', ...options })

describe('the command as a process', () => {
  test('prints its version', () => {
    expect(call(['--version'])).toMatchObject({ status: 0, stdout: `${programVersion()}\n`, stderr: '' })
  })

  test('prints a long product whole into a pipe', () => {
    const { stdout, status } = call(['values', 'many.md'], { maxBuffer: 10_000_000 })
    expect(stdout.trimEnd().split('\n')).toHaveLength(3001)
    expect(status).toBe(1)
  })

  test('is quiet when the reader of its output goes away, and does the rest', async () => {
    const child = spawn(process.execPath, [main, 'values', 'many.md', 'many.md'], { cwd: folder })
    let err = ''
    child.stderr.setEncoding('utf8').on('data', (chunk: string) => (err += chunk))
    child.stdout.once('data', () => child.stdout.destroy())
    const status = await new Promise((resolve) => child.on('close', resolve))
    expect(err).not.toMatch(/EPIPE|^\s+at /m)
    expect(status).toBe(1)
  })

  test.skipIf(!existsSync('/dev/full'))('says when its output has no place to go', () => {
    const { status, stderr } = call(['values', 'good.md'], {
      stdio: ['ignore', openSync('/dev/full', 'w'), 'pipe'],
    })
    expect(status).toBe(2)
    expect(stderr).toMatch(/^stanchion: standard output cannot be written \(ENOSPC\)\nhint: /m)
    expect(stderr).not.toMatch(/^\s+at /m)
  })

  test('reads a sheet from standard input, byte for byte', () => {
    const input = readFileSync(join(folder, 'good.md'))
    expect(call(['check', '-'], { input }).status).toBe(0)
    expect(call(['check', '-'], { input: Buffer.concat([input, Buffer.of(0xff)]) }).stderr).toMatch(/UTF-8/)
  })

  test('prints no colour codes, whatever the environment says', () => {
    const env = { ...process.env, FORCE_COLOR: '3', TERM: 'xterm-256color' }
    for (const args of [['--help'], ['check', 'many.md'], ['chekc']]) {
      const { stdout, stderr } = call(args, { env, maxBuffer: 10_000_000 })
      expect(stdout + stderr).not.toContain('\u001b')
    }
  })

  test('reads the mathematics and the browser only for a command that needs them', () => {
    const loaded = (args: readonly string[]) => {
      const { stderr } = call(args, { env: { ...process.env, NODE_DEBUG: 'esm' }, maxBuffer: 100_000_000 })
      return readdirSync(dirname(main)).filter((file) => file !== 'entry.js' && stderr.includes(file))
    }
    const bytes = (files: readonly string[]) =>
      files.reduce((sum, file) => sum + readFileSync(join(dirname(main), file)).length, 0)
    const [little, all] = [bytes(loaded(['--help'])), bytes(loaded(['check', 'good.md']))]
    expect(all).toBeGreaterThan(1_000_000)
    expect(little).toBeLessThan(all / 10)
    expect(loaded(['check', 'good.md']).join(' ')).not.toMatch(/puppeteer|typeset|html-document/)
  })
})
