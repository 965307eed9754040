import type { VFileMessage } from 'vfile-message'
import { finding } from '../finding.ts'
import { nearestName } from '../quantity/nearest-name.ts'
import type { Assignment, CallerInput, GivenBlock, MethodBlock, Sheet } from '../sheet/types.ts'
import { BindingError, SheetCalculator } from './calculate.ts'
import { describeValue } from './describe.ts'
import { FormulaError } from './formula-error.ts'
import { originOf } from './origin.ts'
import type {
  CalculatedBlock,
  Calculation,
  CheckLine,
  Failure,
  NamedLine,
  UsedSheet,
  Value,
} from './types.ts'

/** A binding of a `method` block, calculated in the using sheet. */
export interface BoundInput {
  readonly statement: Assignment
  readonly line: NamedLine
}

const MAX_CHAIN = 20

/** Calculates a `method` block: the other sheet with this sheet's bindings. */
export function useSheet(user: SheetCalculator, block: MethodBlock): CalculatedBlock {
  const failures: Failure[] = []
  const fail = (because: string): CalculatedBlock => {
    user.markFailed(block.as, block.asSpan)
    return { block, lines: [], failures: [...failures, { statement: whole(block), because }] }
  }
  try {
    user.claim(block.as, block.asSpan)
    const loaded = user.context.loadSheet(block.id, user.sheet)
    if ('problem' in loaded) {
      user.addFindings(loaded.findings ?? [])
      user.addFindings([finding({ ...loaded.problem, file: user.sheet.path, span: block.idSpan })])
      return fail(loaded.problem.message)
    }
    const place = loaded.builtIn ? loaded.id : loaded.sheet.path
    const chain = [...user.chain, place]
    if (user.chain.includes(place)) {
      throw new FormulaError(
        'circular-method',
        `the sheets use each other in a circle: ${chain.join(' → ')}`,
        'take the use out of one of them',
        block.idSpan,
      )
    }
    if (chain.length > MAX_CHAIN) {
      throw new FormulaError(
        'limit-exceeded',
        `sheets use each other more than ${MAX_CHAIN} deep`,
        'bring the shared values into one sheet',
        block.idSpan,
      )
    }
    const bound = bind(user, block, loaded.sheet, failures)
    if (!bound) return fail('its inputs are not complete')
    const calculation = new SheetCalculator(loaded.sheet, user.context, user.budget, chain, bound).run()
    const used: UsedSheet = {
      block,
      id: loaded.id,
      as: block.as,
      brief: block.brief,
      builtIn: loaded.builtIn,
      calculation,
    }
    user.addFindings(forUser(user, block, used, [...loaded.findings, ...calculation.findings]))
    user.addUsed(used, recordOf(used))
    return { block, lines: [...bound.values()].map(({ line }) => line), failures, used }
  } catch (error) {
    const inner = error instanceof BindingError ? error.inner : error
    if (!(inner instanceof FormulaError)) throw error
    user.report(inner)
    return fail(inner.message)
  }
}

/** Calculates the bindings and holds them against the inputs that the used sheet takes. */
function bind(
  user: SheetCalculator,
  block: MethodBlock,
  sheet: Sheet,
  failures: Failure[],
): Map<string, BoundInput> | undefined {
  const inputs = inputsOf(sheet)
  const bound = new Map<string, BoundInput>()
  let complete = true
  for (const statement of block.bindings) {
    const attempt = attemptBinding(user, statement, inputs, bound)
    if (attempt.because === undefined) bound.set(statement.name, { statement, line: attempt.line })
    else {
      failures.push({ statement, because: attempt.because })
      complete = false
    }
  }
  const missing = inputs.filter(
    (input): input is CallerInput =>
      input.kind === 'caller-input' && !block.bindings.some(({ name }) => name === input.name),
  )
  if (missing.length > 0) {
    const names = missing.map(({ name, inputKind }) => `\`${name}\` (${inputKind})`).join(', ')
    user.report(
      new FormulaError(
        'binding-missing',
        `\`${block.id}\` needs ${names}`,
        `add \`${missing[0]?.name} = …\` to the block`,
        block.idSpan,
      ),
    )
    complete = false
  }
  return complete ? bound : undefined
}

function attemptBinding(
  user: SheetCalculator,
  statement: Assignment,
  inputs: readonly (Assignment | CallerInput)[],
  bound: ReadonlyMap<string, BoundInput>,
) {
  try {
    const names = inputs.map(({ name }) => name)
    const earlier = bound.get(statement.name)
    if (earlier) {
      throw new FormulaError(
        'binding-duplicate',
        `\`${statement.name}\` is already bound in line ${earlier.statement.span.start.line}`,
        'keep one',
        statement.nameSpan,
      )
    }
    if (!names.includes(statement.name)) {
      const near = nearestName(statement.name, names)
      const hint = near
        ? `did you mean \`${near}\`?`
        : names.length > 0
          ? `its inputs are ${names.join(', ')}`
          : 'it takes no inputs'
      throw new FormulaError(
        'binding-unknown',
        `the used sheet has no input \`${statement.name}\``,
        hint,
        statement.nameSpan,
      )
    }
    const { formula, unit } = user.parse(statement.expression)
    const evaluated = user.evaluateFormula(formula)
    const line: NamedLine = {
      kind: 'named',
      statement,
      name: statement.name,
      formula,
      ...evaluated,
      origin: originOf(formula, evaluated.value, evaluated.operands),
      ...(unit ? { unit } : {}),
    }
    return { line }
  } catch (error) {
    if (error instanceof FormulaError) user.report(error)
    else if (!(error instanceof Error) || error.name !== 'DependsOnFailure') throw error
    return { because: error.message }
  }
}

function inputsOf(sheet: Sheet): (Assignment | CallerInput)[] {
  return sheet.blocks
    .filter((block): block is GivenBlock => block.kind === 'given')
    .flatMap((block) => block.statements)
}

/** The used sheet's names as parts of the name it is used as. */
function recordOf(used: UsedSheet): Value {
  const fields: Record<string, Value> = {}
  for (const [name, line] of used.calculation.names) fields[name] = line.value
  return { type: 'record', of: 'method', title: used.id, fields }
}

/**
 * The used sheet's errors as the using sheet reports them. What depends on the values given, and everything in a built-in
 * method, is placed where the sheet is used; an error in the text of the user's own sheet stays at its place there.
 */
function forUser(
  user: SheetCalculator,
  block: MethodBlock,
  used: UsedSheet,
  findings: readonly VFileMessage[],
): VFileMessage[] {
  const { sheet } = used.calculation
  const errors = findings
    .filter((message) => message.fatal === true)
    .map((message) =>
      used.builtIn
        ? finding({
            rule: message.ruleId as Parameters<typeof finding>[0]['rule'],
            message: `in \`${used.id}\`, line ${message.line}: ${message.reason}`,
            hint: String(message.note),
            file: user.sheet.path,
            span: block.idSpan,
            cause: message,
          })
        : message,
    )
  const outside = used.calculation.blocks.flatMap((calculated) =>
    calculated.lines.filter(
      (line): line is CheckLine => line.kind === 'check' && line.validity && line.verdict === 'fail',
    ),
  )
  const failed = outside.map((line) =>
    finding({
      rule: 'validity-failed',
      message: `\`${used.id}\` is outside its limits: \`${line.statement.text}\` does not hold, the sides being ${sides(line)}${line.statement.meaning ? ` (${line.statement.meaning})` : ''}`,
      hint: line.statement.reference
        ? `the limit is ${line.statement.reference}; check the inputs, or use a method that covers them`
        : `check the inputs, or use a method that covers them; the limit is in ${sheet.path}`,
      file: user.sheet.path,
      span: block.idSpan,
    }),
  )
  return [...errors, ...failed]
}

function sides(line: CheckLine): string {
  const [left, right] = line.statement.relation.startsWith('<')
    ? [line.demand, line.capacity]
    : [line.capacity, line.demand]
  return `${describeValue(left)} and ${describeValue(right)}`
}

/** A stand-in statement for the block as a whole, so that its failure has a place. */
function whole(block: MethodBlock): Assignment {
  const text = `method ${block.id} as ${block.as}`
  return {
    kind: 'assignment',
    text,
    span: block.idSpan,
    name: block.as,
    nameSpan: block.asSpan,
    expression: { text, span: block.idSpan },
  }
}

/** All calculations in a sheet: its own, and those of the sheets it uses, outermost first. */
export function withUsed(calculation: Calculation): Calculation[] {
  return [calculation, ...[...calculation.usedSheets.values()].flatMap((used) => withUsed(used.calculation))]
}
