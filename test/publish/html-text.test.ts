import { h } from 'hastscript'
import type { Root } from 'hast'
import { describe, expect, it } from 'vitest'
import { htmlText } from '../../src/publish/html-text.ts'

const root = (...children: Root['children']): Root => ({ type: 'root', children })

describe('the text of a page', () => {
  it('is HTML with its doctype, ended by a newline', () => {
    expect(htmlText(root({ type: 'doctype' }, h('p', 'a')))).toBe('<!doctype html><p>a</p>\n')
  })

  it('cannot be broken out of by what a sheet says', () => {
    const text = htmlText(root(h('p', { title: '"><script>x</script>' }, '<script>x</script>')))
    // Inside a quoted attribute only the quote ends it (HTML standard, attribute value state).
    expect(text).toBe('<p title="&#x22;><script>x</script>">&#x3C;script>x&#x3C;/script></p>\n')
  })

  it('leaves signs beyond ASCII as they are', () => {
    expect(htmlText(root(h('p', 'λ̄ ≤ 1 · 2\u202f000 N/mm²')))).toBe('<p>λ̄ ≤ 1 · 2\u202f000 N/mm²</p>\n')
  })
})
