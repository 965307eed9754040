import type { Formula } from '../../calculate/types.ts'
import { LEVEL, withoutGroup, type Printing } from './print.ts'

/** What is spoken, and how firmly it holds together (see print.ts). */
export interface Spoken {
  readonly text: string
  readonly level: number
}

/** Where a formula is in its line, symbols or numbers, with what is known of its names; and how a part of it is spoken. */
export interface Speaking extends Pick<Printing, 'mode' | 'profile' | 'operands' | 'branches' | 'angles'> {
  readonly speak: (formula: Formula, speaking: Speaking) => Spoken
}

export function inBrackets({ text }: Spoken): Spoken {
  return { text: `open bracket ${text} close bracket`, level: LEVEL.atom }
}

/** A part as an operand that has to hold together as firmly as `level`. */
export function held(formula: Formula, level: number, speaking: Speaking): string {
  const part = speaking.speak(formula, speaking)
  return (part.level < level ? inBrackets(part) : part).text
}

/** A part that the words around it already enclose. */
export function inner(formula: Formula, speaking: Speaking): string {
  return speaking.speak(withoutGroup(formula), speaking).text
}
