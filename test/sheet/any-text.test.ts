import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import { prepareSheet } from '../../src/pipeline.ts'

const HEAD = '---\nsheet: T-1\ntitle: Trial\n---\n'

/** Whatever the text: no exception, and every finding has a rule, a hint and a place inside the text. */
function holds(text: string): void {
  const { findings, verdict, calculation } = prepareSheet(
    { path: 'any.md', text },
    { cwd: import.meta.dirname },
  )
  if (!calculation) expect(verdict).toBe('error')
  const lines = text.split(/\r\n?|\n/).length
  for (const message of findings) {
    expect(message.ruleId).toBeTruthy()
    expect(message.ruleId).not.toBe('internal-error')
    expect(message.note).toBeTruthy()
    expect(message.line).toBeGreaterThanOrEqual(1)
    expect(message.line).toBeLessThanOrEqual(lines + 1)
    expect(message.column).toBeGreaterThanOrEqual(1)
  }
}

const word = fc.constantFrom(
  '---\n',
  '```given\n',
  '```working\n',
  '```check\n',
  '```check validity\n',
  '```method ./x.md as b\n',
  '```method en1993-1-1/6.3.1 as b brief\n',
  '```\n',
  '~~~\n',
  '\n',
  '> ',
  '- ',
  '1. ',
  '# ',
  '| a | b |\n|---|---|\n',
  'a = ',
  'b = ',
  'f(x) = ',
  'N : force\n',
  '2 m',
  '3 kN',
  '(',
  ')',
  '[',
  ']',
  '{',
  '}',
  '"',
  "'",
  ' <= ',
  ' ? ',
  ' : ',
  ' * ',
  '^',
  '/',
  'a',
  'b.c',
  'f(a)',
  'sqrt(',
  'section("CHS 48.3x4.0")',
  'material("S355")',
  ':value[',
  ':value[a]',
  '$',
  '$$\n',
  'x^2',
  '<b>',
  '&amp;',
  '# meaning [ref] @hold "x"\n',
  'sheet: 1\n',
  'title: *x\n',
  '&x [*x]\n',
  '\t',
  '\r\n',
  '\u0000',
  '\uFEFF',
  '𝔸',
  'é',
  'to kN',
  '@hold ',
  '#',
)

describe('any text at all is a sheet or is refused kindly', () => {
  test('random text', () => {
    fc.assert(fc.property(fc.string({ unit: 'binary', maxLength: 200 }), holds), { numRuns: 300 })
  })

  test('text made of the language’s own parts', () => {
    fc.assert(
      fc.property(
        fc.array(word, { maxLength: 60 }).map((parts) => parts.join('')),
        holds,
      ),
      { numRuns: 1500 },
    )
  })

  test('text made of the language’s own parts below sound front matter', () => {
    fc.assert(
      fc.property(
        fc.array(word, { maxLength: 60 }).map((parts) => HEAD + parts.join('')),
        holds,
      ),
      { numRuns: 1500 },
    )
  })

  test.each([
    ['nothing', ''],
    ['only a byte order mark', '\uFEFF'],
    ['an unclosed front matter', '---\nsheet: 1\ntitle: x\n'],
    ['an unclosed fence', HEAD + '```given\na = 2 m'],
    ['deep lists', HEAD + '- '.repeat(2000) + 'x'],
    ['deep quotations', HEAD + '>'.repeat(2000) + 'x'],
    ['many brackets', HEAD + '['.repeat(20000)],
    ['many asterisks', HEAD + '*a_'.repeat(5000)],
    ['many inline values', HEAD + ':value[1 + 1] '.repeat(2000)],
    ['a billion laughs', '---\nsheet: &a [x,x]\ntitle: &b [*a,*a]\nsubject: [*b,*b]\n---\n'],
    [
      'functions that double',
      HEAD +
        '```working\nf0(x) = x + x\n' +
        Array.from({ length: 40 }, (_, i) => `f${i + 1}(x) = f${i}(f${i}(x))\n`).join('') +
        'a = f40(1)\n```',
    ],
    ['a very long line', HEAD + '```working\na = 1' + ' + 1'.repeat(50_000) + '\n```'],
  ])('%s', (_name, text) => holds(text))
})
