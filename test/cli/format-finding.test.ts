import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import { displayWidth } from '../../src/cli/display-width.ts'
import { formatFinding, summaryLine } from '../../src/cli/format-finding.ts'
import { finding } from '../../src/finding.ts'

/** The excerpt and its carets for a finding at `[[…]]` of a line. */
function excerpt(marked: string): { shown: string; carets: string } {
  const from = marked.indexOf('[[')
  const to = marked.indexOf(']]') - 2
  const text = marked.replace('[[', '').replace(']]', '')
  const point = (offset: number) => ({ line: 1, column: offset + 1, offset })
  const message = finding({
    rule: 'bad-expression',
    message: 'm',
    hint: 'h',
    file: 'x.md',
    span: { start: point(from), end: point(to) },
  })
  const [, shown = '', carets = ''] = formatFinding(message, text).split('\n')
  return { shown, carets }
}

describe('the caret of a finding', () => {
  test.each([
    ['a = [[2 m + 3 s]]', '1 | a = 2 m + 3 s', '  |     ^^^^^^^^^'],
    ['\ta\t= [[b]]', '1 | \ta\t= b', '  | \t \t  ^'],
    ['"梁" [[+]] 1', '1 | "梁" + 1', '  |      ^'],
    ['[[梁柱]]', '1 | 梁柱', '  | ^^^^'],
    ['e\u0301 [[x]]', '1 | e\u0301 x', '  |   ^'],
    ['a\u200b [[x]]', '1 | a\u200b x', '  |   ^'],
    ['\u001b[2J [[x]]', '1 | \\x1b[2J x', '  |         ^'],
    ['a[[]]', '1 | a', '  |  ^'],
  ])('stands under its place: %j', (marked, shown, carets) => {
    expect(excerpt(marked)).toEqual({ shown, carets })
  })

  test('of a long line shows the part around its place', () => {
    const { shown, carets } = excerpt(`${'1 + '.repeat(60)}[[nothing]]${' + 1'.repeat(60)}`)
    expect(shown).toMatch(/^1 \| …( \+ 1)+ \+ nothing( \+ 1)+.*…$/)
    expect(shown.length).toBeLessThan(110)
    expect(shown.slice(carets.indexOf('^'), carets.lastIndexOf('^') + 1)).toBe('nothing')
  })

  test('of any text stands under the text it marks, and parts no character', () => {
    const part = fc
      .string({ unit: 'binary', maxLength: 150 })
      .map((text) => text.replace(/[\n\r\t[\]]/g, ' '))
    fc.assert(
      fc.property(part, part, part, (before, marked, after) => {
        const { shown, carets } = excerpt(`${before}[[${marked}]]${after}x`)
        expect(() => encodeURIComponent(shown)).not.toThrow()
        expect(carets).toMatch(/^ {2}\| *\^+$/)
        expect(displayWidth(carets)).toBeLessThanOrEqual(displayWidth(shown) + 1)
        if (before.length > 70) return
        const lead = displayWidth(`1 | ${before}`)
        // Control characters are shown by their codes, and then take more places.
        if (!/[^\P{Cc}]|[\u061c\u200e\u200f\u2028-\u202e\u2066-\u2069]/u.test(before))
          expect(carets.indexOf('^')).toBe(lead)
      }),
    )
  })

  test('is left out for a file that is not at hand', () => {
    const at = { line: 1, column: 1, offset: 0 }
    const message = finding({
      rule: 'file-unreadable',
      message: 'm',
      hint: 'h',
      file: 'x.md',
      span: { start: at, end: at },
    })
    expect(formatFinding(message, undefined)).toBe('x.md:1:1: error: m  file-unreadable\nhint: h')
    expect(summaryLine([message, message], 3)).toBe('2 errors in 3 sheets')
    expect(summaryLine([], 1)).toBeUndefined()
  })
})
