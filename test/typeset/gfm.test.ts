import { toHtml } from 'hast-util-to-html'
import { describe, expect, it } from 'vitest'
import { parseMarkdown } from '../../src/sheet/markdown.ts'
import { proseToHast } from '../../src/typeset/prose.ts'

const printed = (markdown: string) => toHtml(proseToHast(parseMarkdown(markdown)))

/** The rules of the extensions, each with the section of the GFM specification 0.29-gfm (github.github.com/gfm) that states it. */
describe('GitHub Flavored Markdown in prose', () => {
  it('4.10: a delimiter row makes a table with a head and a body', () => {
    const html = printed('| load | kN |\n| --- | --- |\n| dead | 12 |').replaceAll('\n', '')
    expect(html).toBe(
      '<table><thead><tr><th>load</th><th>kN</th></tr></thead><tbody><tr><td>dead</td><td>12</td></tr></tbody></table>',
    )
  })

  it('4.10: colons in the delimiter row align the column', () => {
    const html = printed('a | b | c\n:-- | :-: | --:\n1 | 2 | 3')
    expect(html).toContain('<td align="left">1</td>')
    expect(html).toContain('<td align="center">2</td>')
    expect(html).toContain('<td align="right">3</td>')
  })

  it('4.10: an escaped pipe belongs to its cell', () => {
    expect(printed('| a |\n| --- |\n| x \\| y |')).toContain('<td>x | y</td>')
  })

  it('4.10: head and delimiter row must have as many cells, else there is no table', () => {
    expect(printed('| a | b |\n| --- |\n| c |')).not.toContain('<table>')
  })

  it('4.10: cells that are missing are empty, and cells too many are left out', () => {
    const html = printed('| a | b |\n| - | - |\n| 1 |\n| 1 | 2 | 3 |')
    expect(html.match(/<td>/g)).toHaveLength(4)
    expect(html).not.toContain('3')
  })

  it('4.10: a table without rows has no body', () => {
    expect(printed('| a |\n| - |')).not.toContain('<tbody>')
  })

  it('5.3: a list item may be a task, done or not', () => {
    const html = printed('- [ ] drawing\n- [x] check')
    expect(html).toContain('<input type="checkbox" disabled> drawing')
    expect(html).toContain('<input type="checkbox" checked disabled> check')
  })

  it('6.5: tildes strike through, but not across paragraphs', () => {
    expect(printed('~~old~~ new')).toBe('<p><del>old</del> new</p>')
    expect(printed('~~old\n\nnew~~')).not.toContain('<del>')
  })

  it('6.9: addresses are links, without the full stop that ends the sentence', () => {
    expect(printed('see www.example.org.')).toBe(
      '<p>see <a href="http://www.example.org">www.example.org</a>.</p>',
    )
    expect(printed('to a.b@example.org.')).toContain('<a href="mailto:a.b@example.org">a.b@example.org</a>.')
  })

  it('6.11: elements that could act on the page have no effect', () => {
    const html = printed('x <iframe src="y"></iframe> <title> <style>')
    expect(html).not.toMatch(/<(iframe|title|style)/)
  })
})
