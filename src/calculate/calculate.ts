import type { VFileMessage } from 'vfile-message'
import { finding, type FindingInput } from '../finding.ts'
import type {
  Acceptance,
  Assignment,
  Block,
  CallerInput,
  Expression,
  FunctionDefinition,
  InlineValue,
  Sheet,
  Span,
  Statement,
} from '../sheet/types.ts'
import { acceptance, type Side } from './acceptance.ts'
import { evaluate } from './evaluate.ts'
import type { Scope } from './scope.ts'
import { FormulaError } from './formula-error.ts'
import { findFunction } from './functions/index.ts'
import { namesIn } from './names-in.ts'
import { originOf } from './origin.ts'
import { operandOf } from './operand-of.ts'
import { isReservedName, parseFormula, type ParsedFormula } from './parse-formula.ts'
import type {
  CalculatedBlock,
  CalculatedInline,
  Calculation,
  CheckLine,
  Failure,
  Formula,
  Line,
  NamedLine,
  Operand,
  SolverReport,
  UsedSheet,
  Value,
} from './types.ts'
import { undefinedName } from './undefined-name.ts'
import { useSheet, type BoundInput } from './use-sheet.ts'
import { declaredKindProblem, fitsKind } from './input-kind.ts'

/** A sheet named by a `method` block, read and parsed. */
export interface LoadedSheet {
  /** The canonical name: the id with its edition, or the path as written, from the using sheet. */
  readonly id: string
  readonly builtIn: boolean
  readonly sheet: Sheet
  readonly findings: readonly VFileMessage[]
}

/** Why a sheet could not be loaded; the caller adds the place. `findings` are those of the file itself. */
export interface LoadProblem {
  readonly problem: Omit<FindingInput, 'file' | 'span'>
  readonly findings?: readonly VFileMessage[]
}

export interface CalculateContext {
  /** Finds the sheet that `id` names, seen from the sheet that uses it. */
  loadSheet(id: string, from: Sheet): LoadedSheet | LoadProblem
}

/** Operations allowed to one sheet with all the sheets it uses; a large real sheet needs some ten thousand. */
const BUDGET = 5_000_000

/** Calculates every statement of a sheet in document order. Never throws for any sheet: what is wrong becomes a finding. */
export function calculate(sheet: Sheet, context: CalculateContext): Calculation {
  return new SheetCalculator(sheet, context, { left: BUDGET }, [sheet.path], undefined).run()
}

interface Known {
  readonly line: NamedLine
  /** Index of the block that defines it. */
  readonly block: number
}

export class SheetCalculator {
  readonly sheet: Sheet
  readonly context: CalculateContext
  readonly budget: { left: number }
  /** The sheets that are being calculated, outermost first. */
  readonly chain: readonly string[]
  private readonly bound: ReadonlyMap<string, BoundInput> | undefined
  private readonly findings: VFileMessage[] = []
  private readonly known = new Map<string, Known>()
  private readonly used = new Map<string, { sheet: UsedSheet; value: Value; block: number }>()
  /** Names that were defined by a statement that failed, and where. */
  private readonly failed = new Map<string, Span>()
  private readonly mentioned = new Set<string>()
  private block = 0

  constructor(
    sheet: Sheet,
    context: CalculateContext,
    budget: { left: number },
    chain: readonly string[],
    bound: ReadonlyMap<string, BoundInput> | undefined,
  ) {
    this.sheet = sheet
    this.context = context
    this.budget = budget
    this.chain = chain
    this.bound = bound
  }

  run(): Calculation {
    const blocks = this.sheet.blocks.map((block, i) => {
      this.block = i
      return this.calculateBlock(block)
    })
    const inlineValues = this.sheet.inlineValues.map((inline) => this.calculateInline(inline))
    return {
      sheet: this.sheet,
      blocks,
      inlineValues,
      names: new Map([...this.known].map(([name, { line }]) => [name, line])),
      usedSheets: new Map([...this.used].map(([name, { sheet }]) => [name, sheet])),
      mentioned: this.mentioned,
      findings: this.findings,
    }
  }

  private calculateBlock(block: Block): CalculatedBlock {
    if (block.kind === 'method') return useSheet(this, block)
    const lines: Line[] = []
    const failures: Failure[] = []
    for (const statement of block.statements) {
      const result = this.attempt(statement, () =>
        this.calculateStatement(statement, block.kind, block.kind === 'check' && block.validity),
      )
      if (result.line) lines.push(result.line)
      else failures.push({ statement, because: result.because })
    }
    return { block, lines, failures }
  }

  /** Runs one statement; an error becomes a finding, or stays silent when it only follows from an earlier one. */
  attempt<T>(
    statement: Statement,
    run: () => T,
  ): { line: T; because?: undefined } | { line?: undefined; because: string } {
    try {
      return { line: run() }
    } catch (error) {
      if (!(error instanceof FormulaError) && !(error instanceof DependsOnFailure)) throw error
      if (statement.kind !== 'acceptance' && !this.known.has(statement.name))
        this.failed.set(statement.name, statement.nameSpan)
      if (error instanceof DependsOnFailure) return { because: error.message }
      this.report(error)
      return { because: error.message }
    }
  }

  report(error: FormulaError): void {
    this.findings.push(
      finding({
        rule: error.rule,
        message: error.message,
        hint: error.hint,
        file: this.sheet.path,
        span: error.span,
        cause: error.cause,
      }),
    )
  }

  addFindings(findings: readonly VFileMessage[]): void {
    this.findings.push(...findings)
  }

  private calculateStatement(
    statement: Statement,
    kind: 'given' | 'working' | 'check',
    validity: boolean,
  ): Line {
    switch (statement.kind) {
      case 'assignment':
        return this.assignment(statement, kind === 'given')
      case 'caller-input':
        return this.callerInput(statement)
      case 'function':
        return this.functionDefinition(statement)
      case 'acceptance':
        return this.acceptance(statement, validity)
    }
  }

  private assignment(statement: Assignment, given: boolean): NamedLine {
    const bound = given ? this.bound?.get(statement.name) : undefined
    this.claim(statement.name, statement.nameSpan)
    if (bound) return this.define(this.boundLine(statement, bound, this.defaultOf(statement)))
    const { formula, unit } = this.parse(statement.expression)
    const evaluated = this.evaluateFormula(formula)
    const { value } = evaluated
    const origin =
      value.type === 'model'
        ? 'model'
        : given && !isLookup(formula)
          ? 'given'
          : originOf(formula, value, evaluated.operands)
    if (unit) this.checkUnit(unit, value, statement)
    return this.define({
      kind: 'named',
      statement,
      name: statement.name,
      formula,
      ...evaluated,
      origin,
      ...(unit ? { unit } : {}),
      ...(given && this.bound ? { byDefault: true } : {}),
    })
  }

  /** The value that a bound input would have had: what is bound must be of the same kind. */
  private defaultOf(statement: Assignment): Value {
    return this.evaluateFormula(this.parse(statement.expression).formula).value
  }

  private callerInput(statement: CallerInput): NamedLine {
    const bound = this.bound?.get(statement.name)
    this.claim(statement.name, statement.nameSpan)
    const undeclared = declaredKindProblem(statement)
    if (undeclared)
      throw new FormulaError('input-kind', undeclared.message, undeclared.hint, statement.inputKindSpan)
    if (!bound) {
      throw new FormulaError(
        'binding-missing',
        `\`${statement.name}\` has no value: it is an input for the sheet that uses this one`,
        `use this sheet by \`method … as NAME\`, and bind it there: \`${statement.name} = …\``,
        statement.span,
      )
    }
    return this.define(this.boundLine(statement, bound, statement))
  }

  private boundLine(
    statement: Assignment | CallerInput,
    bound: BoundInput,
    expected: CallerInput | Value,
  ): NamedLine {
    const problem = fitsKind(bound.line.value, expected)
    if (problem) {
      const place = bound.statement.expression.span
      throw new BindingError(
        new FormulaError('input-kind', `\`${statement.name}\` ${problem.message}`, problem.hint, place),
      )
    }
    return { ...bound.line, statement, name: statement.name, origin: 'bound', boundBy: bound.statement }
  }

  private functionDefinition(statement: FunctionDefinition): NamedLine {
    this.claim(statement.name, statement.nameSpan)
    if (findFunction(statement.name)) {
      throw new FormulaError(
        'duplicate-name',
        `\`${statement.name}\` is a built-in function`,
        'give the function another name',
        statement.nameSpan,
      )
    }
    const parameters = statement.parameters.map(({ name }) => name)
    const { formula, unit } = this.parse(statement.expression, parameters)
    if (unit)
      throw new FormulaError(
        'bad-expression',
        'a function definition has no `to`',
        'ask for the unit where the function is used',
        statement.expression.span,
      )
    const names = new Map<string, Value>()
    for (const { name, span, called } of namesIn(formula)) {
      if (parameters.includes(name) || (called && findFunction(name))) continue
      names.set(name, this.lookup(name, span, called))
    }
    const value: Value = { type: 'function', name: statement.name, parameters, body: formula, names }
    return this.define({
      kind: 'named',
      statement,
      name: statement.name,
      formula,
      value,
      origin: 'function',
      operands: new Map(),
      branches: new Map(),
      reports: [],
    })
  }

  private acceptance(statement: Acceptance, validity: boolean): CheckLine {
    // Both sides are read before either is calculated, so that the names of both count as used.
    const [left, right] = [this.parse(statement.left).formula, this.parse(statement.right).formula]
    const side = (formula: Formula): Side => ({ formula, ...this.evaluateFormula(formula) })
    return acceptance(statement, side(left), side(right), validity, (span) => this.source(span))
  }

  private calculateInline(inline: InlineValue): CalculatedInline {
    this.block = inline.blocksBefore
    try {
      const { formula, unit } = this.parse(inline.expression)
      const { value, operands } = this.evaluateFormula(formula, inline.blocksBefore)
      const operand = formula.type === 'name' ? operands.get(formula.path.join('.')) : undefined
      return { inline, formula, value, ...(unit ? { unit } : {}), ...(operand ? { operand } : {}) }
    } catch (error) {
      if (error instanceof DependsOnFailure) return { inline }
      if (!(error instanceof FormulaError)) throw error
      this.report(error)
      return { inline }
    }
  }

  parse(expression: Expression, parameters: readonly string[] = []): ParsedFormula {
    const isDefined = (name: string) => parameters.includes(name) || this.isTaken(name)
    const parsed = parseFormula(expression, isDefined)
    for (const { name } of namesIn(parsed.formula)) this.mentioned.add(name)
    return parsed
  }

  /** Evaluates a formula of this sheet and gathers what the printed line needs. */
  evaluateFormula(formula: Formula, blocksBefore = Infinity) {
    const branches = new Map<Formula, boolean>()
    const reports: SolverReport[] = []
    const scope: Scope = {
      lookup: (name, span) => this.lookup(name, span, false, blocksBefore),
      source: (span) => this.source(span),
      budget: this.budget,
      onBranch: (part, taken) => void branches.set(part, taken),
      onReport: (report) => void reports.push(report),
    }
    const value = evaluate(formula, scope)
    for (const report of reports) {
      const { second } = report
      if (second && !(second.difference <= second.allowed)) {
        throw new FormulaError(
          'cross-check-failed',
          `\`${report.question}\`: two independent routes differ by ${second.difference.toExponential(1)}, and ${second.allowed.toExponential(1)} is allowed (${report.route}: ${report.value}; ${second.route}: ${second.value})`,
          'check the model’s data for badly scaled stiffness; neither value is used',
          formula.span,
        )
      }
    }
    return { value, operands: this.operandsOf(formula), branches, reports }
  }

  private operandsOf(formula: Formula): Map<string, Operand> {
    const operands = new Map<string, Operand>()
    for (const { path } of namesIn(formula)) {
      const operand = this.operandAt(path)
      if (operand) operands.set(path.join('.'), operand)
    }
    return operands
  }

  private operandAt(path: readonly string[]): Operand | undefined {
    const [first, second, ...rest] = path as [string, string?, ...string[]]
    const used = this.used.get(first)
    if (used) {
      const inner = second === undefined ? undefined : used.sheet.calculation.names.get(second)
      if (!inner || rest.length > 0) return { value: used.value, origin: 'carried' }
      return { ...operandOf(inner), origin: 'carried' }
    }
    const line = this.known.get(first)?.line
    if (!line) return undefined
    if (second === undefined) return operandOf(line)
    const value = [second, ...rest].reduce<Value | undefined>(
      (at, key) => (at?.type === 'record' ? at.fields[key] : undefined),
      line.value,
    )
    return value && { value, origin: line.origin }
  }

  private lookup(name: string, span: Span, called: boolean, blocksBefore = Infinity): Value {
    const known = this.known.get(name)
    if (known && known.block < blocksBefore) return known.line.value
    const used = this.used.get(name)
    if (used && used.block < blocksBefore) return used.value
    if (this.failed.has(name))
      throw new DependsOnFailure(
        `it depends on \`${name}\` (line ${this.failed.get(name)?.start.line}), which could not be calculated`,
      )
    throw undefinedName({ name, span, called }, this.sheet, [...this.known.keys(), ...this.used.keys()])
  }

  /** Refuses a name that is taken or has a fixed meaning. */
  claim(name: string, span: Span): void {
    if (isReservedName(name)) {
      throw new FormulaError('duplicate-name', `\`${name}\` has a fixed meaning`, 'choose another name', span)
    }
    const earlier =
      this.known.get(name)?.line.statement.span ??
      this.used.get(name)?.sheet.block.asSpan ??
      this.failed.get(name)
    if (earlier && earlier !== span) {
      throw new FormulaError(
        'duplicate-name',
        `\`${name}\` is already defined in line ${earlier.start.line}`,
        'give the second value its own name',
        span,
      )
    }
  }

  addUsed(sheet: UsedSheet, value: Value): void {
    this.used.set(sheet.as, { sheet, value, block: this.block })
  }

  markFailed(name: string, span: Span): void {
    this.failed.set(name, span)
  }

  private define(line: NamedLine): NamedLine {
    this.known.set(line.name, { line, block: this.block })
    return line
  }

  private isTaken(name: string): boolean {
    return this.known.has(name) || this.used.has(name) || this.failed.has(name)
  }

  private checkUnit(unit: NonNullable<ParsedFormula['unit']>, value: Value, statement: Assignment): void {
    const problem = fitsKind(value, unit)
    if (problem)
      throw new FormulaError(
        'unit-mismatch',
        `\`${statement.name}\` ${problem.message}`,
        problem.hint,
        statement.expression.span,
      )
  }

  source(span: Span): string {
    return this.sheet.text.slice(span.start.offset, span.end.offset)
  }
}

/** A statement uses something whose own statement failed: that one has the finding. */
export class DependsOnFailure extends Error {
  override readonly name = 'DependsOnFailure'
}

/** A binding does not fit: the finding belongs to the using sheet. */
export class BindingError extends Error {
  override readonly name = 'BindingError'
  readonly inner: FormulaError

  constructor(inner: FormulaError) {
    super(inner.message)
    this.inner = inner
  }
}

function isLookup(formula: Formula): boolean {
  return formula.type === 'call' && findFunction(formula.name)?.looksUp === true
}
