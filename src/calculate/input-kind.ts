import { sameDimension } from '../quantity/dimension.ts'
import { isKind, KINDS, withArticle } from '../quantity/kinds.ts'
import { nearestName } from '../quantity/nearest-name.ts'
import { unitFactor } from '../quantity/units.ts'
import type { CallerInput } from '../sheet/types.ts'
import { describeKind, describeValue } from './describe.ts'
import type { UnitExpression, Value } from './types.ts'

export interface KindProblem {
  readonly message: string
  readonly hint: string
}

/** Whether a value is of the kind that an input declares, that a default value has, or that a unit can show. */
export function fitsKind(
  value: Value,
  expected: CallerInput | Value | UnitExpression,
): KindProblem | undefined {
  if (Array.isArray(expected)) return fitsUnit(value, expected as UnitExpression)
  const one = expected as CallerInput | Value
  return 'kind' in one ? fitsDeclared(value, one) : fitsLike(value, one)
}

/** The problem of a declaration itself, such as `N_Ed : forse`. */
export function declaredKindProblem({ inputKind }: CallerInput): KindProblem | undefined {
  if (isKind(inputKind)) return undefined
  const near = nearestName(inputKind, Object.keys(KINDS))
  return {
    message: `there is no kind \`${inputKind}\``,
    hint: near ? `did you mean \`${near}\`?` : '`stanchion explain kinds` lists the kinds',
  }
}

function fitsDeclared(value: Value, { inputKind }: CallerInput): KindProblem | undefined {
  if (!isKind(inputKind)) return undefined
  const kind = KINDS[inputKind]
  const fits = kind.dimension
    ? value.type === 'quantity' && sameDimension(value.dimension, kind.dimension)
    : value.type === inputKind || (value.type === 'record' && value.of === inputKind)
  return fits ? undefined : mismatch(value, kind.words)
}

function fitsLike(value: Value, like: Value): KindProblem | undefined {
  if (like.type === 'quantity' || like.type === 'array') {
    const fits = value.type === like.type && sameDimension(value.dimension, like.dimension)
    return fits
      ? undefined
      : mismatch(value, like.type === 'quantity' ? withArticle(like.dimension) : describeKind(like))
  }
  const fits =
    value.type === like.type && (value.type !== 'record' || (like.type === 'record' && value.of === like.of))
  return fits ? undefined : mismatch(value, describeKind(like))
}

function fitsUnit(value: Value, unit: UnitExpression): KindProblem | undefined {
  const { dimension } = unitFactor(unit)
  const fits =
    (value.type === 'quantity' || value.type === 'array') && sameDimension(value.dimension, dimension)
  return fits
    ? undefined
    : { ...mismatch(value, withArticle(dimension)), hint: 'ask for a unit of its own dimension after `to`' }
}

function mismatch(value: Value, expected: string): KindProblem {
  const shown = describeValue(value)
  const kind = describeKind(value)
  return {
    message: `is ${shown === kind ? kind : `${shown}, ${kind}`}, and ${expected} was expected`,
    hint: 'check the value and its unit',
  }
}
