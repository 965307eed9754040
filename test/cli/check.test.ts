import { describe, expect, test } from 'vitest'
import { displayWidth } from '../../src/cli/display-width.ts'
import { runCli } from './run-cli.ts'

const HEAD = '---\nsheet: T-1\ntitle: Trial\n---\n'
const sheet = (...checks: string[]) => `${HEAD}\`\`\`check\n${checks.join('\n')}\n\`\`\`\n`
const check = (text: string, ...flags: string[]) => runCli(['check', '-', ...flags], '.', text)

describe('the table of checks', () => {
  test.each([
    ['1 m <= 2 m', '1 m  <=  2 m  0.500  OK'],
    ['2 m >= 1 m', '1 m  <=  2 m  0.500  OK'],
    ['1 m < 2 m', '1 m  <  2 m  0.500  OK'],
    ['2 m <= 1 m', '2 m  >  1 m  2.000  NOT OK'],
    ['1 m >= 2 m', '2 m  >  1 m  2.000  NOT OK'],
    ['2 m < 2 m', '2 m  >=  2 m  1.000  NOT OK'],
    ['2 m > 2 m', '2 m  >=  2 m  1.000  NOT OK'],
    ['2 m <= 2 m', '2 m  <=  2 m  1.000  OK'],
  ])('says how the two sides stand to each other: %s', async (line, row) => {
    const { out } = await check(sheet(`${line}   # title`))
    expect(out).toContain(`  *  title  ${row}\n`)
  })

  test('marks the check that governs', async () => {
    const { out } = await check(sheet('1 m <= 2 m   # low', '3 m <= 4 m   # high', '1 m <= 3 m   # least'))
    expect(out.match(/^ {2}\*.*$/gm)).toEqual([expect.stringContaining('high')])
    expect(out).toMatch(/\n {2}every check passes {2}\(\* governs\)\n/)
  })

  test('is aligned under wide characters and hostile ones', async () => {
    const { out } = await check(
      sheet('1 m <= 2 m   # 梁', '1 m <= 2 m   # a\u001b[31m', '1 m <= 2 m   # plain title'),
    )
    const starts = out
      .split('\n')
      .filter((line) => line.includes('<='))
      .map((line) => displayWidth(line.slice(0, line.indexOf('1 m'))))
    expect(new Set(starts).size).toBe(1)
    expect(starts).toHaveLength(3)
  })

  test('a sheet without a check passes nothing, and is told so', async () => {
    const { status, out, err } = await check(HEAD)
    expect(status).toBe(0)
    expect(out).toContain('calculated; there is no check')
    expect(out).not.toMatch(/passes|approved/i)
    expect(err).toMatch(/warning: the sheet has no check {2}no-checks/)
  })
})

describe('check --json', () => {
  test('is one object for a sheet and an array for several', async () => {
    const one = JSON.parse((await check(sheet('1 m <= 2 m'), '--json')).out) as object
    const many = JSON.parse((await check(sheet('1 m <= 2 m'), 'missing.md', '--json')).out) as object[]
    expect(many).toHaveLength(2)
    expect(many[0]).toEqual(one)
    expect(many[1]).toMatchObject({
      verdict: 'error',
      sheet: { source: 'missing.md' },
      values: {},
      checks: [],
    })
  })

  test.each([
    ['1 m <= 2 m', '<=', 1, 2],
    ['2 m >= 1 m', '<=', 1, 2],
    ['1 m < 2 m', '<', 1, 2],
    ['2 m > 1 m', '<', 1, 2],
  ])('gives the relation between demand and capacity: %s', async (line, relation, demand, capacity) => {
    expect(JSON.parse((await check(sheet(line), '--json')).out)).toMatchObject({
      checks: [
        { demand: { si: demand }, relation, capacity: { si: capacity }, utilisation: 0.5, verdict: 'pass' },
      ],
    })
  })

  test('keeps what could act on a terminal out of the text, and in the value', async () => {
    const { out } = await check(sheet('1 m <= 2 m   # a\u009b31m\u202eb'), '--json')
    expect(out).not.toMatch(/[\u0080-\u009f\u202e]/)
    expect(JSON.parse(out)).toMatchObject({ checks: [{ title: 'a\u009b31m\u202eb' }] })
  })
})
