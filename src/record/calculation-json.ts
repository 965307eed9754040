import type { VFileMessage } from 'vfile-message'
import type {
  Calculation,
  CheckLine,
  NamedLine,
  Quantity,
  SolverReport,
  UsedSheet,
  Value,
} from '../calculate/types.ts'
import { severityOf } from '../finding.ts'
import { dimensionName } from '../quantity/kinds.ts'
import type { Profile } from '../quantity/profile.ts'
import { showComparison } from '../quantity/show-comparison.ts'
import { show } from '../quantity/show.ts'
import type { SheetVerdict } from '../verify/verdict.ts'
import { digestOf } from './digest.ts'
import { profileOf } from './profile-of.ts'
import type { Json } from './stable-json.ts'
import { valueText } from './value-text.ts'

export const CALCULATION_SCHEMA = 'stanchion/calculation/1'

type JsonObject = { readonly [key: string]: Json | undefined }

export interface Outcome {
  readonly path: string
  readonly calculation?: Calculation
  readonly findings: readonly VFileMessage[]
  readonly verdict: SheetVerdict
}

/** The calculation as `check --json` prints it: CONTRACT "stanchion/calculation/1". A sheet that could not be read has findings only. */
export function calculationJson({ path, calculation, findings, verdict }: Outcome): JsonObject {
  const meta = calculation?.sheet.meta
  return {
    schema: CALCULATION_SCHEMA,
    sheet: { id: meta?.sheet, title: meta?.title, revision: meta?.revision, source: path },
    verdict,
    values: calculation ? valuesOf(calculation) : {},
    checks: calculation ? checksOf(calculation) : [],
    findings: findings.map((message) => findingJson(message, path)),
    solutions: calculation ? solutionsOf(calculation) : [],
    digest: calculation ? digestOf(calculation) : undefined,
  }
}

/** One sheet's calculation with the place in the using sheet under which it is reported. */
interface Part {
  readonly calculation: Calculation
  readonly prefix: string
  /** The line of the method block in the outermost sheet, and the id of the used sheet. */
  readonly used?: { readonly line: number; readonly id: string }
}

function partsOf(calculation: Calculation, prefix = '', outer?: Part['used']): Part[] {
  const nested = [...calculation.usedSheets.values()].flatMap((used: UsedSheet) =>
    partsOf(used.calculation, `${prefix}${used.as}.`, {
      line: outer?.line ?? used.block.span.start.line,
      id: used.id,
    }),
  )
  return [{ calculation, prefix, ...(outer ? { used: outer } : {}) }, ...nested]
}

function valuesOf(calculation: Calculation): JsonObject {
  const profile = profileOf(calculation)
  const entries = partsOf(calculation).flatMap(({ calculation: part, prefix, used }) =>
    [...part.names.values()].map((line): [string, Json] => {
      const { statement, origin } = line
      const place = used ? { line: used.line, sheet: used.id } : { line: statement.span.start.line }
      return [
        `${prefix}${line.name}`,
        {
          kind: origin,
          ...valueJson(line, profile),
          ...place,
          meaning: statement.meaning,
          reference: statement.reference,
          hold: statement.hold,
        },
      ]
    }),
  )
  return Object.fromEntries(entries)
}

function valueJson({ value, unit }: NamedLine, profile: Profile): JsonObject {
  switch (value.type) {
    case 'quantity': {
      const shown = show(value, profile, unit ? { unit } : {})
      return { ...plain(value), unit: shown.unitText, shown: shown.text }
    }
    case 'array':
      return { ...plain(value), shown: valueText(value, profile, unit) }
    default:
      return plain(value)
  }
}

function plain(value: Value): JsonObject {
  switch (value.type) {
    case 'quantity':
      return { si: value.si, dimension: dimensionName(value.dimension) }
    case 'array':
      return { si: value.si, dimension: dimensionName(value.dimension) }
    case 'text':
    case 'truth':
      return { value: value.value }
    case 'record':
      return {
        value: value.title,
        of: value.of,
        source: value.source,
        fields: Object.fromEntries(Object.entries(value.fields).map(([key, field]) => [key, plain(field)])),
      }
    case 'list':
      return { value: value.items.map(plain) }
    case 'function':
      return { parameters: value.parameters }
    case 'model':
      return { model: value.of, value: value.description }
  }
}

function checksOf(calculation: Calculation): Json[] {
  const profile = profileOf(calculation)
  const parts = new Map(partsOf(calculation).map((part) => [part.calculation, part]))
  const inOrder = (of: Calculation): [CheckLine, Part][] =>
    of.blocks.flatMap(({ lines, used }) =>
      used
        ? inOrder(used.calculation)
        : lines
            .filter((line): line is CheckLine => line.kind === 'check')
            .map((line): [CheckLine, Part] => [line, parts.get(of) as Part]),
    )
  return inOrder(calculation).map(([check, part]) => checkJson(check, part, profile))
}

function checkJson(check: CheckLine, { used }: Part, profile: Profile): Json {
  const { title, demand, capacity, statement, utilisation, verdict, validity } = check
  const [shownDemand, shownCapacity] = showComparison(demand, capacity, profile)
  const side = (quantity: Quantity, shown: string) => ({ si: quantity.si, shown })
  return {
    title,
    demand: side(demand, shownDemand.text),
    // Demand and capacity are told apart already: `a >= b` asks for the demand b to be at most the capacity a.
    relation: statement.relation.length === 2 ? '<=' : '<',
    capacity: side(capacity, shownCapacity.text),
    utilisation,
    verdict,
    reference: statement.reference,
    line: used?.line ?? statement.span.start.line,
    sheet: used?.id,
    validity: validity || undefined,
  }
}

function solutionsOf(calculation: Calculation): Json[] {
  return partsOf(calculation).flatMap(({ calculation: part, used }) =>
    part.blocks.flatMap(({ lines }) =>
      lines.flatMap((line) =>
        line.reports.map((report) => ({
          ...solutionJson(report),
          line: used?.line ?? line.statement.span.start.line,
          sheet: used?.id,
        })),
      ),
    ),
  )
}

function solutionJson({
  question,
  route,
  value,
  dimension,
  status,
  iterations,
  residual,
  second,
  source,
}: SolverReport): JsonObject {
  return {
    question,
    route,
    si: value,
    dimension: dimensionName(dimension),
    status,
    iterations,
    residual,
    second: second && { ...second },
    source,
  }
}

function findingJson(message: VFileMessage, path: string): Json {
  return {
    rule: message.ruleId,
    severity: severityOf(message),
    line: message.line,
    column: message.column,
    message: message.reason,
    hint: message.note,
    file: message.file === path ? undefined : message.file,
  }
}
