import { h } from 'hastscript'
import { existsSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { assetBytes, assetName, assetPath, ASSETS, KATEX_STYLE } from '../../src/typeset/assets.ts'
import { charactersSeen, FACE_OF_CLASS } from '../../src/typeset/characters.ts'
import { faceRules } from '../../src/typeset/faces.ts'
import { cssString } from '../../src/typeset/style-text.ts'
import { pageOf, sheetText, styleOf } from './page.ts'

const familiesOf = (rules: string) =>
  [...rules.matchAll(/font-family:"([^"]+)"/g)].map(([, family = '']) => family)

describe('the faces that a page carries', () => {
  it('are all in the package, under names that differ', () => {
    for (const asset of ASSETS) expect(existsSync(assetPath(asset))).toBe(true)
    expect(new Set(ASSETS.map(assetName)).size).toBe(ASSETS.length)
  })

  it('follow every class for which KaTeX’s own style sheet asks for a face', () => {
    const style = assetBytes(KATEX_STYLE)
      .toString('utf8')
      .replaceAll(/@font-face\{[^}]*\}/g, '')
    const asking = [...style.matchAll(/([^{}]+)\{[^{}]*font-family:KaTeX_(?!Main)[^{}]*\}/g)]
    const classes = asking.flatMap(([, selectors = '']) =>
      selectors.split(',').map((selector) => /\.([\w-]+)[^.]*$/.exec(selector)?.[1] ?? ''),
    )
    expect(classes.length).toBeGreaterThan(15)
    for (const name of classes) expect(name in FACE_OF_CLASS || /^size[1-4]$/.test(name)).toBe(true)
  })

  it('are those of the letters used, and no more', () => {
    const plain = familiesOf(faceRules(charactersSeen(h('p', 'plain text'))))
    expect(plain).toEqual(['Sheet Text', 'Sheet Text', 'Sheet Text', 'Sheet Signs', 'KaTeX_Main'])
    const greek = familiesOf(faceRules(charactersSeen(h('p', 'θ and Łódź'))))
    expect(greek.filter((family) => family === 'Sheet Text')).toHaveLength(9)
  })

  it('are those of the mathematics used', () => {
    const rules = (tex: string) =>
      new Set(familiesOf(styleOf(pageOf(sheetText(`$${tex}$\n\n\`\`\`check\n1 <= 2\n\`\`\`\n`)).tree)))
    expect(rules('\\mathfrak{A}')).toContain('KaTeX_Fraktur')
    expect(rules('\\mathbb{R}')).toContain('KaTeX_AMS')
    expect(rules('x')).not.toContain('KaTeX_AMS')
    expect(rules('\\Biggl( x \\Biggr)')).toContain('KaTeX_Size4')
  })

  it('take no more than 350 kB of a page with ordinary formulas', () => {
    const { html, tree } = pageOf({ path: 'raking-shore.md' })
    expect(html.length - styleOf(tree).length).toBeGreaterThan(100_000)
    expect(/<style>([^<]*)</.exec(html)?.[1]?.length).toBeLessThan(350_000)
  })
})

describe('a text in the style', () => {
  it('is one CSS string, whatever it holds', () => {
    expect(cssString('a "b"\nc\\ </style>')).toBe('"a \\22 b\\22 \\a c\\5c  \\3c /style\\3e "')
    expect(cssString('Łódź – 3 m, rev. B')).toBe('"Łódź – 3 m, rev. B"')
    expect(cssString('😀')).toBe('"\\1f600 "')
  })
})
