import { toHtml } from 'hast-util-to-html'
import { describe, expect, it } from 'vitest'
import { fillTemplate } from '../../src/typeset/page-template.ts'

const page = (body: string) => `<!doctype html><html><body>${body}</body></html>`
const filled = (body: string, title: string) =>
  toHtml(fillTemplate(page(body), { title: title === '' ? [] : [{ type: 'text', value: title }] }))

describe('a page template', () => {
  it('has its slots filled, as often as they stand in it', () => {
    expect(filled('<h1><slot name="title"></slot></h1><p><slot name="title"></slot></p>', 'A & B')).toContain(
      '<h1>A &#x26; B</h1><p>A &#x26; B</p>',
    )
  })

  it('keeps what it has in a slot when there is nothing to fill it with', () => {
    expect(filled('<slot name="title">not stated</slot>', '')).toContain('<body>not stated</body>')
  })

  it('may leave a slot out', () => {
    expect(filled('<p>only this</p>', 'A')).toContain('<body><p>only this</p></body>')
  })

  it('is refused when it names a slot that does not exist, with the names that do', () => {
    expect(() => filled('<slot name="titel"></slot>', 'A')).toThrow('a slot `titel`; there are title')
  })

  it('does not fill slots that come with what it is filled with', () => {
    expect(filled('<slot name="title"></slot>', '<slot name="title">')).toContain('&#x3C;slot name="title">')
  })

  it('is not changed by being filled', () => {
    expect(filled('<slot name="title"></slot>', 'one')).not.toBe(filled('<slot name="title"></slot>', 'two'))
  })

  it('loses its comments', () => {
    expect(filled('<!-- for the office -->x', 'A')).not.toContain('office')
  })
})
