/** Advance widths in hundredths of an em, from the metrics of KaTeX 0.16 (Computer Modern, D. E. Knuth). */
function widths(letters: string, hundredths: string): ReadonlyMap<string, number> {
  const numbers = hundredths.split(' ').map((text) => Number(text) / 100)
  return new Map([...letters].map((letter, i) => [letter, numbers[i] ?? 0]))
}

const LETTERS = 'ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz'

export const ITALIC = widths(
  LETTERS,
  '75 76 71 83 74 64 79 83 44 55 85 68 97 80 76 64 79 76 61 58 68 58 94 83 58 68 ' +
    '53 43 43 52 47 49 48 58 34 41 52 30 88 60 48 50 45 45 47 36 57 48 72 57 49 47',
)

export const UPRIGHT = widths(
  LETTERS,
  '75 71 72 76 68 65 78 75 36 51 78 63 92 75 78 68 78 74 56 72 75 75 103 75 75 61 ' +
    '50 56 44 56 44 31 50 56 28 31 53 28 83 56 50 56 53 39 39 39 56 53 72 53 53 44',
)

/** Digits, signs and marks. */
export const MARKS = widths(
  "0123456789.,;:()[]|/°“”‘’'-%&#_ ",
  `${'50 '.repeat(10)}28 28 28 28 39 39 28 28 28 50 75 50 50 28 28 28 33 83 78 83 31 25`,
)

/** Greek letters by their command; the widest of each case for the rest. */
export const GREEK_SMALL = 0.65
export const GREEK_CAPITAL = 0.83

/** For any character that is in none of the tables; ideographs are as wide as an em. */
export const OTHER = 0.78
export const IDEOGRAPH = 1
