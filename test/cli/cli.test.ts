import {
  cpSync,
  existsSync,
  mkdtempSync,
  readdirSync,
  readFileSync,
  rmSync,
  symlinkSync,
  writeFileSync,
} from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterEach, beforeEach, describe, expect, test } from 'vitest'
import { COMMANDS } from '../../src/cli/commands/index.ts'
import { allFunctions } from '../../src/calculate/functions/index.ts'
import { KINDS } from '../../src/quantity/kinds.ts'
import { UNITS } from '../../src/quantity/units.ts'
import { builtInIds } from '../../src/sheet/library.ts'
import { RULES } from '../../src/verify/rules.ts'
import { runCli } from './run-cli.ts'

const HEAD = '---\nsheet: T-1\ntitle: Trial\n---\n'
const GOOD = `${HEAD}\`\`\`given\nN_Ed = 285 kN   # force [loads]\n\`\`\`\n\`\`\`check\nN_Ed <= 301 kN   # strength\n\`\`\`\n`
const FAILING = GOOD.replace('301', '280')
const BAD = GOOD.replace('301 kN', '301 m')

let folder: string
const write = (name: string, text: string) => writeFileSync(join(folder, name), text)
const cli = (...argv: string[]) => runCli(argv, folder)

beforeEach(() => {
  folder = mkdtempSync(join(tmpdir(), 'stanchion-cli-'))
  write('good.md', GOOD)
  write('failing.md', FAILING)
  write('bad.md', BAD)
})
afterEach(() => rmSync(folder, { recursive: true, force: true }))

describe('exit status', () => {
  test.each([
    [['good.md'], 0],
    [['failing.md'], 1],
    [['bad.md'], 2],
    [['good.md', 'failing.md'], 1],
    [['bad.md', 'good.md'], 2],
    [['missing.md', 'good.md'], 2],
  ])('check %j ends with %d', async (sheets, status) => {
    expect((await cli('check', ...sheets)).status).toBe(status)
  })

  test('one bad sheet does not stop the rest', async () => {
    const { out } = await cli('check', 'bad.md', 'missing.md', 'good.md')
    expect(out).toContain('every check passes')
    expect(out).toContain('0.947')
  })
})

describe('findings', () => {
  test('have place, excerpt, caret and hint', async () => {
    const { err } = await cli('check', 'bad.md')
    expect(err).toContain(
      [
        'bad.md:9:5: error: cannot compare `N_Ed` (285 kN) and `301 m` (301 m): a force and a length  unit-mismatch',
        '9 | N_Ed <= 301 m   # strength',
        '  |     ^^^^',
        'hint: a check compares two quantities of one dimension',
      ].join('\n'),
    )
    expect(err).toContain('1 error in 1 sheet')
  })

  test('excerpts line up under tabs, wide characters and in long lines', async () => {
    write('wide.md', `${HEAD}\`\`\`working\n\tw = "梁" + 1\nx = ${'1 + '.repeat(60)}nothing\n\`\`\`\n`)
    const lines = (await cli('check', 'wide.md')).err.split('\n')
    const under = (text: string) =>
      lines[lines.findIndex((line) => line.includes(' | ') && line.includes(text)) + 1] ?? ''
    expect(under('"梁"')).toBe(`  | \t${' '.repeat(9)}^`)
    expect(under('nothing').trimEnd()).toMatch(/\^{7}$/)
  })

  test('control characters of a sheet do not reach the terminal', async () => {
    write('hostile.md', GOOD.replace('strength', 'str\u001b[31mred\u202e'))
    const { out, err } = await cli('check', 'hostile.md')
    expect(out + err).not.toMatch(/[\u001b\u202e]/)
  })
})

describe('standard input', () => {
  test('is a sheet', async () => {
    const { status, out } = await runCli(['check', '-'], folder, GOOD)
    expect(status).toBe(0)
    expect(out).toContain('strength')
  })
  test('names itself in findings', async () => {
    expect((await runCli(['check', '-'], folder, BAD)).err).toContain('<standard input>:9:5: error')
  })
  test('cannot be read twice', async () => {
    expect((await runCli(['check', '-', '-'], folder, GOOD)).status).toBe(2)
  })
  test('that is not text is refused as such a file is', async () => {
    const { status, err } = await runCli(['check', '-'], folder, Uint8Array.of(0x2d, 0xe9, 0xff))
    expect(status).toBe(2)
    expect(err).toMatch(/^<standard input>:1:1: error: the file is not text in UTF-8  file-unreadable/)
  })
  test('that cannot be read does not stop the other sheets', async () => {
    const broken = Object.assign(new Error('EISDIR: illegal operation on a directory'), { code: 'EISDIR' })
    const { status, err, out } = await runCli(['check', '-', 'good.md'], folder, broken)
    expect(status).toBe(2)
    expect(err).toMatch(/this is a folder, and a sheet was expected {2}file-unreadable/)
    expect(out).toContain('every check passes')
  })
})

describe('usage', () => {
  test.each([
    [['chekc', 'x'], /there is no command `chekc`\nhint: did you mean `check`\?/],
    [['check'], /`check` needs `<sheet\.\.\.>`\nhint: call it as `stanchion check <sheet\.\.\.>`/],
    [['explain', 'kN', 'kip'], /`explain` takes 1 argument, and 2 are given/],
    [['print', 'good.md', '-o'], /the option `-o, --output <dir>` needs a value/],
    [['print', 'good.md', '--browser', 'x'], /no PDF is asked for\nhint: add `--pdf`/],
    [['good.md'], /there is no command `good\.md`\nhint: .*`stanchion check good\.md`/],
    [['check', 'good.md', '--quiet'], /there is no option `--quiet`\nhint: `stanchion check --help` lists/],
    [['--versoin'], /there is no option `--versoin`\nhint: did you mean `--version`\?/],
    [['values', '--textconv', '.', 'good.md', 'bad.md'], /`--textconv` takes one file/],
    [['check', 'good.md', '--jsn'], /there is no option `--jsn`\nhint: did you mean `--json`\?/],
    [['print', 'good.md', '--paper', 'A5'], /`--paper A5` is not a size/],
    [['print', '-'], /`-` needs a folder/],
    [['explain', 'unit-mismach'], /did you mean `unit-mismatch`/],
    [['new', 'shet'], /did you mean `sheet`/],
    [['schema', 'x'], /the schemas are calculation, front-matter/],
    [[], /a command is needed/],
  ])('%j', async (argv, message) => {
    const { status, err, out } = await cli(...argv)
    expect(status).toBe(2)
    expect(err).toMatch(message)
    expect(out).toBe('')
  })

  test('help names every command and option', async () => {
    const { out, status } = await cli('--help')
    expect(status).toBe(0)
    for (const { name, flags } of COMMANDS) {
      expect(out).toContain(name)
      const help = (await cli(name, '--help')).out
      for (const flag of flags) expect(help).toContain(flag.summary.split(' ').slice(0, 3).join(' '))
    }
  })
})

describe('files that cannot be read', () => {
  test.each([
    ['missing.md', /there is no such file/],
    ['.', /this is a folder/],
    ['latin1.md', /not text in UTF-8/],
    ['good.md/x.md', /there is no such file/],
    ['/dev/zero', /this is a device/],
    ['good\0.md', /this is not a usable path/],
  ])('%s', async (path, message) => {
    writeFileSync(join(folder, 'latin1.md'), Buffer.from([0x2d, 0x2d, 0xe9, 0xff]))
    const { status, err } = await cli('check', path)
    expect(status).toBe(2)
    expect(err).toMatch(message)
    expect(err).toMatch(/file-unreadable/)
  })
})

describe('explain', () => {
  test('of a sheet of one’s own says what it takes and gives', async () => {
    await cli('new', 'method', '-o', 'own.md')
    const { status, out } = await cli('explain', 'own.md')
    expect(status).toBe(0)
    expect(out).toMatch(/Inputs\n {2}L_cr {3}length {2}effective length\n/)
    expect(out).toMatch(/Results\n {2}slenderness {2}slenderness\n/)
    expect(out).toMatch(/Limits of use\n {2}slenderness <= limit {2}within the range of the method\n/)
  })

  test.each([
    ['missing.md', /`missing\.md`: there is no such file/],
    ['en1993-1-1/9.9', /nothing is known by the name/],
    ['KN', /did you mean `kN`\?/],
    ['__proto__', /nothing is known by the name `__proto__`/],
    ['toString', /nothing is known by the name `toString`/],
  ])('of what is not there: %s', async (id, message) => {
    const { status, err } = await cli('explain', id)
    expect(status).toBe(2)
    expect(err).toMatch(message)
  })

  test('gives the factor of a unit, as NIST SP 811 has it: 1 kip = 4448.2216 N', async () => {
    expect((await cli('explain', 'kip')).out).toMatch(/^1 kip = 4448\.2216\d+ in SI units, force$/m)
  })

  test('knows every finding, function, method, kind and unit', async () => {
    for (const id of [
      ...Object.keys(RULES),
      ...allFunctions().map(({ name }) => name),
      ...builtInIds(),
      ...Object.keys(KINDS),
      ...Object.keys(UNITS),
      'units',
      'kinds',
      'functions',
      'findings',
      'methods',
    ]) {
      const { status, out } = await cli('explain', id)
      expect([id, status]).toEqual([id, 0])
      expect(out.length).toBeGreaterThan(20)
    }
  })
})

describe('new', () => {
  test.each(['sheet', 'us-sheet', 'mechanism', 'basis'])(
    'the starter `%s` is calculated and passes',
    async (starter) => {
      expect((await cli('new', starter, '-o', `${starter}.md`)).status).toBe(0)
      const { status, err } = await cli('check', `${starter}.md`)
      expect([status, err.replace(/^[\s\S]*hold-open[\s\S]*$/, '')]).toEqual([0, ''])
    },
  )

  test('the starter `method` is used by another sheet, and its published value holds', async () => {
    await cli('new', 'method', '-o', 'own.md')
    write(
      'user.md',
      `${HEAD}\`\`\`method ./own.md as own\nL_cr = 3 m\ni = 30 mm\nlimit = 180\n\`\`\`\n\`\`\`check\nown.slenderness <= 100\n\`\`\`\n`,
    )
    expect((await cli('check', 'user.md')).status).toBe(0)
  })

  test('never writes over a file', async () => {
    const { status, err } = await cli('new', '-o', 'good.md')
    expect(status).toBe(2)
    expect(err).toMatch(/exists already/)
    expect(readFileSync(join(folder, 'good.md'), 'utf8')).toBe(GOOD)
  })
})

describe('sheets that use sheets', () => {
  const using = (id: string, bindings = '') =>
    `${HEAD}\`\`\`method ${id} as other\n${bindings}\`\`\`\n\`\`\`check\n1 m <= 2 m\n\`\`\`\n`

  test.each([
    ['itself', using('./main.md'), /circle: .*main\.md|circular-method/],
    ['a method that is not there', using('en1993-1-1/9.9.9'), /method-unknown/],
    ['a file that is not there', using('./none.md'), /file-unreadable/],
    ['a file outside the project', using('../../../../etc/passwd.md'), /outside the project folder/],
    ['an absolute path', using('/etc/passwd.md'), /not a relative path/],
    ['a file that is no sheet', using('./good.txt'), /bad-reference/],
    ['a link that leads outside', using('./link.md'), /through a link/],
    ['an input that is missing', using('en1993-1-1/6.3.1', 'A = 1 cm^2\n'), /binding-missing/],
    ['an input that it does not take', using('en1993-1-1/6.3.1', 'Q = 1 cm^2\n'), /binding-unknown/],
    ['an input twice', using('en1993-1-1/6.3.1', 'A = 1 cm^2\nA = 2 cm^2\n'), /binding-duplicate/],
    [
      'an input of another kind',
      using('en1993-1-1/6.3.1', 'A = 1 cm\nf_y = 355 MPa\nN_cr = 100 kN\ncurve = "a"\n'),
      /`A` is 10 mm, a length, and an area was expected/,
    ],
    [
      'a table entry that is not there',
      using('en1993-1-1/6.3.1', 'A = 1 cm^2\nf_y = 355 MPa\nN_cr = 100 kN\ncurve = "e"\n'),
      /the table has no entry `e`/,
    ],
  ])('%s', async (_name, text, message) => {
    const outside = join(tmpdir(), `stanchion-outside-${process.pid}.md`)
    writeFileSync(outside, GOOD)
    if (!existsSync(join(folder, 'link.md'))) symlinkSync(outside, join(folder, 'link.md'))
    write('main.md', text)
    const { status, err } = await cli('check', 'main.md')
    rmSync(outside)
    expect(err).toMatch(message)
    expect(err).toContain('main.md:')
    expect(err).toMatch(/hint: \S/)
    expect(status).toBe(2)
  })

  test('a circle of two', async () => {
    write('one.md', using('./two.md'))
    write('two.md', using('./one.md'))
    const { err, status } = await cli('check', 'one.md')
    expect(status).toBe(2)
    expect(err).toMatch(/circle/)
  })

  test('a method outside its limits fails the sheet, at the place of its use', async () => {
    write('main.md', using('en1993-1-1/6.3.1', 'A = 1 cm^2\nf_y = 690 MPa\nN_cr = 100 kN\ncurve = "a"\n'))
    const { err, status } = await cli('check', 'main.md')
    expect(status).toBe(1)
    expect(err).toMatch(
      /main\.md:5:11: error: `en1993-1-1-2005\/6\.3\.1` is outside its limits: `f_y <= 460 MPa` does not hold, the sides being 690 N\/mm² and 460 N\/mm²/,
    )
  })
})

describe('the sample package', () => {
  test('every sheet is calculated, passes, and is clean but for its hold', async () => {
    cpSync(new URL('../../samples', import.meta.url).pathname, join(folder, 'samples'), { recursive: true })
    const sheets = readdirSync(join(folder, 'samples')).filter((file) => file.endsWith('.md'))
    expect(sheets.length).toBeGreaterThanOrEqual(4)
    const { status, err } = await cli('check', ...sheets.map((file) => `samples/${file}`))
    expect(status).toBe(0)
    expect(err.match(/: (error|warning|note): /g) ?? []).toEqual([': warning: '])
  })
})
