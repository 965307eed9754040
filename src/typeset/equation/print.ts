import type { Formula, Operand } from '../../calculate/types.ts'
import type { Profile } from '../../quantity/profile.ts'
import type { Angles } from './put-in.ts'

/** How firmly a printed formula holds together: an operand that holds less firmly than its operator needs brackets. */
export const LEVEL = { case: 0, or: 1, and: 2, relation: 3, sum: 4, product: 5, power: 6, atom: 7 } as const

/** What a factor looks like at its ends, which decides the sign of multiplication beside it. */
export type Look =
  'number' | 'quantity' | 'symbol' | 'word' | 'bracket' | 'call' | 'root' | 'fraction' | 'matrix' | 'other'

/** A piece of printed mathematics. */
export interface Print {
  readonly tex: string
  readonly level: number
  readonly look: Look
  /** Begins with a minus sign. */
  readonly signed?: boolean
  /** Higher than a line of text: brackets around it grow. */
  readonly tall?: boolean
  /** A brace with rows of conditions, which nothing should follow in the same line. */
  readonly ownRow?: boolean
  /** A factor of a product, whose sign is a poor place to break at. */
  readonly isFactor?: boolean
  /** In how many brackets it stands that began in an earlier row; each sets it in further. */
  readonly depth?: number
  /** How it begins when it stands at the start of a row, where that differs: a product's sign is then shown. */
  readonly atStart?: string
  /** Smaller pieces that say the same when they stand one after the other, for a formula wider than the lane. */
  readonly split?: () => readonly Print[]
  /** The same in another shape for a narrow lane, `width` em wide; it has no further one. */
  readonly within?: (width: number) => Print
}

/** What the printer of a formula needs to know. */
export interface Printing {
  /** The names as symbols, or the numbers put in for them. */
  readonly mode: 'symbols' | 'numbers'
  readonly profile: Profile
  readonly operands: ReadonlyMap<string, Operand>
  readonly branches: ReadonlyMap<Formula, boolean>
  /** Functions defined in the sheet, whose names are symbols; those of the program have names in words. */
  readonly isSheetFunction: (name: string) => boolean
  /** Inside a fraction or an exponent, where a quotient is written with a slash. */
  readonly inline: boolean
  readonly angles: Angles
  readonly print: (formula: Formula, printing: Printing) => Print
}

export function atom(tex: string, look: Look, more: Partial<Print> = {}): Print {
  return { tex, level: LEVEL.atom, look, ...more }
}

/** With TeX before and after it; it stays as divisible as it was. */
export function enclosed(print: Print, before: string, after = ''): Print {
  const { tex, atStart, split, within } = print
  return {
    ...print,
    tex: before + tex + after,
    ...(atStart === undefined ? {} : { atStart: before + atStart + after }),
    ...(split ? { split: () => encloseAll(split(), before, after) } : {}),
    ...(within ? { within: (width: number) => enclosed(within(width), before, after) } : {}),
  }
}

/** Led by a sign: `inside` a row, and `atStart` of one. */
export function led(print: Print, inside: string, atStart = inside): Print {
  const { split, within } = print
  const first = (piece: Print, i: number) => (i === 0 ? led(piece, inside, atStart) : piece)
  return {
    ...print,
    tex: inside + print.tex,
    atStart: atStart + (print.atStart ?? print.tex),
    ...(split ? { split: () => split().map(first) } : {}),
    ...(within ? { within: (width: number) => led(within(width), inside, atStart) } : {}),
  }
}

/** A run of pieces with TeX before the first and after the last. */
export function encloseAll(pieces: readonly Print[], before: string, after: string): readonly Print[] {
  return pieces.map((piece, i) =>
    enclosed(piece, i === 0 ? before : '', i === pieces.length - 1 ? after : ''),
  )
}

/** In brackets that are as high as it is. */
export function bracketed(print: Print, open = '(', close = ')'): Print {
  const { tex, tall, split, within } = print
  const size = tall ? 'Big' : 'big'
  return {
    tex: tall ? `\\left${open}${tex}\\right${close}` : `${open}${tex}${close}`,
    level: LEVEL.atom,
    look: 'bracket',
    ...(tall ? { tall } : {}),
    ...(split
      ? { split: () => encloseAll(split().map(deeper), `\\${size}l${open}`, `\\${size}r${close}`) }
      : {}),
    ...(within ? { within: (width: number) => bracketed(within(width), open, close) } : {}),
  }
}

function deeper(piece: Print): Print {
  return { ...piece, depth: (piece.depth ?? 0) + 1 }
}

/** As an operand of an operator that binds at `level`: in brackets when it holds less firmly, or begins with a minus. */
export function operand(print: Print, level: number, mayBeSigned = false): Print {
  return print.level < level || (print.signed && !mayBeSigned) ? bracketed(print) : print
}

/** Without the author's own brackets, where the layout already encloses the formula. */
export function withoutGroup(formula: Formula): Formula {
  return formula.type === 'group' ? withoutGroup(formula.body) : formula
}

/** A comparison as the right side of `=` needs brackets; a case distinction has its brace. */
export function closed(print: Print): Print {
  return print.level > LEVEL.case && print.level < LEVEL.sum ? bracketed(print) : print
}
