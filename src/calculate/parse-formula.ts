import { isUnit, toSi, unitFactor, unknownUnit } from '../quantity/units.ts'
import type { Expression, Span } from '../sheet/types.ts'
import { FormulaError } from './formula-error.ts'
import { tokenize, type Token } from './tokens.ts'
import type { BinaryOperator, Formula, RelationOperator, UnitExpression } from './types.ts'

export interface ParsedFormula {
  readonly formula: Formula
  /** The unit after `to`, when the statement ends in one. */
  readonly unit?: UnitExpression
}

/** Brackets, conditionals and lists may stand inside each other this deep. */
const MAX_DEPTH = 100

/** Largest power of a unit, and most units in one expression; the SI has no use for more. */
const MAX_UNIT_POWER = 12
const MAX_UNITS = 8

/**
 * Reads a formula: the arithmetic, comparison and conditional part of mathjs's expression syntax, less everything that
 * would let its meaning depend on what is not on the page. A number directly before a name makes a unit; any other name
 * is a value or a function. The precedence of operators is mathjs's (tested against its parser).
 *
 * @param isDefined tells whether a name has been given a value in the sheet, to refuse text with two meanings
 * @throws FormulaError `bad-expression`, `unit-unknown`, `ambiguous-unit`, `limit-exceeded`
 */
export function parseFormula(expression: Expression, isDefined: (name: string) => boolean): ParsedFormula {
  return new Parser(tokenize(expression), isDefined).statement()
}

class Parser {
  private at = 0
  private depth = 0
  private readonly tokens: readonly Token[]
  private readonly isDefined: (name: string) => boolean

  constructor(tokens: readonly Token[], isDefined: (name: string) => boolean) {
    this.tokens = tokens
    this.isDefined = isDefined
  }

  statement(): ParsedFormula {
    if (this.peek().kind === 'end') this.fail('a formula was expected here', 'write a value after `=`')
    const formula = this.conditional()
    let unit: UnitExpression | undefined
    if (this.peekWord('to')) {
      this.next()
      const first = this.next()
      if (first.kind !== 'name')
        this.fail('a unit was expected after `to`', 'write for example `to kN`', first)
      unit = this.unitFrom(first)
    }
    const rest = this.peek()
    if (rest.kind !== 'end') this.failAtRest(rest)
    return unit ? { formula, unit } : { formula }
  }

  private failAtRest(rest: Token): never {
    const before = this.tokens[this.at - 1]
    if (rest.kind === 'name' || rest.kind === 'number' || rest.text === '(') {
      this.fail(
        `an operator was expected between \`${before?.text ?? ''}\` and \`${rest.text}\``,
        'write `*` for a product; only a number directly before a unit needs none',
        rest,
      )
    }
    if (rest.text === ')' || rest.text === ']' || rest.text === '}')
      this.fail(`\`${rest.text}\` closes nothing`, 'remove it, or open it before', rest)
    this.fail(
      `\`${rest.text}\` was not expected here`,
      'end the formula before it, or complete what it begins',
      rest,
    )
  }

  private nested<T>(read: () => T): T {
    this.depth++
    if (this.depth > MAX_DEPTH) {
      throw new FormulaError(
        'limit-exceeded',
        `brackets stand inside each other more than ${MAX_DEPTH} deep`,
        'name a part of the formula on a line of its own',
        this.peek().span,
      )
    }
    const result = read()
    this.depth--
    return result
  }

  private conditional(): Formula {
    const condition = this.or()
    if (!this.peekSymbol('?')) return condition
    this.next()
    return this.nested(() => {
      const then = this.conditional()
      this.expect(':', 'a conditional is written `condition ? a : b`')
      const otherwise = this.conditional()
      return { type: 'case', condition, then, otherwise, span: join(condition, otherwise) }
    })
  }

  private or(): Formula {
    return this.leftAssociative(() => this.and(), ['or'])
  }

  private and(): Formula {
    return this.leftAssociative(() => this.relation(), ['and'])
  }

  private relation(): Formula {
    const operands = [this.sum()]
    const operators: RelationOperator[] = []
    for (let operator = this.relationOperator(); operator; operator = this.relationOperator()) {
      operators.push(operator)
      operands.push(this.sum())
    }
    const [first, ...others] = operands as [Formula, ...Formula[]]
    const last = others.at(-1)
    return last ? { type: 'relation', operators, operands, span: join(first, last) } : first
  }

  private relationOperator(): RelationOperator | undefined {
    const { kind, text } = this.peek()
    if (kind !== 'symbol' || !['<', '<=', '>', '>=', '==', '!='].includes(text)) return undefined
    this.next()
    return text as RelationOperator
  }

  private sum(): Formula {
    return this.leftAssociative(() => this.product(), ['+', '-'])
  }

  private product(): Formula {
    return this.leftAssociative(() => this.signed(), ['*', '/'])
  }

  private leftAssociative(operand: () => Formula, operators: readonly BinaryOperator[]): Formula {
    let left = operand()
    for (let token = this.peek(); isOperator(token, operators); token = this.peek()) {
      this.next()
      const operator = token.text as BinaryOperator
      const right = operand()
      if (operator === '/') this.refuseTwoReadings(left, right)
      left = { type: 'binary', operator, left, right, span: join(left, right), operatorSpan: token.span }
    }
    return left
  }

  /** `1/2 m` is half a metre to one reader and one over two metres to another. */
  private refuseTwoReadings(left: Formula, right: Formula): void {
    const divided = left.type === 'binary' ? left.right : left
    if (divided.type === 'number' && right.type === 'quantity') {
      throw new FormulaError(
        'bad-expression',
        `\`${divided.text}/${right.text}\` followed by a unit can be read in two ways`,
        `write \`(${divided.text}/${right.text})*(1 ${unitAsTyped(right.unit)})\` or \`${divided.text}/(${right.text} ${unitAsTyped(right.unit)})\``,
        join(divided, right),
      )
    }
  }

  private signed(): Formula {
    const token = this.peek()
    if (this.peekSymbol('-') || this.peekSymbol('+') || this.peekWord('not')) {
      this.next()
      const body = this.nested(() => this.signed())
      const operator = token.text as '-' | '+' | 'not'
      return { type: 'unary', operator, body, span: { start: token.span.start, end: body.span.end } }
    }
    return this.power()
  }

  private power(): Formula {
    const base = this.postfix()
    const token = this.peek()
    if (!this.peekSymbol('^')) return base
    this.next()
    const exponent = this.nested(() => this.signed())
    return {
      type: 'binary',
      operator: '^',
      left: base,
      right: exponent,
      span: join(base, exponent),
      operatorSpan: token.span,
    }
  }

  private postfix(): Formula {
    let body = this.primary()
    for (;;) {
      if (this.peekSymbol('[')) {
        const open = this.next()
        const indices = this.list(open, ']')
        if (indices.length === 0) this.fail('an index was expected', 'write for example `v[1]`', open)
        body = { type: 'item', of: body, indices, span: this.spanFrom(body) }
      } else if (this.peekSymbol('.') && body.type !== 'number') {
        this.next()
        const field = this.next()
        if (field.kind !== 'name')
          this.fail('a name was expected after `.`', 'write for example `tube.A`', field)
        body = { type: 'field', of: body, key: field.text, span: this.spanFrom(body) }
      } else return body
    }
  }

  private primary(): Formula {
    const token = this.next()
    switch (token.kind) {
      case 'number':
        return this.numberOrQuantity(token)
      case 'text':
        return { type: 'text', value: unquote(token.text), span: token.span }
      case 'name':
        return this.nameOrCall(token)
      case 'end':
        return this.fail('the formula ends where a value was expected', 'complete it', token)
      case 'symbol':
        return this.bracketed(token)
    }
  }

  private bracketed(token: Token): Formula {
    if (token.text === '(') {
      const body = this.nested(() => this.conditional())
      this.expect(')', `close the bracket opened in column ${token.span.start.column}`)
      return { type: 'group', body, span: this.spanFrom(token) }
    }
    if (token.text === '[') return this.listOrMatrix(token)
    if (token.text === '{') return this.record(token)
    return this.fail(
      `a value was expected, not \`${token.text}\``,
      'write a number, a name or a bracket here',
      token,
    )
  }

  private numberOrQuantity(token: Token): Formula {
    const value = Number(token.text)
    if (!Number.isFinite(value))
      this.fail(`\`${token.text}\` is too large a number`, 'write it with a larger unit', token)
    const following = this.peek()
    if (following.kind !== 'name' || WORDS.has(following.text)) {
      return { type: 'number', value, text: token.text, span: token.span }
    }
    this.next()
    const unit = this.unitFrom(following)
    const { dimension } = unitFactor(unit)
    const si = toSi(value, unit)
    return { type: 'quantity', value, text: token.text, unit, si, dimension, span: this.spanFrom(token) }
  }

  /** Reads on from the first unit name: `kN`, `kN*m/rad`, `N/mm^2`. Stops before anything that is not a unit. */
  private unitFrom(first: Token): UnitExpression {
    const parts = [{ unit: this.unitName(first), exponent: this.unitExponent() }]
    for (;;) {
      if (parts.length > MAX_UNITS)
        this.fail(`a unit is made of at most ${MAX_UNITS} parts`, 'use a unit that is shorter')
      const operator = this.peek()
      const name = this.peek(1)
      const juxtaposed = operator.kind === 'name' && isUnit(operator.text)
      if (juxtaposed) {
        this.next()
        parts.push({ unit: this.unitName(operator), exponent: this.unitExponent() })
      } else if (
        isOperator(operator, ['*', '/']) &&
        name.kind === 'name' &&
        isUnit(name.text) &&
        !this.isCallOrPath(2)
      ) {
        this.next()
        this.next()
        const unit = this.unitName(name)
        const exponent = this.unitExponent()
        parts.push({ unit, exponent: operator.text === '/' ? -exponent : exponent })
      } else return parts
    }
  }

  private isCallOrPath(ahead: number): boolean {
    const { kind, text } = this.peek(ahead)
    return kind === 'symbol' && (text === '(' || text === '.' || text === '[')
  }

  private unitName(token: Token): string {
    const { text } = token
    if (!isUnit(text)) {
      const { problem, suggestion } = unknownUnit(text)
      const hint = this.isDefined(text)
        ? `\`${text}\` is a value of this sheet: write \`*\` before it`
        : (suggestion ?? '`stanchion explain units` lists the units; write `*` for a product')
      throw new FormulaError(
        'unit-unknown',
        `a number directly before \`${text}\` makes it a unit: ${problem}`,
        hint,
        token.span,
      )
    }
    if (this.isDefined(text)) {
      throw new FormulaError(
        'ambiguous-unit',
        `\`${text}\` is a unit here and also a value of this sheet`,
        `close the number before it, as in \`(5 kN)/${text}\`, to mean the value; or give the value another name`,
        token.span,
      )
    }
    return text
  }

  private unitExponent(): number {
    if (!this.peekSymbol('^')) return 1
    const caret = this.next()
    const negative = this.peekSymbol('-')
    if (negative) this.next()
    const digits = this.next()
    const power = Number(digits.text)
    if (digits.kind !== 'number' || !(power > 0 && power <= MAX_UNIT_POWER))
      this.fail(`the power of a unit is a number up to ${MAX_UNIT_POWER}`, 'write for example `mm^2`', caret)
    return negative ? -power : power
  }

  private nameOrCall(token: Token): Formula {
    const { text, span } = token
    if (text === 'true' || text === 'false') return { type: 'truth', value: text === 'true', span }
    if (text === 'pi') return { type: 'constant', name: 'pi', span }
    if (WORDS.has(text))
      this.fail(`\`${text}\` was not expected here`, `\`${text}\` is a word of the language`, token)
    if (this.peekSymbol('(')) {
      const open = this.next()
      const args = this.list(open, ')')
      return { type: 'call', name: text, args, span: this.spanFrom(token) }
    }
    const path = [text]
    while (this.peekSymbol('.') && this.peek(1).kind === 'name') {
      this.next()
      path.push(this.next().text)
    }
    return { type: 'name', path, span: this.spanFrom(token) }
  }

  private list(open: Token, close: ')' | ']'): Formula[] {
    const items: Formula[] = []
    if (!this.peekSymbol(close)) {
      do items.push(this.nested(() => this.conditional()))
      while (this.accept(','))
    }
    this.expect(close, `close the bracket opened in column ${open.span.start.column}`)
    return items
  }

  private listOrMatrix(open: Token): Formula {
    const rows: Formula[][] = [[]]
    if (!this.peekSymbol(']')) {
      do rows.at(-1)?.push(this.nested(() => this.conditional()))
      while (this.accept(',') || (this.accept(';') && rows.push([])))
    }
    this.expect(']', `close the bracket opened in column ${open.span.start.column}`)
    const span = this.spanFrom(open)
    const [only] = rows
    if (rows.length === 1 && only) return { type: 'list', items: only, span }
    return { type: 'list', items: rows.map((items) => ({ type: 'list', items, span })), span }
  }

  private record(open: Token): Formula {
    const fields: { key: string; value: Formula }[] = []
    if (!this.peekSymbol('}')) {
      do {
        const key = this.next()
        if (key.kind !== 'name' && key.kind !== 'text')
          this.fail('the name of an entry was expected', 'write for example `{L: 4.6 m}`', key)
        const name = key.kind === 'text' ? unquote(key.text) : key.text
        if (fields.some((field) => field.key === name))
          this.fail(`\`${name}\` is given twice`, 'keep one', key)
        this.expect(':', `write \`${name}: value\``)
        fields.push({ key: name, value: this.nested(() => this.conditional()) })
      } while (this.accept(','))
    }
    this.expect('}', `close the brace opened in column ${open.span.start.column}`)
    return { type: 'record', fields, span: this.spanFrom(open) }
  }

  private peek(ahead = 0): Token {
    return this.tokens[Math.min(this.at + ahead, this.tokens.length - 1)] as Token
  }

  private next(): Token {
    const token = this.peek()
    if (this.at < this.tokens.length - 1) this.at++
    return token
  }

  private peekSymbol(text: string): boolean {
    const token = this.peek()
    return token.kind === 'symbol' && token.text === text
  }

  private peekWord(text: string): boolean {
    const token = this.peek()
    return token.kind === 'name' && token.text === text
  }

  private accept(symbol: string): boolean {
    if (!this.peekSymbol(symbol)) return false
    this.next()
    return true
  }

  private expect(symbol: string, hint: string): void {
    if (this.accept(symbol)) return
    const { kind, text } = this.peek()
    const found = kind === 'end' ? 'the formula ends' : `\`${text}\` stands`
    this.fail(`${found} where \`${symbol}\` was expected`, hint)
  }

  private spanFrom(first: { readonly span: Span }): Span {
    const last = this.tokens[Math.max(this.at - 1, 0)] as Token
    return { start: first.span.start, end: last.span.end }
  }

  private fail(message: string, hint: string, token: Token = this.peek()): never {
    throw new FormulaError('bad-expression', message, hint, token.span)
  }
}

/** Names with a fixed meaning: they are neither values nor units. */
const WORDS: ReadonlySet<string> = new Set(['and', 'or', 'not', 'to', 'true', 'false', 'pi'])

/** Names that a sheet cannot define. */
export function isReservedName(name: string): boolean {
  return WORDS.has(name) || name === 'Infinity' || name === 'NaN'
}

function isOperator(token: Token, operators: readonly string[]): boolean {
  return token.kind !== 'text' && token.kind !== 'number' && operators.includes(token.text)
}

function join(first: { readonly span: Span }, last: { readonly span: Span }): Span {
  return { start: first.span.start, end: last.span.end }
}

function unquote(text: string): string {
  return text.slice(1, -1).replace(/\\(.)/g, '$1')
}

/** A unit expression as the sheet language writes it: `kN*m/rad`. */
export function unitAsTyped(unit: UnitExpression): string {
  return unit
    .map(({ unit: name, exponent }, i) => {
      const power = Math.abs(exponent) === 1 ? '' : `^${Math.abs(exponent)}`
      const joiner = i === 0 ? (exponent < 0 ? '1/' : '') : exponent < 0 ? '/' : '*'
      return `${joiner}${name}${power}`
    })
    .join('')
}
