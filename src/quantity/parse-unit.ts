import { readRaised } from './exponent.ts'
import { UNITS } from './unit-table.ts'
import { unknownUnit, type UnitProblem } from './unknown-unit.ts'
import type { UnitExpression } from './units.ts'

export function isUnitProblem(result: UnitExpression | UnitProblem): result is UnitProblem {
  return 'problem' in result
}

const LONGEST = 100
/** The sum of all powers, so that no factor can leave the range of a double. */
const LARGEST_EXPONENT = 24

/** One piece at a time: a number, a name, raised digits, or a sign. */
const TOKEN = /\s*(?:(\d+(?:\.\d+)?)|([\p{L}°%‰℃℉][\p{L}_]*)|([⁻⁰¹²³⁴⁵⁶⁷⁸⁹]+)|(\*\*|[*·⋅∙×/^()\-−]))/uy

interface Token {
  readonly text: string
  readonly type: 'number' | 'name' | 'raised' | 'sign'
}

type Part = UnitExpression[number]
type Outcome = Part[] | UnitProblem

/**
 * Reads a unit: names of the table joined by `*`, `·` or `/`, with powers as `^2`, `^-1`, `^(1/2)` or `²`, and brackets.
 * `/` takes the one factor after it, as in any formula: `kN/m*s` is kN·s/m. The parts come back in the order written,
 * nothing cancelled, so that a moment per metre stays `kN·m/m`. An empty text is a plain number.
 */
export function parseUnit(text: string): UnitExpression | UnitProblem {
  if (text.length > LONGEST) return { problem: `a unit has at most ${String(LONGEST)} characters` }
  const tokens = tokenize(text)
  if ('problem' in tokens) return tokens
  if (tokens.length === 0) return []
  const reader = new UnitReader(text.trim(), tokens)
  return reader.whole()
}

function tokenize(text: string): Token[] | UnitProblem {
  const tokens: Token[] = []
  const source = text.trimEnd()
  TOKEN.lastIndex = 0
  while (TOKEN.lastIndex < source.length) {
    const start = TOKEN.lastIndex
    const match = TOKEN.exec(source)
    if (match === null) {
      const [character] = source.slice(start).trimStart()
      return { problem: `\`${character ?? ''}\` cannot stand in a unit`, suggestion: FORMS }
    }
    const [, number, name, raised, sign] = match
    if (number !== undefined) tokens.push({ type: 'number', text: number })
    else if (name !== undefined) tokens.push({ type: 'name', text: name })
    else if (raised !== undefined) tokens.push({ type: 'raised', text: raised })
    else tokens.push({ type: 'sign', text: sign ?? '' })
  }
  return tokens
}

const FORMS = 'write units as `kN*m`, `N/mm^2` or `kN*m/rad`'
const PRODUCT = new Set(['*', '·', '⋅', '∙', '×'])

class UnitReader {
  private at = 0

  constructor(
    private readonly text: string,
    private readonly tokens: readonly Token[],
  ) {}

  whole(): UnitExpression | UnitProblem {
    const parts = this.product()
    if ('problem' in parts) return parts
    const next = this.tokens[this.at]
    if (next !== undefined) return this.strayed(next)
    const powers = parts.reduce((sum, part) => sum + Math.abs(part.exponent), 0)
    if (powers <= LARGEST_EXPONENT) return parts
    return { problem: `the powers in \`${this.text}\` add up to more than ${String(LARGEST_EXPONENT)}` }
  }

  private product(): Outcome {
    const parts: Part[] = []
    let direction = 1
    // `1/m` and a leading `/m`, as after a number: `0.3 /m`
    if (this.tokens[this.at]?.text === '1') this.at++
    else if (this.tokens[this.at]?.text !== '/') {
      const first = this.power()
      if ('problem' in first) return first
      parts.push(...first)
    }
    for (;;) {
      const sign = this.tokens[this.at]?.text
      if (sign === undefined || !(PRODUCT.has(sign) || sign === '/')) return parts
      this.at++
      direction = sign === '/' ? -1 : 1
      const factor = this.power()
      if ('problem' in factor) return factor
      for (const { unit, exponent } of factor) parts.push({ unit, exponent: exponent * direction })
    }
  }

  private power(): Outcome {
    const body = this.factor()
    if ('problem' in body) return body
    const exponent = this.exponent()
    if (typeof exponent !== 'number') return exponent
    const raisedParts = body.map((part) => ({ unit: part.unit, exponent: part.exponent * exponent }))
    const tooLarge = raisedParts.find((part) => Math.abs(part.exponent) > LARGEST_EXPONENT)
    if (exponent !== 0 && tooLarge === undefined) return raisedParts
    return { problem: `the power ${String(exponent)} in \`${this.text}\` is out of range`, suggestion: FORMS }
  }

  private factor(): Outcome {
    const token = this.tokens[this.at]
    if (token === undefined)
      return { problem: `\`${this.text}\` ends where a unit should follow`, suggestion: FORMS }
    this.at++
    if (token.text === '(') {
      const parts = this.product()
      if ('problem' in parts) return parts
      if (this.tokens[this.at]?.text !== ')')
        return { problem: `a bracket in \`${this.text}\` is not closed` }
      this.at++
      return parts
    }
    if (token.type !== 'name') return this.strayed(token)
    if (UNITS[token.text] === undefined) return this.unknown(token.text)
    return [{ unit: canonical(token.text), exponent: 1 }]
  }

  /** The power after a factor; 1 when there is none. */
  private exponent(): number | UnitProblem {
    const token = this.tokens[this.at]
    if (token?.type === 'raised') {
      this.at++
      return readRaised(token.text) ?? { problem: `\`${token.text}\` in \`${this.text}\` is no power` }
    }
    if (token?.text !== '^' && token?.text !== '**') return 1
    this.at++
    const bracketed = this.take('(')
    const value = this.ratio(bracketed)
    if (typeof value === 'number' && bracketed && !this.take(')')) {
      return { problem: `a bracket in \`${this.text}\` is not closed` }
    }
    return value
  }

  private ratio(bracketed: boolean): number | UnitProblem {
    const negative = this.take('-') || this.take('−')
    const over = this.number()
    if (over === undefined) {
      return { problem: `a number should follow \`^\` in \`${this.text}\``, suggestion: FORMS }
    }
    const under = bracketed && this.take('/') ? this.number() : 1
    if (under === undefined || under === 0) return { problem: `the power in \`${this.text}\` is no number` }
    return (negative ? -over : over) / under
  }

  private number(): number | undefined {
    const token = this.tokens[this.at]
    if (token?.type !== 'number') return undefined
    this.at++
    return Number(token.text)
  }

  private take(sign: string): boolean {
    if (this.tokens[this.at]?.text !== sign) return false
    this.at++
    return true
  }

  private unknown(name: string): UnitProblem {
    const next = this.tokens[this.at]
    return unknownUnit(name, name + (next?.type === 'number' ? next.text : ''))
  }

  private strayed(token: Token): UnitProblem {
    const before = this.tokens[this.tokens.indexOf(token) - 1]
    if (before?.type === 'name' && token.type === 'number') {
      const better = this.text.replaceAll(/(\p{L})(\d)/gu, '$1^$2')
      return { problem: `a power in \`${this.text}\` has no \`^\``, suggestion: `write \`${better}\`` }
    }
    if (before?.type === 'name' && (token.type === 'name' || token.text === '-')) {
      const better = this.text.replaceAll(/\s*-\s*|(?<=\p{L})\s+(?=\p{L})/gu, '*')
      return {
        problem: `a product in \`${this.text}\` is not written with \`*\``,
        suggestion: `write \`${better}\``,
      }
    }
    return { problem: `\`${token.text}\` was not expected in the unit \`${this.text}\``, suggestion: FORMS }
  }
}

function canonical(name: string): string {
  return name === 'inch' ? 'in' : name === '°' ? 'deg' : name === 'µm' || name === 'μm' ? 'um' : name
}
