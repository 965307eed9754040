import type { Element } from 'hast'
import { h } from 'hastscript'
import type { Calculation, NamedLine, UsedSheet, Value } from '../calculate/types.ts'
import { lineLink } from './cross-references.ts'
import { briefResults } from './entries.ts'
import { showOperand } from './equation/quantity-tex.ts'
import { symbolMath } from './mathematics.ts'
import type { Page } from './scope.ts'

/** Every symbol of the sheet with its meaning, its unit and the line that gives it; then those of the methods it prints. */
export function notation(calculation: Calculation, page: Page): Element[] {
  const used = printedUses(calculation)
  const own = [...calculation.names.values()]
  if (own.length === 0 && used.length === 0) return []
  return [
    h('h2', 'Notation'),
    legend(),
    h('table', { className: 'notation' }, [
      h('caption', { className: 'hidden' }, 'Symbols'),
      h('thead', [
        h(
          'tr',
          ['Symbol', 'Written', 'Meaning', 'Unit', 'Line'].map((name) => h('th', { scope: 'col' }, name)),
        ),
      ]),
      ...(own.length > 0
        ? [
            h(
              'tbody',
              own.map((line) => row(line, page)),
            ),
          ]
        : []),
      ...used.map(({ use, lines }) =>
        h('tbody', [
          h('tr', { className: 'group' }, [
            h('th', { colSpan: 5, scope: 'rowgroup' }, [
              use.calculation.sheet.meta.sheet,
              ', used as ',
              h('code', use.as),
            ]),
          ]),
          ...lines.map((line) => row(line, page)),
        ]),
      ),
    ]),
  ]
}

interface Use {
  readonly use: UsedSheet
  readonly lines: readonly NamedLine[]
}

function printedUses(calculation: Calculation): Use[] {
  return [...calculation.usedSheets.values()].flatMap((use) => {
    const lines = use.brief ? briefResults(use, calculation) : [...use.calculation.names.values()]
    const inner = use.brief ? [] : printedUses(use.calculation)
    return lines.length > 0 ? [{ use, lines }, ...inner] : inner
  })
}

function row(line: NamedLine, page: Page): Element {
  const number = page.numbers.of.get(line)
  const { meaning } = line.statement
  return h('tr', [
    h('th', { scope: 'row' }, symbolMath(line.name, page)),
    h('td', [h('code', line.name)]),
    h('td', meaning === undefined ? [h('span', { className: 'none' }, kindWords(line.value))] : meaning),
    h('td', unit(line, page)),
    h('td', { className: 'number' }, number === undefined ? [] : [lineLink(number)]),
  ])
}

function unit(line: NamedLine, page: Page): string {
  const { value } = line
  if (value.type === 'quantity')
    return (
      showOperand({ asTyped: line.formula, ...(line.unit ? { unit: line.unit } : {}) }, value, page.profile)
        .unitText || '1'
    )
  return ''
}

/** What a symbol stands for when its author gave no meaning. */
function kindWords(value: Value): string {
  switch (value.type) {
    case 'record':
      return value.of === 'record' ? 'a record' : `${value.of} ${value.title}`
    case 'model':
      return value.of
    case 'function':
      return `function of ${value.parameters.join(', ')}`
    default:
      return 'no meaning stated'
  }
}

/** How to read the marks on values. */
function legend(): Element {
  const mark = (name: string, text: string) => h('span', { className: ['value', name] }, text)
  return h('p', { className: 'legend' }, [
    'Values are marked by where they come from: ',
    mark('given', 'given'),
    ' in this sheet, ',
    mark('looked-up', 'read from a table'),
    ', ',
    mark('result', 'calculated'),
    ', ',
    mark('carried', 'carried'),
    ' from another sheet or bound to a method. A line is named by its section and its place in it; “from” names the lines whose values it uses.',
  ])
}
