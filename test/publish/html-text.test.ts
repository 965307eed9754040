import { fromHtml } from 'hast-util-from-html'
import { toHtml } from 'hast-util-to-html'
import { h, s } from 'hastscript'
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

const HARD: readonly [string, Root][] = [
  [
    'attributes of every kind',
    root(h('input', { type: 'checkbox', checked: true, disabled: false, className: ['a', 'b'] })),
  ],
  [
    'names that differ from their properties',
    root(h('td', { colSpan: 2, ariaLabel: 'x & "y"', httpEquiv: 'z', dataLineNumber: '4' }, 'a')),
  ],
  ['lists that are parted by commas', root(h('input', { accept: ['.a', '.b'] }))],
  [
    'drawings',
    root(
      s('svg', { viewBox: '0 0 1 1', className: ['bar'] }, [
        s('path', { d: 'M0 0', strokeWidth: 2 }),
        s('rect', { width: '1' }),
      ]),
    ),
  ],
  ['elements without content', root(h('p', ['a', h('br'), 'b', h('img', { src: 'data:,', alt: '' })]))],
  [
    'white space',
    root(h('pre', [{ type: 'text', value: ' a\n\n b ' }]), h('ul', [h('li', 'a'), h('li', 'b')])),
  ],
]

describe('the text of a page, read again', () => {
  const readAgain = (text: string) => fromHtml(text, { fragment: true })
  const bare = (tree: Root) =>
    JSON.stringify(tree, (key, value: unknown) => (key === 'position' || key === 'data' ? undefined : value))

  it.each(HARD)('is what hast-util-to-html writes: %s', (_name, tree) => {
    expect(bare(readAgain(htmlText(tree).trimEnd()))).toBe(bare(readAgain(toHtml(tree))))
  })

  it('refuses what would end a style too early, and what is no HTML', () => {
    expect(() => htmlText(root(h('style', '</STYLE>')))).toThrow('would end it')
    expect(() => htmlText(root({ type: 'raw', value: '<script>' } as never))).toThrow(
      'a raw cannot be written',
    )
    expect(() => htmlText(root(h('p', { 'a onclick="x"': 'y' })))).toThrow('cannot name an attribute')
  })
})
