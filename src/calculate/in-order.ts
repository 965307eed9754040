import type { RelationOperator } from './types.ts'

/** Whether `a OPERATOR b` holds when a compares to b as `order` compares to 0. */
export function inOrder(order: number, operator: RelationOperator): boolean {
  switch (operator) {
    case '<':
      return order < 0
    case '<=':
      return order <= 0
    case '>':
      return order > 0
    case '>=':
      return order >= 0
    case '==':
      return order === 0
    case '!=':
      return order !== 0
  }
}
