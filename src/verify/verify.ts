import type { VFileMessage } from 'vfile-message'
import type { Calculation, CheckLine, NamedLine } from '../calculate/types.ts'
import { finding } from '../finding.ts'
import type { Statement } from '../sheet/types.ts'

/** What is to be said about a calculated sheet beyond the errors met in calculating it. Changes no number. */
export function verify(calculation: Calculation): VFileMessage[] {
  return [
    ...unusedInputs(calculation),
    ...openHolds(calculation),
    ...unsourcedInputs(calculation),
    ...missingChecks(calculation),
    ...failedLimits(calculation),
  ]
}

function inputs({ blocks }: Calculation): NamedLine[] {
  return blocks
    .filter(({ block }) => block.kind === 'given')
    .flatMap(({ lines }) => lines.filter((line): line is NamedLine => line.kind === 'named'))
}

/** A sheet that says what it `returns` exists for other sheets to use. */
function isForOthers({ sheet }: Calculation): boolean {
  return (sheet.meta.returns ?? []).length > 0
}

function unusedInputs(calculation: Calculation): VFileMessage[] {
  const { sheet, mentioned } = calculation
  const returned = sheet.meta.returns ?? []
  return inputs(calculation)
    .filter(({ name }) => !mentioned.has(name) && !returned.includes(name))
    .map(({ name, statement }) =>
      finding({
        rule: 'unused-input',
        message: `the input \`${name}\` is not used`,
        hint: 'use it, or take it out; a formula may have another name in its place',
        file: sheet.path,
        span: statement.nameSpan,
      }),
    )
}

function openHolds({ sheet, blocks }: Calculation): VFileMessage[] {
  const statements = blocks.flatMap(({ block }): readonly Statement[] =>
    block.kind === 'method' ? block.bindings : block.statements,
  )
  return statements
    .filter(({ hold }) => hold !== undefined)
    .map(({ hold, text, span }) =>
      finding({
        rule: 'hold-open',
        message: `\`${firstLine(text)}\` awaits confirmation: ${hold}`,
        hint: 'close the hold by removing `@hold` when it is confirmed',
        file: sheet.path,
        span,
      }),
    )
}

function unsourcedInputs(calculation: Calculation): VFileMessage[] {
  return inputs(calculation)
    .filter(
      ({ statement, value }) =>
        statement.reference === undefined && statement.kind !== 'caller-input' && value.type !== 'record',
    )
    .map(({ name, statement }) =>
      finding({
        rule: 'reference-missing',
        message: `the input \`${name}\` has no source`,
        hint: 'write it in square brackets: `# meaning [drawing TW-210 rev C]`',
        file: calculation.sheet.path,
        span: statement.span,
      }),
    )
}

function missingChecks(calculation: Calculation): VFileMessage[] {
  const { sheet } = calculation
  if (isForOthers(calculation) || checksOf(calculation).length > 0 || hasFailedCheck(calculation)) return []
  const span = sheet.metaPlaces.get('sheet') ?? {
    start: { line: 1, column: 1, offset: 0 },
    end: { line: 1, column: 1, offset: 0 },
  }
  return [
    finding({
      rule: 'no-checks',
      message: 'the sheet has no check',
      hint: 'add a `check` block that compares a demand with a capacity, or `returns: […]` if other sheets use it',
      file: sheet.path,
      span,
    }),
  ]
}

function hasFailedCheck({ blocks }: Calculation): boolean {
  return blocks.some(({ failures }) => failures.some(({ statement }) => statement.kind === 'acceptance'))
}

function failedLimits({ sheet, blocks }: Calculation): VFileMessage[] {
  return blocks
    .flatMap(({ lines }) => lines)
    .filter((line): line is CheckLine => line.kind === 'check' && line.validity && line.verdict === 'fail')
    .map(({ statement }) =>
      finding({
        rule: 'validity-failed',
        message: `the limit of validity \`${firstLine(statement.text)}\` does not hold`,
        hint: 'check the inputs, or use a method that covers them',
        file: sheet.path,
        span: statement.span,
      }),
    )
}

function firstLine(text: string): string {
  return text.split('\n')[0] ?? ''
}

/** All checks of a sheet and of the sheets it uses, in document order, limits of validity among them. */
export function checksOf(calculation: Calculation): CheckLine[] {
  return calculation.blocks.flatMap(({ lines, used }) =>
    used ? checksOf(used.calculation) : lines.filter((line): line is CheckLine => line.kind === 'check'),
  )
}
