import fc from 'fast-check'
import katex from 'katex'
import { describe, expect, test, vi } from 'vitest'
import { escapeText, quotedTex, textTex } from '../../../src/typeset/equation/text-tex.ts'
import { renderMath } from '../../../src/typeset/equation/render.ts'
import { textOf } from './text-of.ts'

/** What a reader sees of a text that is set as mathematics. */
function seen(tex: string): string {
  return textOf(renderMath(tex, { display: false, words: '', forPdf: true })).replaceAll(
    /[\s\u00a0\u200b]+/g,
    ' ',
  )
}

describe('texts in formulas', () => {
  test('every printable ASCII character is seen as itself', () => {
    const characters = Array.from({ length: 0x5f }, (_, i) => String.fromCharCode(0x20 + i))
    for (const character of characters.filter((c) => c !== ' ')) {
      const shown = { "'": '’', '`': '‘', '-': '-' }[character] ?? character
      expect(seen(textTex(`a${character}z`))).toBe(`a${shown}z`)
    }
  })

  test('characters beside each other are not joined', () => {
    expect(seen(textTex('a--b'))).toBe('a--b')
    expect(seen(textTex("''x``"))).toBe('’’x‘‘')
  })

  test('a text cannot break out of its place', () => {
    fc.assert(
      fc.property(fc.string({ unit: 'binary', maxLength: 30 }), (text) => {
        const tex = `x=${quotedTex(text)}+y`
        katex.renderToString(tex, { throwOnError: true, strict: 'ignore' })
        expect(seen(tex).startsWith('x=“')).toBe(true)
        expect(seen(tex).endsWith('”+y')).toBe(true)
      }),
      { numRuns: 500 },
    )
  })

  test('commands in a text are text', () => {
    for (const text of ['}\\end{array}', '\\def\\x{1}', '$\\href{a}{b}$', '%', '\\\\', '&', '{', '}'])
      expect(seen(quotedTex(text)).replaceAll(' ', '')).toBe(`“${text}”`)
  })

  test('a character that cannot be set is named by its code, and KaTeX has nothing to warn of', () => {
    const warn = vi.spyOn(console, 'warn').mockImplementation(() => undefined)
    try {
      expect(escapeText('😀')).toBe('[U+1F600]')
      for (let code = 0; code <= 0xffff; code++)
        katex.renderToString(textTex(`a${String.fromCharCode(code)}`), {
          throwOnError: true,
          strict: 'ignore',
          output: 'html',
        })
      expect(warn.mock.calls.map(String)).toEqual([])
    } finally {
      warn.mockRestore()
    }
  })
})
