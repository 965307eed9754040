import type { Formula, NamedLine, Value } from '../../calculate/types.ts'
import type { Profile } from '../../quantity/profile.ts'
import { branchesOf, reasonsOf } from './case-tex.ts'
import { printingOf } from './formula-tex.ts'
import { printRelation } from './logic-tex.ts'
import { entryOf } from './lookup-tex.ts'
import { meantBy } from './operand.ts'
import { atom, closed, withoutGroup, type Print, type Printing } from './print.ts'
import { asTyped } from './quantity-tex.ts'
import { textTex } from './text-tex.ts'
import { valueTex } from './value-tex.ts'

/** The parts of a line that say something new. */
export interface EquationParts {
  readonly symbolic?: Print
  readonly substituted?: Print
  readonly result?: Print
  /** Why this branch of a case distinction: its condition with the numbers put in. */
  readonly because?: Print
}

/** What a line says: symbols, numbers put in, result, each only where it adds to what stands before it. */
export function partsOf(line: NamedLine, profile: Profile): EquationParts {
  const printing = printingOfLine(line, profile)
  const symbolic = closed(printing.print(line.formula, printing))
  if (line.value.type === 'function') return { symbolic }
  const shown = valueTex(line.value, profile, {
    unit: line.unit,
    asTyped: line.unit ? undefined : line.formula,
  })
  const isText = line.value.type === 'model'
  const result = isText ? splitText(line.value.description) : atom(shown, 'other')
  if (isPlainLookup(line.formula, line.value)) return { result }
  const numbers = { ...printing, mode: 'numbers' as const }
  const substituted = closed(printing.print(line.formula, numbers))
  const saysSame = substituted.tex === symbolic.tex
  const isSpelledOut = !line.unit && isSpelled(line.formula, line)
  const meant = meantBy(withoutGroup(line.formula), line.operands)
  const isAlias = !line.unit && isTaken(takenFrom(line.formula, line), line)
  // A rounded value of the other name before the same value in another unit would only disagree with it in the last figure.
  const isConverted = line.unit !== undefined && meant !== undefined && !meant.asTyped
  const before = saysSame || isConverted ? symbolic : substituted
  // What a model is made from says all, unless numbers were put in: then its description tells how they were understood.
  const isTold = line.value.type === 'model' && saysSame && line.formula.type === 'call'
  const because = becauseOf(line, numbers)
  return {
    symbolic,
    ...(saysSame || isConverted ? {} : { substituted }),
    ...(before.tex === result.tex || (isAlias && !saysSame) || isTold || isSpelledOut ? {} : { result }),
    ...(because ? { because } : {}),
  }
}

/** What the formulas of a line are printed with; a function's own names are those it was defined with. */
function printingOfLine(line: NamedLine, profile: Profile): Printing {
  const { operands, branches, value } = line
  const isSheetFunction = (name: string) =>
    (value.type === 'function' ? value.names.get(name) : operands.get(name)?.value)?.type === 'function'
  return printingOf({ profile, operands, branches, isSheetFunction })
}

/** The part of a formula that gave its value: of a case distinction the branch taken, of a table the entry. */
function takenFrom(formula: Formula, line: NamedLine): Formula {
  const body = withoutGroup(formula)
  if (body.type === 'case') {
    const { branches, taken } = branchesOf(body, line.branches)
    const branch = taken === undefined ? undefined : branches[taken]
    return branch ? takenFrom(branch.value, line) : body
  }
  const entry = body.type === 'call' ? entryOf(body, line.operands) : undefined
  return entry ? takenFrom(entry, line) : body
}

/** A number or the name of one, which is its own result: as typed, it need not look like the same number rounded. */
function isTaken(formula: Formula, { operands }: NamedLine): boolean {
  return asTyped(formula) !== undefined || meantBy(formula, operands) !== undefined
}

/** A list or record whose entries are numbers, texts or names: with the numbers put in it is its own result. */
function isSpelled(formula: Formula, line: NamedLine): boolean {
  const body = withoutGroup(formula)
  const isEntry = (entry: Formula): boolean =>
    asTyped(entry) !== undefined ||
    entry.type === 'text' ||
    entry.type === 'truth' ||
    meantBy(withoutGroup(entry), line.operands) !== undefined ||
    isSpelled(entry, line)
  if (body.type === 'list') return body.items.every(isEntry)
  return body.type === 'record' && body.fields.every(({ value }) => isEntry(value))
}

/** `section("HE 160 B")`: its designation says all. */
function isPlainLookup(formula: Formula, value: Value): boolean {
  return (
    formula.type === 'call' &&
    value.type === 'record' &&
    (value.of === 'section' || value.of === 'material') &&
    formula.args.every((arg) => withoutGroup(arg).type === 'text')
  )
}

/** A text that can be broken between its words. */
function splitText(text: string): Print {
  const words = text.split(' ')
  const pieces = words.map((word, i) =>
    atom(textTex(i === 0 ? word : ` ${word}`), 'other', { atStart: textTex(word) }),
  )
  return atom(textTex(text), 'other', pieces.length > 1 ? { split: () => pieces } : {})
}

function becauseOf(line: NamedLine, numbers: Printing): Print | undefined {
  const reasons = reasonsOf(line.formula, line.branches).map(({ condition, holds }) => {
    return printRelation(condition, { ...numbers, inline: true }, holds).tex
  })
  return reasons.length === 0 ? undefined : atom(`\\quad\\text{as }${reasons.join(',\\;')}`, 'other')
}
