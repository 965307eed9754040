import type { Formula } from './types.ts'

/** The formulas that a formula is made of. */
export function partsOf(formula: Formula): readonly Formula[] {
  switch (formula.type) {
    case 'group':
    case 'unary':
      return [formula.body]
    case 'binary':
      return [formula.left, formula.right]
    case 'relation':
      return formula.operands
    case 'case':
      return [formula.condition, formula.then, formula.otherwise]
    case 'list':
      return formula.items
    case 'record':
      return formula.fields.map(({ value }) => value)
    case 'field':
      return [formula.of]
    case 'item':
      return [formula.of, ...formula.indices]
    case 'call':
      return formula.args
    default:
      return []
  }
}
