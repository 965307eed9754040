import { assetBytes, katexFace, SIGNS, textFace } from './assets.ts'
import type { Seen } from './characters.ts'

/** The characters each web file of the text face holds, as its publisher divides them. */
const SUBSETS: readonly (readonly [subset: string, range: string])[] = [
  ['cyrillic-ext', 'U+0460-052F,U+1C80-1C8A,U+20B4,U+2DE0-2DFF,U+A640-A69F,U+FE2E-FE2F'],
  ['cyrillic', 'U+0301,U+0400-045F,U+0490-0491,U+04B0-04B1,U+2116'],
  ['greek-ext', 'U+1F00-1FFF'],
  ['greek', 'U+0370-0377,U+037A-037F,U+0384-038A,U+038C,U+038E-03A1,U+03A3-03FF'],
  [
    'vietnamese',
    'U+0102-0103,U+0110-0111,U+0128-0129,U+0168-0169,U+01A0-01A1,U+01AF-01B0,U+0300-0301,U+0303-0304,U+0308-0309,U+0323,U+0329,U+1EA0-1EF9,U+20AB',
  ],
  [
    'latin-ext',
    'U+0100-02BA,U+02BD-02C5,U+02C7-02CC,U+02CE-02D7,U+02DD-02FF,U+0304,U+0308,U+0329,U+1D00-1DBF,U+1E00-1E9F,U+1EF2-1EFF,U+2020,U+20A0-20AB,U+20AD-20C4,U+2113,U+2C60-2C7F,U+A720-A7FF',
  ],
  [
    'latin',
    'U+0000-00FF,U+0131,U+0152-0153,U+02BB-02BC,U+02C6,U+02DA,U+02DC,U+0304,U+0308,U+0329,U+2000-206F,U+20AC,U+2122,U+2191,U+2193,U+2212,U+2215,U+FEFF,U+FFFD',
  ],
]

const STYLES = [
  [400, 'normal'],
  [400, 'italic'],
  [600, 'normal'],
] as const

/** The `@font-face` rules for what a page shows, each with its font inside. */
export function faceRules(seen: Seen): string {
  const subsets = SUBSETS.filter(([subset, range]) => subset === 'latin' || hasAny(seen.text, range))
  const text = subsets.flatMap(([subset, range]) =>
    STYLES.map(([weight, style]) =>
      rule(
        'Sheet Text',
        textFace(subset, weight, style),
        `${style};font-weight:${String(weight)};unicode-range:${range}`,
      ),
    ),
  )
  const signs = rule('Sheet Signs', SIGNS, 'normal;font-weight:400 600')
  // The mathematical face also serves arrows in text.
  const math = ['Main-Regular', ...seen.math].sort().map((face) => mathRule(face))
  return [...text, signs, ...new Set(math)].join('\n')
}

function mathRule(face: string): string {
  const [family = '', cut = ''] = face.split('-')
  const style = cut.endsWith('Italic') ? 'italic' : 'normal'
  const weight = cut.startsWith('Bold') ? 700 : 400
  return rule(`KaTeX_${family}`, katexFace(face), `${style};font-weight:${String(weight)}`)
}

const rules = new Map<string, string>()

function rule(family: string, asset: string, style: string): string {
  let text = rules.get(asset)
  if (text === undefined) {
    const source = `url(data:font/woff2;base64,${assetBytes(asset).toString('base64')}) format("woff2")`
    text = `@font-face{font-family:"${family}";font-style:${style};font-display:block;src:${source}}`
    rules.set(asset, text)
  }
  return text
}

function hasAny(seen: ReadonlySet<number>, range: string): boolean {
  return boundsOf(range).some(([from, to]) => {
    for (const code of seen) if (code >= from && code <= to) return true
    return false
  })
}

const bounds = new Map<string, readonly (readonly [number, number])[]>()

function boundsOf(range: string): readonly (readonly [number, number])[] {
  let found = bounds.get(range)
  if (found === undefined) {
    found = range.split(',').map((part) => {
      const [from = '', to = from] = part.slice(2).split('-')
      return [parseInt(from, 16), parseInt(to, 16)] as const
    })
    bounds.set(range, found)
  }
  return found
}
