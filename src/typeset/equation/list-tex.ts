import type { Formula } from '../../calculate/types.ts'
import {
  atom,
  bracketed,
  enclosed,
  LEVEL,
  operand,
  withoutGroup,
  type Print,
  type Printing,
} from './print.ts'
import { keyTex, matrixTex } from './value-tex.ts'

/** Arguments, entries or fields, parted by commas; broken after them. */
export function printItems(items: readonly Print[]): Print {
  const pieces = items.map((item, i) => (i === items.length - 1 ? item : enclosed(item, '', ',\\;')))
  return {
    tex: pieces.map(({ tex }) => tex).join(''),
    level: LEVEL.case,
    look: 'other',
    ...(pieces.some(({ tall }) => tall) ? { tall: true } : {}),
    ...(pieces.length > 0 ? { split: () => pieces } : {}),
  }
}

export function printArguments(args: readonly Formula[], printing: Printing): Print {
  return printItems(args.map((arg) => operand(printing.print(withoutGroup(arg), printing), LEVEL.or, true)))
}

/** Rows of one length as a matrix, anything else as a row of entries. */
export function printList({ items }: Extract<Formula, { type: 'list' }>, printing: Printing): Print {
  const rows = items.map((item) => (item.type === 'list' ? item.items : undefined))
  const [first] = rows
  if (first && first.length > 0 && rows.every((row) => row?.length === first.length)) {
    const inner = { ...printing, inline: true }
    const cells = rows.map((row) => (row ?? []).map((cell) => printing.print(withoutGroup(cell), inner).tex))
    return atom(matrixTex(cells), 'matrix', { tall: true })
  }
  // A plain `[` at the start of a row of a matrix would be read as the row's distance.
  return bracketed(printArguments(items, printing), '\\lbrack ', '\\rbrack ')
}

/** `{L: 4.6 m, top: "pinned"}` as its fields in braces; a field whose value is the name it has is written once. */
export function printRecord(formula: Extract<Formula, { type: 'record' }>, printing: Printing): Print {
  return bracketed(printFields(formula, printing), '\\{', '\\}')
}

export function printFields({ fields }: Extract<Formula, { type: 'record' }>, printing: Printing): Print {
  const inner = { ...printing, inline: true }
  return printItems(
    fields.map(({ key, value }) => {
      const print = operand(printing.print(withoutGroup(value), inner), LEVEL.or, true)
      const name = keyTex(key)
      return print.tex === name ? print : enclosed(print, `${name}=`)
    }),
  )
}
