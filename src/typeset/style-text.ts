import { assetBytes, KATEX_STYLE, templateText } from './assets.ts'
import type { Seen } from './characters.ts'
import { faceRules } from './faces.ts'

export type Paper = 'A4' | 'Letter'

/** What the margins of every printed page say, as named in `templates/print.css`. A text of several lines is divided by `\n`. */
export type MarginTexts = Readonly<Record<string, string | undefined>>

/** The whole style of a page: fonts, mathematics, the template's style, and this sheet's own margin texts and paper. */
export function styleText(seen: Seen, paper: Paper, margins: MarginTexts): string {
  return [
    faceRules(seen),
    mathStyle(),
    templateText('print.css'),
    `@page{size:${paper === 'A4' ? '210mm 297mm' : '8.5in 11in'}}`,
    `:root{${Object.entries(margins)
      .map(([name, text]) => `--${name}:${text === undefined ? 'none' : cssString(text)}`)
      .join(';')}}`,
  ].join('\n')
}

/** Any text as a CSS string that can neither end the string nor the style element. */
export function cssString(text: string): string {
  const escaped = text.replaceAll(/[^\p{L}\p{N} .,;:·–—/()[\]+=×%-]/gu, (character) => {
    return `\\${(character.codePointAt(0) ?? 0).toString(16)} `
  })
  return `"${escaped}"`
}

let math: string | undefined

function mathStyle(): string {
  math ??= assetBytes(KATEX_STYLE)
    .toString('utf8')
    .replaceAll(/@font-face\{[^}]*\}/g, '')
  return math
}
