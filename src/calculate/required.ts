import type { Span } from '../sheet/types.ts'
import { isRefusal, type Outcome, type Refusal } from './arithmetic.ts'
import { describeKind, describeValue } from './describe.ts'
import { FormulaError } from './formula-error.ts'
import type { Scope } from './scope.ts'
import type { Formula, Value } from './types.ts'

const VERBS: Readonly<Record<string, string>> = {
  '+': 'add',
  '-': 'subtract',
  '*': 'multiply',
  '/': 'divide',
  '^': 'raise',
}

/** Turns a refused operation into a FormulaError at its place, with the values that met. */
export function required<T extends object>(
  outcome: Outcome<T>,
  formula: Formula & { readonly operator?: string; readonly operatorSpan?: Span },
  parts: readonly Formula[],
  values: readonly Value[],
  scope: Scope,
  verb = VERBS[formula.operator ?? ''] ?? 'use',
): T {
  if (!isRefusal(outcome)) return outcome
  const named = parts.map((part, i) => nameWithValue(part, values[i] as Value, scope))
  const both = named.join(' and ')
  const kinds = values.map(describeKind).join(' and ')
  throw refusalError(outcome, formula, verb, both, named, kinds)
}

function refusalError(
  refusal: Refusal,
  formula: Formula & { readonly operatorSpan?: Span },
  verb: string,
  both: string,
  named: readonly string[],
  kinds: string,
): FormulaError {
  const span = formula.operatorSpan ?? formula.span
  switch (refusal.refused) {
    case 'dimension':
      return new FormulaError(
        'unit-mismatch',
        `cannot ${verb} ${both}: ${kinds}`,
        `check the unit of ${named[1] ?? named[0]}; \`stanchion explain unit-mismatch\` says more`,
        span,
      )
    case 'kind':
      return new FormulaError(
        'unit-mismatch',
        `cannot ${verb} ${both}: ${kinds}`,
        'use quantities or numbers on both sides',
        span,
      )
    case 'exponent':
      return new FormulaError(
        'unit-mismatch',
        `cannot raise ${named[0]} to the power ${named[1]}: a power is a number without unit`,
        'divide the exponent by a quantity of its own unit',
        span,
      )
    case 'shape':
      return new FormulaError(
        'unit-mismatch',
        `cannot ${verb} ${both}: their numbers of rows and columns do not fit`,
        'check the lengths of both',
        span,
        refusal.cause,
      )
    case 'not-real':
      return new FormulaError(
        'not-real',
        `the result is complex: ${both}`,
        'check the sign of the quantity under the root or power',
        formula.span,
      )
    case 'not-finite':
      return new FormulaError(
        'not-finite',
        `the result is not a finite number: ${both}`,
        'check for a division by zero or a quantity outside its range',
        formula.span,
      )
  }
}

/** `L` (4.6 m); a literal is not repeated. */
function nameWithValue(part: Formula, value: Value, scope: Scope): string {
  const source = clip(scope.source(part.span))
  const isLiteral =
    part.type === 'number' || part.type === 'quantity' || part.type === 'text' || part.type === 'truth'
  return isLiteral ? `\`${source}\`` : `\`${source}\` (${describeValue(value)})`
}

/** A formula's text, shortened for a message. */
export function clip(text: string): string {
  const flat = text.replace(/\s+/g, ' ')
  return flat.length > 40 ? `${flat.slice(0, 37)}…` : flat
}
