import type { Formula } from '../../calculate/types.ts'
import { printPower, printProduct, printQuotient, printSign, printSum } from './arithmetic-tex.ts'
import { printCall } from './call-tex.ts'
import { printCase } from './case-tex.ts'
import { printList, printRecord } from './list-tex.ts'
import { printConnective, printRelation } from './logic-tex.ts'
import { printLiteral, printName } from './name-tex.ts'
import { atom, bracketed, LEVEL, type Print, type Printing } from './print.ts'
import { quotedTex, textTex } from './text-tex.ts'

/** What a formula is printed with; everything but the profile may be left out where there is none. */
export type FormulaSetting = Pick<Printing, 'profile'> &
  Partial<Pick<Printing, 'operands' | 'branches' | 'isSheetFunction' | 'mode'>>

/** A formula in TeX for math mode: its names as symbols, or with the numbers put in. */
export function formulaTex(formula: Formula, setting: FormulaSetting): string {
  return printFormula(formula, printingOf(setting)).tex
}

export function printingOf(setting: FormulaSetting): Printing {
  const operands: Printing['operands'] = setting.operands ?? new Map<string, never>()
  return {
    mode: 'symbols',
    branches: new Map(),
    isSheetFunction: (name) => operands.get(name)?.value.type === 'function',
    inline: false,
    angles: 'as-shown',
    print: printFormula,
    ...setting,
    operands,
  }
}

export function printFormula(formula: Formula, printing: Printing): Print {
  switch (formula.type) {
    case 'number':
    case 'quantity':
      return printLiteral(formula, printing)
    case 'text':
      return atom(quotedTex(formula.value), 'other')
    case 'truth':
      return atom(textTex(String(formula.value)), 'other')
    case 'constant':
      return atom('\\pi ', 'symbol')
    case 'name':
    case 'field':
    case 'item':
      return printName(formula, printing)
    case 'call':
      return printCall(formula, printing)
    case 'unary':
      return printSign(formula, printing)
    case 'binary':
      return printBinary(formula, printing)
    case 'relation':
      return printRelation(formula, printing)
    case 'group':
      return printGroup(printing.print(formula.body, printing))
    case 'case':
      return printCase(formula, printing)
    case 'list':
      return printList(formula, printing)
    case 'record':
      return printRecord(formula, printing)
  }
}

function printBinary(formula: Extract<Formula, { type: 'binary' }>, printing: Printing): Print {
  const { operator } = formula
  if (operator === 'and' || operator === 'or') return printConnective(formula, printing)
  const reckoning = printing.angles === 'degrees' ? printing : { ...printing, angles: 'radians' as const }
  switch (operator) {
    case '+':
    case '-':
      return printSum(formula, reckoning)
    case '*':
      return printProduct(formula, reckoning)
    case '/':
      return printQuotient(formula, reckoning)
    case '^':
      return printPower(formula, reckoning)
  }
}

/** The author's brackets, unless they hold a single thing; where one is needed all the same, its operator sets it. */
function printGroup(body: Print): Print {
  return body.level >= LEVEL.power ? body : bracketed(body)
}
