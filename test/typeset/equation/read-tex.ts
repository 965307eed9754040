/**
 * Reads the mathematics that the printer makes as a mathematician reads it, and calculates it: what the tests hold against
 * the formula that was printed. It refuses whatever a reader could take in two ways: a factor after a slash, a minus after
 * another operator, a power on a number with a unit, two things side by side without a sign.
 */
export function readTex(tex: string, names: ReadonlyMap<string, number>): number {
  const reader = new Reader(tex, names)
  const value = reader.expression()
  reader.expectEnd()
  return value
}

/** Factors to SI of the units that the tests use, upright after a number. */
const UNITS: Readonly<Record<string, number>> = { m: 1, mm: 0.001, kN: 1000, N: 1 }

const FUNCTIONS: Readonly<Record<string, (...args: number[]) => number>> = {
  '\\sin': Math.sin,
  '\\cos': Math.cos,
  '\\tan': Math.tan,
  '\\exp': Math.exp,
  '\\ln': Math.log,
  '\\log_{10}': Math.log10,
  '\\min': Math.min,
  '\\max': Math.max,
}

const SPACE = /(?:\s|&|\\quad|\\qquad|\\;|\\begin\{aligned\}|\\end\{aligned\})*/y
const NUMBER = /\d{1,3}(?:\\,\d{3})+(?:\.\d+)?|\d+(?:\.\d+)?/y
const OPEN = /\\(?:left|[bB]igl)\(|\(/y
const CLOSE = /\\(?:right|[bB]igr)\)|\)/y
const RELATION = /\\leq |\\geq |<|>|\\neq |=/y

class Reader {
  private at = 0
  private readonly tex: string
  private readonly names: ReadonlyMap<string, number>
  private readonly symbols: readonly string[]

  constructor(tex: string, names: ReadonlyMap<string, number>) {
    this.tex = tex
    this.names = names
    this.symbols = [...names.keys()].sort((a, b) => b.length - a.length)
  }

  expectEnd(): void {
    this.space()
    if (this.at < this.tex.length) this.fail('the end was expected')
  }

  private fail(why: string): never {
    throw new Error(`${why} at ${this.at}: ${this.tex.slice(0, this.at)} >>> ${this.tex.slice(this.at)}`)
  }

  private match(pattern: RegExp): string | undefined {
    pattern.lastIndex = this.at
    const found = pattern.exec(this.tex)?.[0]
    if (found !== undefined) this.at += found.length
    return found
  }

  private space(): void {
    this.match(SPACE)
  }

  private accept(text: string): boolean {
    this.space()
    if (!this.tex.startsWith(text, this.at)) return false
    this.at += text.length
    return true
  }

  private expect(text: string): void {
    if (!this.accept(text)) this.fail(`${text} was expected`)
  }

  /** A row that goes on begins with an operator, before which an empty group gives it its space. */
  private nextRow(): void {
    this.space()
    const start = this.at
    if (!this.accept('\\\\')) return
    this.space()
    if (!/\{\}|\/|\\text\{ (?:and|or) \}/y.test(this.tex.slice(this.at, this.at + 20))) this.at = start
  }

  private operator(...signs: readonly string[]): string | undefined {
    const start = this.at
    this.nextRow()
    this.accept('{}')
    const found = signs.find((sign) => this.accept(sign))
    if (found === undefined) this.at = start
    return found
  }

  condition(): boolean {
    let value = this.conjunction()
    while (this.operator('\\text{ or }')) value = this.conjunction() || value
    return value
  }

  private conjunction(): boolean {
    let value = this.comparison()
    while (this.operator('\\text{ and }')) value = this.comparison() && value
    return value
  }

  private comparison(): boolean {
    if (this.accept('\\text{not }')) return !this.bracketedCondition()
    this.space()
    return this.bracketHoldsRelation() ? this.bracketedCondition() : this.chain()
  }

  /** Whether the bracket that begins here encloses a comparison, rather than a part of one side of it. */
  private bracketHoldsRelation(): boolean {
    const rest = this.tex.slice(this.at)
    if (!/^(?:\\(?:left|[bB]igl)\(|\()/.test(rest)) return false
    let depth = 0
    let inner = ''
    for (const [part] of rest.matchAll(
      /\\(?:begin|left)(?:\{dcases\}|\\\{)|\\end\{dcases\}|\\right\.|[()]|[^()\\]+|\\/g,
    )) {
      const opens = part === '(' || /^\\(?:begin|left)./.test(part)
      const closes = part === ')' || part === '\\end{dcases}' || part === '\\right.'
      if (opens) depth++
      else if (closes) depth--
      else if (depth === 1) inner += part
      if (depth === 0 && closes) break
    }
    return /[<>=]|\\[lgn]eq|\\text\{ (?:and|or) \}|\\text\{not \}/.test(inner)
  }

  private bracketedCondition(): boolean {
    if (this.match(OPEN) === undefined) this.fail('a bracket was expected')
    const value = this.condition()
    this.close()
    return value
  }

  private chain(): boolean {
    let left = this.expression()
    let holds = true
    let count = 0
    for (;;) {
      this.nextRow()
      this.accept('{}')
      this.space()
      const relation = this.match(RELATION)
      if (relation === undefined) break
      const right = this.expression()
      holds &&= this.compare(left, relation.trim(), right)
      left = right
      count++
    }
    if (count === 0) this.fail('a relation was expected')
    return holds
  }

  private compare(a: number, relation: string, b: number): boolean {
    switch (relation) {
      case '\\leq':
        return a <= b
      case '\\geq':
        return a >= b
      case '<':
        return a < b
      case '>':
        return a > b
      case '=':
        return a === b
      default:
        return a !== b
    }
  }

  expression(): number {
    this.space()
    if (this.tex.startsWith('\\begin{dcases}', this.at) || this.tex.startsWith('\\left\\{', this.at))
      return this.cases()
    let value = this.accept('-') ? -this.term() : this.term()
    for (;;) {
      const sign = this.operator('+', '-')
      if (sign === undefined) return value
      value = sign === '+' ? value + this.term() : value - this.term()
    }
  }

  private cases(): number {
    const end = this.accept('\\begin{dcases}') ? '\\end{dcases}' : (this.expect('\\left\\{'), '\\right.')
    let result: number | undefined
    while (!this.accept(end)) {
      const value = this.expression()
      this.skipRow()
      const applies = this.accept('\\text{otherwise}') || (this.expect('\\text{if }'), this.condition())
      this.accept('\\triangleleft')
      this.accept('\\text{applies}')
      this.skipRow()
      if (applies) result ??= value
    }
    if (result === undefined) this.fail('no case applies')
    return result
  }

  private skipRow(): void {
    this.accept('\\\\')
    this.space()
  }

  private term(): number {
    let value = this.factor()
    let afterSlash = false
    for (;;) {
      const sign = this.operator('\\cdot ', '\\times ', '\\,', '/', '\\big/')
      if (sign === undefined) return value
      if (afterSlash) this.fail('after a slash a further factor can be read in two ways')
      const isSlash = sign.endsWith('/')
      const right = this.factor()
      value = isSlash ? value / right : value * right
      afterSlash = isSlash
    }
  }

  private factor(): number {
    const { value, takesPower } = this.atom()
    if (!this.tex.startsWith('^', this.at)) return value
    if (!takesPower) this.fail('a power can be read in two ways here')
    this.at++
    return Math.pow(value, this.group())
  }

  private group(): number {
    this.expect('{')
    const value = this.expression()
    this.expect('}')
    return value
  }

  private close(): void {
    this.space()
    if (this.match(CLOSE) === undefined) this.fail('a closing bracket was expected')
  }

  private atom(): { value: number; takesPower: boolean } {
    this.space()
    const number = this.match(NUMBER)
    if (number !== undefined) return this.quantity(number)
    if (this.accept('\\frac')) return { value: this.group() / this.group(), takesPower: false }
    if (this.accept('\\sqrt')) return { value: this.root(), takesPower: false }
    if (this.match(OPEN) !== undefined) {
      const value = this.expression()
      this.close()
      return { value, takesPower: true }
    }
    const bars = /(?:\\left|\\[bB]igl)?\\(lvert|lfloor|lceil) /y
    const open = this.match(bars)
    if (open !== undefined) return { value: this.enclosed(open), takesPower: true }
    if (this.accept('\\pi ')) return { value: Math.PI, takesPower: true }
    const fn = Object.keys(FUNCTIONS).find((name) => this.accept(name))
    if (fn !== undefined) return { value: this.call(fn), takesPower: false }
    return this.symbol()
  }

  private quantity(text: string): { value: number; takesPower: boolean } {
    const digits = Number(text.replaceAll('\\,', ''))
    const power = /\{\\times\}10\^\{(-?\d+)\}/y
    power.lastIndex = this.at
    const found = power.exec(this.tex)
    if (found) this.at += found[0].length
    const value = found ? digits * Math.pow(10, Number(found[1])) : digits
    const unit = /\\,\\mathrm\{([A-Za-z]+)\}(?:\^\{(-?\d+)\})?/y
    unit.lastIndex = this.at
    const [whole, name = '', exponent = '1'] = unit.exec(this.tex) ?? []
    const factor = UNITS[name]
    if (whole === undefined || factor === undefined)
      return { value, takesPower: !found && !text.includes('\\,') }
    this.at += whole.length
    return { value: value * Math.pow(factor, Number(exponent)), takesPower: false }
  }

  private root(): number {
    let degree = 2
    if (this.accept('[')) {
      degree = this.group()
      this.expect(']')
    }
    return Math.pow(this.group(), 1 / degree)
  }

  private enclosed(open: string): number {
    const value = this.expression()
    this.space()
    if (this.match(/(?:\\right|\\[bB]igr)?\\(?:rvert|rfloor|rceil) /y) === undefined)
      this.fail('a closing bar was expected')
    if (open.includes('lvert')) return Math.abs(value)
    return open.includes('lfloor') ? Math.floor(value) : Math.ceil(value)
  }

  private call(fn: string): number {
    if (this.match(OPEN) === undefined) this.fail('a bracket was expected')
    const args = [this.expression()]
    while (this.accept(',')) {
      this.space()
      this.accept('\\\\')
      args.push(this.expression())
    }
    this.close()
    return FUNCTIONS[fn]?.(...args) ?? NaN
  }

  private symbol(): { value: number; takesPower: boolean } {
    const text = this.symbols.find((symbol) => this.tex.startsWith(symbol, this.at))
    if (text === undefined) return this.fail('no symbol')
    this.at += text.length
    const isWord = text.startsWith('\\mathrm') || text.includes("'")
    return { value: this.names.get(text) ?? NaN, takesPower: !isWord }
  }
}
