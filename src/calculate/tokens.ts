import type { Expression, Point, Span } from '../sheet/types.ts'
import { FormulaError } from './formula-error.ts'

export type TokenKind = 'number' | 'name' | 'text' | 'symbol' | 'end'

export interface Token {
  readonly kind: TokenKind
  readonly text: string
  readonly span: Span
  /** Whether white space stands before it. */
  readonly spaced: boolean
}

const NUMBER = /(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?/y
const NAME = /[A-Za-z][A-Za-z0-9_]*/y
const TEXT = /"(?:[^"\\\n]|\\.)*"|'(?:[^'\\\n]|\\.)*'/y
const SYMBOL = /<=|>=|==|!=|[-+*/^()[\]{},;:?<>.!]/y
const SPACE = /\s+/y

/** What people type that the language does not have, and what to write instead. */
const INSTEAD: Readonly<Record<string, string>> = {
  '%': 'write a percentage as a number, as in `0.05`',
  '·': 'write `*` for a product',
  '×': 'write `*` for a product',
  '−': 'write `-` (hyphen-minus) for minus',
  '≤': 'write `<=`',
  '≥': 'write `>=`',
  '≠': 'write `!=`',
  '=': 'write `==` to compare for equality',
  '#': 'a meaning may only follow the end of a statement',
  '&': 'write `and`',
  '|': 'write `or`, or `abs(x)` for a magnitude',
  π: 'write `pi`',
  '√': 'write `sqrt(x)`',
  '²': 'write `^2`',
  '³': 'write `^3`',
}

/** A formula that no checker could read is refused; it also bounds the depth of the tree. */
const MAX_TOKENS = 2000
const MAX_CHARACTERS = 20_000

function tooLong({ span }: Expression): FormulaError {
  return new FormulaError(
    'limit-exceeded',
    `the formula has more than ${MAX_TOKENS} parts`,
    'divide it over several lines',
    span,
  )
}

/**
 * Splits a formula into tokens with their places in the source.
 * @throws FormulaError `bad-expression` at the first character that starts no token
 */
export function tokenize(expression: Expression): Token[] {
  const { text } = expression
  if (text.length > MAX_CHARACTERS) throw tooLong(expression)
  const place = pointsOf(expression)
  const tokens: Token[] = []
  let at = 0
  let spaced = false
  const take = (pattern: RegExp): string | undefined => {
    pattern.lastIndex = at
    return pattern.exec(text)?.[0]
  }
  while (at < text.length) {
    const space = take(SPACE)
    if (space !== undefined) {
      at += space.length
      spaced = true
      continue
    }
    const found = firstMatch(take)
    if (!found) throw unreadable(text, at, place)
    const [kind, lexeme] = found
    tokens.push({ kind, text: lexeme, span: { start: place(at), end: place(at + lexeme.length) }, spaced })
    if (tokens.length > MAX_TOKENS) throw tooLong(expression)
    at += lexeme.length
    spaced = false
  }
  const end = place(text.length)
  tokens.push({ kind: 'end', text: '', span: { start: end, end }, spaced })
  return tokens
}

function firstMatch(take: (pattern: RegExp) => string | undefined): [TokenKind, string] | undefined {
  const kinds: readonly [TokenKind, RegExp][] = [
    ['number', NUMBER],
    ['name', NAME],
    ['text', TEXT],
    ['symbol', SYMBOL],
  ]
  for (const [kind, pattern] of kinds) {
    const lexeme = take(pattern)
    if (lexeme !== undefined) return [kind, lexeme]
  }
  return undefined
}

function unreadable(text: string, at: number, place: (offset: number) => Point): FormulaError {
  const character = String.fromCodePoint(text.codePointAt(at) ?? 0)
  const greek = GREEK[character]
  const hint =
    INSTEAD[character] ??
    (greek ? `spell Greek letters: \`${greek}\`` : 'use letters, digits, `_` and the operators + - * / ^')
  const message =
    character === '"' || character === "'"
      ? 'the text that begins here is not closed'
      : `\`${character}\` has no meaning in a formula`
  return new FormulaError('bad-expression', message, hint, {
    start: place(at),
    end: place(at + character.length),
  })
}

const GREEK: Readonly<Record<string, string>> = {
  α: 'alpha',
  β: 'beta',
  γ: 'gamma',
  δ: 'delta',
  ε: 'epsilon',
  ζ: 'zeta',
  η: 'eta',
  θ: 'theta',
  ι: 'iota',
  κ: 'kappa',
  λ: 'lambda',
  μ: 'mu',
  ν: 'nu',
  ξ: 'xi',
  ρ: 'rho',
  σ: 'sigma',
  τ: 'tau',
  υ: 'upsilon',
  φ: 'phi',
  χ: 'chi',
  ψ: 'psi',
  ω: 'omega',
  Γ: 'Gamma',
  Δ: 'Delta',
  Θ: 'Theta',
  Λ: 'Lambda',
  Ξ: 'Xi',
  Π: 'Pi',
  Σ: 'Sigma',
  Φ: 'Phi',
  Ψ: 'Psi',
  Ω: 'Omega',
}

/** Maps an offset in the expression's text to its point in the source; an expression may run over several lines. */
function pointsOf({ text, span }: Expression): (offset: number) => Point {
  const starts = [0]
  for (let i = text.indexOf('\n'); i >= 0; i = text.indexOf('\n', i + 1)) starts.push(i + 1)
  return (offset) => {
    let row = starts.length - 1
    while (row > 0 && (starts[row] ?? 0) > offset) row--
    const column = offset - (starts[row] ?? 0) + (row === 0 ? span.start.column : 1)
    return { line: span.start.line + row, column, offset: span.start.offset + offset }
  }
}
