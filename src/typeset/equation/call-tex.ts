import type { Formula } from '../../calculate/types.ts'
import { printArguments, printFields } from './list-tex.ts'
import { printLookup } from './lookup-tex.ts'
import { atom, bracketed, enclosed, LEVEL, withoutGroup, type Print, type Printing } from './print.ts'
import { anglesIn } from './angles-in.ts'
import { rewritten } from './rewritten.ts'
import { symbolTex } from './symbol.ts'
import { textTex } from './text-tex.ts'

type Call = Extract<Formula, { type: 'call' }>

/** Functions with a sign of their own in mathematics; any other has its name in words. */
const SIGNS: ReadonlyMap<string, string> = new Map([
  ...['sin', 'cos', 'tan', 'cot', 'sinh', 'cosh', 'tanh', 'exp', 'min', 'max', 'det'].map(
    (name) => [name, `\\${name}`] as const,
  ),
  ...['sin', 'cos', 'tan'].map((name) => [`a${name}`, `\\arc${name}`] as const),
  ...['sinh', 'cosh', 'tanh'].map((name) => [`a${name}`, `\\operatorname{ar${name}}`] as const),
  ['log', '\\ln'],
  ['log10', '\\log_{10}'],
])

/** Functions that enclose what they act on. */
const ENCLOSING: ReadonlyMap<string, readonly [open: string, close: string]> = new Map([
  ['abs', ['\\lvert ', '\\rvert ']],
  ['norm', ['\\lVert ', '\\rVert ']],
  ['floor', ['\\lfloor ', '\\rfloor ']],
  ['ceil', ['\\lceil ', '\\rceil ']],
])

/** A call in the form that mathematics has for it. */
export function printCall(call: Call, printing: Printing): Print {
  const { name, args } = call
  if (printing.isSheetFunction(name)) return named(symbolTex(name), call, printing)
  if (name === 'lookup') return printLookup(call, printing) ?? named(wordsTex(name), call, printing)
  const other = rewritten(call)
  if (other) return printing.print(other, printing)
  const [first, second] = args
  const enclosing = ENCLOSING.get(name)
  if (enclosing && args.length === 1) return bracketed(printArguments(args, printing), ...enclosing)
  if (first && isRoot(name, args.length)) return root(name, first, second, printing)
  if (first && args.length === 1 && (name === 'inv' || name === 'transpose'))
    return matrixPower(first, name === 'inv' ? '-1' : '\\mathrm{T}', printing)
  return named(SIGNS.get(name) ?? wordsTex(name), call, { ...printing, angles: anglesIn(call) })
}

function wordsTex(name: string): string {
  return textTex(name.replaceAll('_', ' '))
}

/** The name with its arguments in brackets; the fields of a single record are themselves the arguments. */
function named(name: string, { args }: Call, printing: Printing): Print {
  const [only] = args.map(withoutGroup)
  const inner =
    args.length === 1 && only?.type === 'record'
      ? printFields(only, printing)
      : printArguments(args, printing)
  return { ...enclosed(bracketed(inner), name), level: LEVEL.power, look: 'call' }
}

function isRoot(name: string, count: number): boolean {
  return name === 'nthRoot' ? count === 2 : (name === 'sqrt' || name === 'cbrt') && count === 1
}

function root(name: string, body: Formula, index: Formula | undefined, printing: Printing): Print {
  const inner = printing.print(withoutGroup(body), printing)
  const degree =
    name === 'cbrt'
      ? '3'
      : index
        ? printing.print(withoutGroup(index), { ...printing, inline: true }).tex
        : ''
  const inBrackets = enclosed(bracketed(inner), '', `^{1/${degree === '' ? '2' : `(${degree})`}}`)
  return {
    tex: `\\sqrt${degree === '' ? '' : `[${`{${degree}}`}]`}{${inner.tex}}`,
    level: LEVEL.power,
    look: 'root',
    tall: true,
    ...(inBrackets.split ? { split: inBrackets.split } : {}),
  }
}

function matrixPower(body: Formula, power: string, printing: Printing): Print {
  const inner = printing.print(body, printing)
  const isClosed = inner.look === 'symbol' || inner.look === 'bracket' || inner.look === 'matrix'
  const base = inner.level === LEVEL.atom && isClosed ? inner : bracketed(inner)
  return atom(`${base.tex}^{${power}}`, 'other', { level: LEVEL.power, ...(base.tall ? { tall: true } : {}) })
}
