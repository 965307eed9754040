/** Marks, joiners and other characters that take no place of their own. */
const NO_WIDTH = /[\p{Mark}\u200b-\u200d\u2060\ufeff]/u

/** First and last of the ranges that East Asian Width (Unicode Standard Annex 11) calls wide, with the pictographs; from memory of its table. */
const WIDE: readonly (readonly [number, number])[] = [
  [0x1100, 0x115f],
  [0x2e80, 0xa4cf],
  [0xac00, 0xd7a3],
  [0xf900, 0xfaff],
  [0xfe30, 0xfe6f],
  [0xff00, 0xff60],
  [0xffe0, 0xffe6],
  [0x1f300, 0x1faff],
  [0x20000, 0x3fffd],
]

/** Columns that a text without tabs takes on a terminal. */
export function displayWidth(text: string): number {
  let width = 0
  for (const character of text) width += widthOf(character)
  return width
}

function widthOf(character: string): number {
  if (NO_WIDTH.test(character)) return 0
  const code = character.codePointAt(0) ?? 0
  return WIDE.some(([first, last]) => code >= first && code <= last) ? 2 : 1
}
