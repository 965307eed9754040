import type { ElementContent } from 'hast'
import type { CalculatedBlock } from '../calculate/types.ts'
import { entriesOf } from './entries.ts'
import { givenTable } from './given-table.ts'
import { methodBlock } from './method-block.ts'
import type { Scope } from './scope.ts'
import { lines } from './working-lines.ts'

/**
 * A block of a sheet as it is printed.
 *
 * @param rank of the heading that a used sheet gets
 */
export function blockContent(calculated: CalculatedBlock, scope: Scope, rank: number): ElementContent[] {
  switch (calculated.block.kind) {
    case 'given':
      // The inputs of a used sheet were calculated by its user: they are lines, not typed values.
      return scope.outer
        ? lines(entriesOf(calculated, scope.calculation), scope)
        : givenTable(entriesOf(calculated, scope.calculation), scope)
    case 'working':
    case 'check':
      return lines(entriesOf(calculated, scope.calculation), scope)
    case 'method':
      return [methodBlock(calculated, scope, rank)]
  }
}
