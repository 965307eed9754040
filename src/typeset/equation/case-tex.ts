import type { Formula } from '../../calculate/types.ts'
import { LEVEL, withoutGroup, type Print, type Printing } from './print.ts'
import { rowsOf } from './rows.ts'

type Case = Extract<Formula, { type: 'case' }>

/** One row of a case distinction; the last has no condition. */
export interface Branch {
  readonly value: Formula
  readonly condition?: Formula
}

/** `a ? x : b ? y : z` as rows: x if a, y if b, z otherwise; and which of them was taken, where that is known. */
export function branchesOf(
  formula: Case,
  taken: ReadonlyMap<Formula, boolean>,
): { readonly branches: readonly Branch[]; readonly taken?: number } {
  const branches: Branch[] = []
  let index: number | undefined
  let isKnown = true
  let rest: Formula = formula
  for (; rest.type === 'case'; rest = withoutGroup(rest.otherwise)) {
    const held = taken.get(rest)
    if (isKnown && held === true) index ??= branches.length
    if (held === undefined) isKnown &&= index !== undefined
    branches.push({ value: withoutGroup(rest.then), condition: withoutGroup(rest.condition) })
  }
  if (isKnown) index ??= branches.length
  branches.push({ value: rest })
  return { branches, ...(index === undefined ? {} : { taken: index }) }
}

/** A comparison on the way to the branch taken. */
export interface Reason {
  readonly condition: Extract<Formula, { type: 'relation' }>
  readonly holds: boolean
}

/** Why a line took its branch: the comparisons up to the one that holds; those of more than two sides are left to the reader. */
export function reasonsOf(formula: Formula, known: ReadonlyMap<Formula, boolean>): readonly Reason[] {
  const distinction = withoutGroup(formula)
  if (distinction.type !== 'case') return []
  const { branches, taken } = branchesOf(distinction, known)
  if (taken === undefined) return []
  return branches.slice(0, taken + 1).flatMap(({ condition }, i) => {
    const isSimple = condition?.type === 'relation' && condition.operators.length === 1
    return isSimple ? [{ condition, holds: i === taken }] : []
  })
}

/** The rows of a case distinction under one brace, the one taken marked; with numbers put in, only the one taken. */
export function printCase(formula: Case, printing: Printing): Print {
  const { branches, taken } = branchesOf(formula, printing.branches)
  const chosen = taken === undefined ? undefined : branches[taken]
  if (printing.mode === 'numbers' && chosen) return printing.print(chosen.value, printing)
  const open = { ...printing, inline: false }
  const rows = branches.map(({ value, condition }, i) => ({
    value: printing.print(value, open),
    when: condition ? printing.print(condition, { ...printing, inline: true }) : undefined,
    isTaken: i === taken,
  }))
  return braced(rows)
}

/** Values with what each stands for, under one brace. */
export interface BracedRow {
  readonly value: Print
  /** Absent for `otherwise`. */
  readonly when: Print | undefined
  readonly isTaken: boolean
}

const MARK = '\\quad\\triangleleft\\;\\text{applies}'
const BRACE = 1

export function braced(rows: readonly BracedRow[]): Print {
  const cells = rows.map(
    ({ value, when, isTaken }) => `${value.tex}&${conditionOf(when)}${isTaken ? MARK : ''}`,
  )
  return {
    tex: `\\begin{dcases}${cells.join('\\\\')}\\end{dcases}`,
    level: LEVEL.case,
    look: 'other',
    tall: true,
    ownRow: true,
    within: (width) => stackedRows(rows, width - BRACE),
  }
}

function conditionOf(when: Print | undefined): string {
  return when ? `\\text{if }${when.tex}` : '\\text{otherwise}'
}

/** The condition under its value, each broken over as many rows as it takes. */
function stackedRows(rows: readonly BracedRow[], width: number): Print {
  const lines = rows.flatMap(({ value, when, isTaken }) => {
    const values = rowsOf(value, width, width - 1)
    const whens = when ? rowsOf(when, width - 3, width - 4) : []
    const [first = '', ...others] = whens
    return [
      ...values.map((row, i) => (i === 0 ? row : `\\quad ${row}`)),
      `\\qquad${when ? `\\text{if }${first}` : '\\text{otherwise}'}${isTaken && others.length === 0 ? MARK : ''}`,
      ...others.map((row, i) => `\\qquad\\quad ${row}${isTaken && i === others.length - 1 ? MARK : ''}`),
    ]
  })
  return {
    tex: `\\left\\{\\begin{aligned}${lines.map((line) => `&${line}`).join('\\\\')}\\end{aligned}\\right.`,
    level: LEVEL.case,
    look: 'other',
    tall: true,
    ownRow: true,
  }
}
