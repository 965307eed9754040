import type { Element, ElementContent } from 'hast'
import { fromHtml } from 'hast-util-from-html'
import { toHtml } from 'hast-util-to-html'
import katex from 'katex'
import { describe, expect, test } from 'vitest'
import { markupTree } from '../../../src/typeset/equation/markup-tree.ts'
import { renderMath, renderProseMath } from '../../../src/typeset/equation/render.ts'

const html = (children: ElementContent[]) => toHtml({ type: 'root', children })

function find(nodes: readonly ElementContent[], matches: (element: Element) => boolean): Element[] {
  return nodes.flatMap((node) =>
    node.type === 'element' ? [...(matches(node) ? [node] : []), ...find(node.children, matches)] : [],
  )
}

const named = (tag: string) => (element: Element) => element.tagName === tag
const hidden = (element: Element) => element.properties.ariaHidden !== undefined

const SAMPLES = [
  'x<y',
  '\\frac{\\sqrt{a}}{b}',
  "f'_{1}\\text{a \\& “b” <c>}",
  '\\begin{pmatrix}1&2\\\\3&4\\end{pmatrix}\\nleq\\bar{\\lambda}',
  '\\left(\\begin{array}{l|c}a&b\\\\\\hline c&d\\end{array}\\right)',
  '\\overline{\\mathrm{EI}}\\widehat{abc}\\left\\lvert\\frac{\\frac{a}{b}}{c}\\right\\rvert',
]

describe('equations as a tree', () => {
  test.each(SAMPLES)('%s is the tree that a parser of HTML makes of KaTeX’s markup', (tex) => {
    const markup = katex.renderToString(tex, { displayMode: true })
    const expected = toHtml(fromHtml(markup, { fragment: true }))
    expect(html(markupTree(markup))).toBe(expected)
  })

  test('markup of another make is refused', () => {
    for (const markup of ['<span>', '<span></div>', '<span class=a></span>', '</span>', '<'])
      expect(() => markupTree(markup), markup).toThrow('not as expected')
  })

  test('on the screen the MathML is spoken and the visible formula hidden from reading programs', () => {
    const tree = renderMath('x^{2}', { display: true, words: 'x squared' })
    const [math] = find(tree, named('math'))
    expect(math?.properties.alttext).toBe('x squared')
    expect(find(tree, hidden)).toHaveLength(1)
  })

  test('in a PDF the visible formula is a figure with its words, and nothing is hidden', () => {
    const tree = renderMath('x^{2}', { display: true, words: 'x "squared"', forPdf: true })
    expect(find(tree, named('math'))).toHaveLength(0)
    expect(find(tree, hidden)).toHaveLength(0)
    const [figure] = find(tree, ({ properties }) => properties.role === 'img')
    expect(figure?.properties.ariaLabel).toBe('x "squared"')
  })

  test('the same formula gives the same tree, whatever came before', () => {
    const before = html(renderMath('x+y', { display: false, words: '' }))
    expect(renderProseMath('\\gdef\\x{1}\\def\\frac{2}x', false)).toHaveProperty('ok')
    expect(html(renderMath('x+y', { display: false, words: '' }))).toBe(before)
    expect(renderProseMath('\\x', false)).toHaveProperty('problem')
    expect(renderProseMath('\\frac{a}{b}', false)).toHaveProperty('ok')
  })

  test('a formula of our own that KaTeX refuses is an error with its cause', () => {
    expect(() => renderMath('\\nosuch', { display: false, words: '' })).toThrow('cannot be set')
  })
})

describe('mathematics in prose', () => {
  test('is set', () => {
    expect(renderProseMath('N_{cr} = \\frac{\\pi^2 EI}{L^2}', true)).toHaveProperty('ok')
  })

  test.each([
    ['a + \\foo', 'undefined control sequence: \\foo', 4],
    ['x^{2', 'expected `}`, got the end', 4],
    ['a}', 'expected the end, got `}`', 1],
    ['\\frac{a}', 'unexpected end of input in a macro argument, expected `}`', 8],
    ['x_1_2', 'double subscript', 3],
    ['a😀', 'it has a character that cannot be set', 1],
  ])('%s is refused with the fact and its place', (tex, problem, offset) => {
    const result = renderProseMath(tex, false)
    expect(result).toEqual({ problem, offset })
  })

  test.each([
    '\\href{https://example.org}{x}',
    '\\includegraphics{a.png}',
    '\\htmlStyle{color: red}{x}',
    'a \\url{b}',
  ])('%s is not allowed, since it names something outside the formula', (tex) =>
    expect(renderProseMath(tex, false)).toMatchObject({
      problem: expect.stringContaining('not allowed') as string,
    }),
  )

  test('an endless macro, a huge size and deep nesting do no harm', () => {
    expect(renderProseMath('\\def\\x{\\x\\x}\\x', false)).toHaveProperty('problem')
    expect(JSON.stringify(renderProseMath('\\rule{9999em}{9999em}', false))).not.toContain('9999em"')
    expect(Object.keys(renderProseMath(`${'{'.repeat(20000)}x${'}'.repeat(20000)}`, false))).toHaveLength(1)
  })
})
