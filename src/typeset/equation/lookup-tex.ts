import type { Formula } from '../../calculate/types.ts'
import { braced } from './case-tex.ts'
import { meantBy } from './operand.ts'
import { asTyped } from './quantity-tex.ts'
import { enclosed, LEVEL, withoutGroup, type Print, type Printing } from './print.ts'
import { quotedTex, textTex } from './text-tex.ts'

type Call = Extract<Formula, { type: 'call' }>
type Table = Extract<Formula, { type: 'record' }>

/** The table of a `lookup(key, {…})` written in place; undefined when it is named instead. */
export function tableOf(call: Call): { readonly key: Formula; readonly table: Table } | undefined {
  const [key, table] = call.args.map(withoutGroup)
  return key && table?.type === 'record' && call.args.length === 2 && table.fields.length > 0
    ? { key, table }
    : undefined
}

/** The text that a key stands for, where it is known. */
function keyText(key: Formula, operands: Printing['operands']): string | undefined {
  if (key.type === 'text') return key.value
  const value = meantBy(key, operands)?.value
  return value?.type === 'text' ? value.value : undefined
}

/** The entry that a table written in place gave, where its key is known. */
export function entryOf(call: Call, operands: Printing['operands']): Formula | undefined {
  const found = call.name === 'lookup' ? tableOf(call) : undefined
  const known = found && keyText(found.key, operands)
  return found?.table.fields.find((field) => field.key === known)?.value
}

/**
 * A table written in the sheet: numbers as a table with the entry taken marked, formulas as cases. With numbers put in, only
 * the entry taken.
 */
export function printLookup(call: Call, printing: Printing): Print | undefined {
  const found = tableOf(call)
  if (!found) return undefined
  const { key, table } = found
  const known = keyText(key, printing.operands)
  const taken = table.fields.findIndex((field) => field.key === known)
  const entry = table.fields[taken]
  if (printing.mode === 'numbers' && entry) return printing.print(withoutGroup(entry.value), printing)
  const symbol = printing.print(key, { ...printing, mode: 'symbols', inline: true })
  return table.fields.every(({ value }) => asTyped(value))
    ? tabulated(symbol, table, taken, printing)
    : braced(
        table.fields.map((field, i) => ({
          value: printing.print(withoutGroup(field.value), { ...printing, inline: false }),
          when: enclosed(symbol, '', `=${quotedTex(field.key)}`),
          isTaken: i === taken,
        })),
      )
}

function tabulated(key: Print, table: Table, taken: number, printing: Printing): Print {
  const head = table.fields.map((field) => (field.key === '' ? quotedTex('') : textTex(field.key)))
  const entries = table.fields.map(({ value }) => printing.print(withoutGroup(value), printing).tex)
  const marks = table.fields.map((_, i) => (i === taken ? '\\triangle' : ''))
  const rows = [[key.tex, ...head], ['', ...entries], ...(taken < 0 ? [] : [['', ...marks]])]
  const text = rows.map((row) => row.join('&'))
  return {
    tex: `\\begin{array}{r|${'c'.repeat(head.length)}}${text[0] ?? ''}\\\\\\hline ${text.slice(1).join('\\\\')}\\end{array}`,
    level: LEVEL.case,
    look: 'other',
    tall: true,
  }
}
