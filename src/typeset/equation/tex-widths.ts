import { GREEK_CAPITAL, GREEK_SMALL, IDEOGRAPH, ITALIC, MARKS, OTHER, UPRIGHT } from './glyph-widths.ts'

// Widths of the commands that this folder's TeX is made of, in em, from KaTeX's style sheet and TeX's spacing.

export type Face = 'italic' | 'upright'

/** Each script is this much smaller than what it stands at. */
export const SCRIPT = 0.7
/** Bold figures are this much wider. */
export const BOLD = 1.15
export const SPACES: ReadonlyMap<string, number> = new Map([
  [',', 0.17],
  [';', 0.28],
  [' ', 0.25],
  ['quad', 1],
  ['qquad', 2],
])
export const RELATIONS = new Set(['leq', 'geq', 'neq', 'nleq', 'ngeq', 'nless', 'ngtr', '=', '<', '>'])
export const BINARY = new Map([
  ['times', 0.78],
  ['cdot', 0.28],
  ['+', 0.78],
  ['-', 0.78],
])
export const DELIMITER_SIZES = new Map([
  ['left', 0.62],
  ['right', 0.62],
  ['bigl', 0.46],
  ['bigr', 0.46],
  ['Bigl', 0.6],
  ['Bigr', 0.6],
  ['big', 0.58],
])
export const DELIMITERS = new Set([
  'lvert',
  'rvert',
  'lVert',
  'rVert',
  'lfloor',
  'rfloor',
  'lceil',
  'lbrack',
  'rbrack',
  'rceil',
  '{',
  '}',
])
export const ENDS = new Set(['end', 'right', '\\'])
/** What stands around and between the columns. */
export const ENVIRONMENTS: ReadonlyMap<string, { readonly around: number; readonly between: number }> =
  new Map([
    ['dcases', { around: 1.4, between: 1 }],
    ['pmatrix', { around: 1.6, between: 1 }],
    ['array', { around: 1, between: 1 }],
    ['aligned', { around: 0, between: 0 }],
  ])

export function glyphWidth(character: string, face: Face): number {
  const letter = (face === 'italic' ? ITALIC : UPRIGHT).get(character) ?? MARKS.get(character)
  if (letter !== undefined) return letter
  return character >= '\u3000' ? IDEOGRAPH : OTHER
}

export function namedWidth(name: string): number {
  if (name === 'hline') return 0
  if (name === 'pi' || name.startsWith('var')) return GREEK_SMALL
  if (/^(?:sin|cos|tan|cot|exp|min|max|det|ln|log|arc|sinh|cosh|tanh)/.test(name))
    return name.length * 0.5 + 0.17
  if (/^text/.test(name) || name.length === 1) return 0.5
  if (name === 'triangle' || name === 'ldots' || name === 'cdots') return 1.2
  return /^[A-Z]/.test(name) ? GREEK_CAPITAL : GREEK_SMALL
}
