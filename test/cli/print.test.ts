import { existsSync, mkdirSync, mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterEach, beforeEach, describe, expect, test } from 'vitest'
import { runCli } from './run-cli.ts'

const HEAD = '---\nsheet: T-1\ntitle: Trial\n---\n'
const GOOD = `${HEAD}\`\`\`given\nN_Ed = 285 kN   # force [loads]\n\`\`\`\n\`\`\`check\nN_Ed <= 301 kN   # strength\n\`\`\`\n`
const FAILING = GOOD.replace('301', '280')
const BAD = GOOD.replace('301 kN', '301 m')

let folder: string
const write = (name: string, text: string) => writeFileSync(join(folder, name), text)
const read = (name: string) => readFileSync(join(folder, name), 'utf8')
const files = (ending: string) => readdirSync(folder).filter((file) => file.endsWith(ending))
const print = (...argv: string[]) => runCli(['print', ...argv], folder)

beforeEach(() => {
  folder = mkdtempSync(join(tmpdir(), 'stanchion-print-'))
  write('good.md', GOOD)
  write('failing.md', FAILING)
  write('bad.md', BAD)
})
afterEach(() => rmSync(folder, { recursive: true, force: true }))

describe('a document', () => {
  test('is written beside the sheet, and named', async () => {
    const { status, out, err } = await print('good.md')
    expect([status, err]).toEqual([0, ''])
    expect(out).toBe(`${join(folder, 'good.html')}\n`)
    expect(read('good.html')).toMatch(/^<!doctype html>/i)
  })

  test('is made for a sheet whose check fails, and not for one that is not calculated', async () => {
    expect((await print('failing.md')).status).toBe(1)
    const bad = await print('bad.md')
    expect(bad.status).toBe(2)
    expect(bad.err).toContain('bad.md: not written, since it could not be calculated\n')
    expect(files('.html')).toEqual(['failing.html'])
  })

  test('is made for the rest of the sheets when one is bad', async () => {
    const { status, out } = await print('bad.md', 'missing.md', 'good.md')
    expect(status).toBe(2)
    expect(out).toBe(`${join(folder, 'good.html')}\n`)
  })

  test('goes under the folder that `-o` names, which is made', async () => {
    expect((await print('good.md', '-o', 'out/deep')).status).toBe(0)
    expect(existsSync(join(folder, 'out/deep/good.html'))).toBe(true)
  })

  test('of standard input is called sheet', async () => {
    expect((await runCli(['print', '-', '-o', 'out'], folder, GOOD)).status).toBe(0)
    expect(existsSync(join(folder, 'out/sheet.html'))).toBe(true)
  })

  test('has the paper that was asked for', async () => {
    await print('good.md', '--paper', 'Letter', '-o', 'letter')
    await print('good.md', '--paper', 'A4', '-o', 'a4')
    expect(read('letter/good.html')).not.toBe(read('a4/good.html'))
    expect(read('letter/good.html')).toMatch(/size:\s*(Letter|8\.5in 11in|215\.9mm 279\.4mm)/i)
  })

  test('is the same bytes in another folder and with other line endings', async () => {
    await print('good.md')
    const other = mkdtempSync(join(tmpdir(), 'stanchion-other-'))
    writeFileSync(join(other, 'good.md'), GOOD.replaceAll('\n', '\r\n'))
    await runCli(['print', 'good.md'], other)
    expect(readFileSync(join(other, 'good.html'), 'utf8')).toBe(read('good.html'))
    rmSync(other, { recursive: true })
  })
})

describe('an earlier document', () => {
  test('of a sheet that is not calculated any more is named as such', async () => {
    write('good.pdf', 'earlier')
    await print('good.md')
    write('good.md', BAD)
    const { err } = await print('good.md')
    expect(err).toContain(
      'good.md: not written, since it could not be calculated; `good.html` and `good.pdf` there may show an earlier state of the sheet\n',
    )
  })

  test('as PDF is named when only the HTML is new', async () => {
    write('good.pdf', 'earlier')
    const { status, err } = await print('good.md')
    expect(status).toBe(0)
    expect(err).toBe(
      'good.md: `good.pdf` there may show an earlier state of the sheet; `--pdf` writes both\n',
    )
  })
})

describe('nothing is written over', () => {
  test.each([
    [['good.md', 'sub/good.md', '-o', 'out'], /`good\.md` and `sub\/good\.md` would both be written to/],
    [['good.md', 'good.markdown'], /`good\.md` and `good\.markdown` would both be written to/],
    [['good.md', 'good.md'], /`good\.md` is given twice/],
    [['good', 'good.html'], /`good` would be written over `good\.html`/],
    [['good.html', 'good'], /`good` would be written over `good\.html`/],
  ])('%j', async (argv, message) => {
    mkdirSync(join(folder, 'sub'))
    for (const name of ['sub/good.md', 'good.markdown', 'good', 'good.html']) write(name, GOOD)
    const { status, err, out } = await print(...argv)
    expect([status, out]).toEqual([2, ''])
    expect(err).toMatch(message)
    expect(read('good.html')).toBe(GOOD)
    expect(existsSync(join(folder, 'out'))).toBe(false)
  })
})

describe('an output that cannot be made leaves nothing behind and does not stop the rest:', () => {
  test('a folder that cannot be made, since a file stands there', async () => {
    const { status, err } = await print('good.md', '-o', 'bad.md/out')
    expect(status).toBe(2)
    expect(err).toMatch(/output-unwritable/)
    expect(read('bad.md')).toBe(BAD)
  })

  test('an output that is a folder', async () => {
    mkdirSync(join(folder, 'good.html'))
    const { status, err, out } = await print('good.md', 'failing.md')
    expect(status).toBe(2)
    expect(err).toMatch(/^good\.md: error: .*output-unwritable/)
    expect(out).toBe(`${join(folder, 'failing.html')}\n`)
    expect(files('.part')).toEqual([])
  })

  test('no browser', async () => {
    const { status, err, out } = await print('good.md', '--pdf', '--browser', join(folder, 'none'))
    expect(status).toBe(2)
    expect(err).toMatch(/browser-missing\nhint: \S/)
    expect(err).not.toMatch(/^\s+at /m)
    expect(out).toBe(`${join(folder, 'good.html')}\n`)
    expect(files('.pdf')).toEqual([])
  })
})
