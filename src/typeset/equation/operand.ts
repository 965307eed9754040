import type { Formula, Operand, Value } from '../../calculate/types.ts'

/** What a name, a part of one or an entry of one stands for, and how it is best shown. */
export type Meant = Pick<Operand, 'value' | 'unit' | 'asTyped'>

/**
 * The value of `N_Ed`, `tube.A`, `states[1].theta` or `v[2]` in a calculated line; undefined for what is no name or has no
 * value there, such as a parameter of a function.
 */
export function meantBy(formula: Formula, operands: ReadonlyMap<string, Operand>): Meant | undefined {
  switch (formula.type) {
    case 'name':
      return operands.get(formula.path.join('.'))
    case 'field': {
      const owner = meantBy(formula.of, operands)?.value
      return owner?.type === 'record' ? fieldOf(owner.fields, formula.key) : undefined
    }
    case 'item': {
      const owner = meantBy(formula.of, operands)?.value
      const indices = formula.indices.map((index) => (index.type === 'number' ? index.value - 1 : NaN))
      return owner && entryOf(owner, indices)
    }
    default:
      return undefined
  }
}

function fieldOf(fields: Readonly<Record<string, Value>>, key: string): Meant | undefined {
  const value = Object.hasOwn(fields, key) ? fields[key] : undefined
  return value && { value }
}

function entryOf(owner: Value, indices: readonly number[]): Meant | undefined {
  const [first = NaN, second] = indices
  if (owner.type === 'list') {
    const value = owner.items[first]
    return value && indices.length === 1 ? { value } : undefined
  }
  if (owner.type !== 'array') return undefined
  const row = owner.si[first]
  const si =
    typeof row === 'number' && indices.length === 1
      ? row
      : Array.isArray(row)
        ? (row as number[])[second ?? NaN]
        : undefined
  return si === undefined ? undefined : { value: { type: 'quantity', si, dimension: owner.dimension } }
}
