import type { Element } from 'hast'
import { h } from 'hastscript'
import type { NamedLine } from '../calculate/types.ts'
import { ofStatement } from './evidence.ts'
import { symbolMath } from './mathematics.ts'
import type { Scope } from './scope.ts'
import { valueRow, valueTable } from './value-table.ts'
import { valueText } from './value-text.ts'

/** The results of a sheet used in brief: values alone, since their steps stand elsewhere. */
export function resultsTable(results: readonly NamedLine[], scope: Scope): Element[] {
  return results.length === 0
    ? []
    : [
        valueTable(
          'Results',
          results.map((line) => row(line, scope)),
          results,
        ),
      ]
}

function row(line: NamedLine, scope: Scope): Element {
  const { value, formula, unit, statement, name } = line
  const { page, used } = scope
  const how = { asTyped: formula, ...(unit ? { unit } : {}) }
  const id = used && !used.builtIn ? used.calculation.sheet.meta.sheet : undefined
  return valueRow(line, scope, {
    symbol: symbolMath(name, page),
    amount: valueText(value, id === undefined ? 'derived' : 'carried', page, how),
    meaning: statement.meaning === undefined ? [] : [{ type: 'text', value: statement.meaning }],
    evidence: [
      ...(id === undefined ? [] : [h('div', { className: 'lender' }, id)]),
      ...ofStatement(statement),
    ],
  })
}
