import type { FindingInput } from '../finding.ts'
import type { Places } from './places.ts'
import type {
  Acceptance,
  Annotation,
  Assignment,
  CallerInput,
  Expression,
  FunctionDefinition,
  Relation,
} from './types.ts'

/** A statement's text in the source: from its first character to just before its annotation, and the annotation. */
export interface RawStatement {
  readonly start: number
  readonly text: string
  readonly annotation: Annotation
}

export type Problem = Omit<FindingInput, 'file'>
export type Read<T> = { readonly ok: T } | { readonly problem: Problem }

const NAME = '[A-Za-z][A-Za-z0-9_]*'
const ASSIGNMENT = new RegExp(`^(${NAME})\\s*=(?!=)\\s*`)
const FUNCTION = new RegExp(`^(${NAME})\\s*\\(([^()]*)\\)\\s*=(?!=)\\s*`)
const CALLER_INPUT = new RegExp(`^(${NAME})\\s*:\\s*([A-Za-z][A-Za-z-]*)$`)

/**
 * Splits a block's lines into statements. A statement goes on over line ends while a bracket is open. A line that begins
 * with `#` is the author's remark and is not a statement.
 *
 * @param start offset of the block's first content line in the source
 * @param end offset just after its last content line
 */
export function splitStatements(places: Places, start: number, end: number): Read<RawStatement>[] {
  const { text } = places
  const result: Read<RawStatement>[] = []
  let at = start
  while (at < end) {
    const statement = scanStatement(text, at, end)
    const body = text.slice(at, statement.bodyEnd)
    const lead = body.length - body.trimStart().length
    const trimmed = body.trim()
    if (statement.open !== undefined) {
      result.push({
        problem: {
          rule: 'bad-expression',
          message: `\`${text[statement.open]}\` is opened here and not closed before the block ends`,
          hint: 'close it; a statement goes on to the next line only while a bracket is open',
          span: places.span(statement.open, statement.open + 1),
        },
      })
    } else if (trimmed !== '') {
      const raw = text.slice(statement.bodyEnd, statement.end)
      const odd = malformedHold(raw)
      result.push(
        odd === undefined
          ? { ok: { start: at + lead, text: trimmed, annotation: readAnnotation(raw) } }
          : { problem: holdProblem(places, statement.bodyEnd + odd) },
      )
    }
    at = statement.end + 1
  }
  return result
}

interface Scan {
  /** Just after the statement's own text: where its annotation or its line ends. */
  readonly bodyEnd: number
  /** The end of the statement's last line. */
  readonly end: number
  /** An opening bracket that is still open where the block ends. */
  readonly open?: number
}

function scanStatement(text: string, start: number, end: number): Scan {
  const open: number[] = []
  let quote = ''
  let at = start
  for (; at < end; at++) {
    const c = text[at] ?? ''
    if (quote !== '') {
      if (c === '\\') at++
      else if (c === quote || c === '\n') quote = ''
      if (c !== '\n') continue
    }
    if (c === '"' || c === "'") quote = c
    else if ('([{'.includes(c)) open.push(at)
    else if (')]}'.includes(c)) open.pop()
    else if (c === '\n' && open.length === 0) break
    else if (c === '#' || c === '@') {
      const lineEnd = endOfLine(text, at, end)
      const still = open.at(-1)
      if (still === undefined || lineEnd >= end)
        return { bodyEnd: at, end: lineEnd, ...(still === undefined ? {} : { open: still }) }
      at = lineEnd
    }
  }
  const still = open.at(-1)
  return { bodyEnd: at, end: at, ...(still === undefined ? {} : { open: still }) }
}

function endOfLine(text: string, from: number, end: number): number {
  const found = text.indexOf('\n', from)
  return found < 0 || found > end ? end : found
}

/** Where an `@hold` stands that does not have the form it must have; it would be printed as plain text and not counted. */
function malformedHold(raw: string): number | undefined {
  const at = /^\s*@/.test(raw) ? raw.indexOf('@') : raw.search(/@hold\b/i)
  return at < 0 || HOLD.test(raw) ? undefined : at
}

function holdProblem(places: Places, at: number): Problem {
  return {
    rule: 'bad-block',
    message: 'a hold says what is awaited, in quotation marks, at the end of the statement',
    hint: 'write for example `@hold "mill certificate"`',
    span: places.span(at, at + 1),
  }
}

const HOLD = /@hold\s+(?:"([^"\n]*)"|'([^'\n]*)')\s*$/
const REFERENCES = /((?:\s*\[[^[\]\n]*\])+)\s*$/

/** Reads `# meaning [reference] @hold "what is awaited"`; each part may be left out. */
export function readAnnotation(raw: string): Annotation {
  let rest = raw.trim()
  const hold = HOLD.exec(rest)
  if (hold) rest = rest.slice(0, hold.index).trim()
  rest = rest.replace(/^#\s*/, '')
  const references = REFERENCES.exec(rest)
  if (references) rest = rest.slice(0, references.index)
  const reference = references?.[1]
    ?.split(']')
    .map((part) => part.trim().replace(/^\[/, '').trim())
    .filter((part) => part !== '')
    .join('; ')
  const meaning = rest.trim()
  return {
    ...(meaning ? { meaning } : {}),
    ...(reference ? { reference } : {}),
    ...(hold ? { hold: (hold[1] ?? hold[2] ?? '').trim() } : {}),
  }
}

function base(places: Places, raw: RawStatement) {
  return { text: raw.text, span: places.span(raw.start, raw.start + raw.text.length), ...raw.annotation }
}

function expressionAt(places: Places, raw: RawStatement, from: number, to = raw.text.length): Expression {
  const untrimmed = raw.text.slice(from, to)
  const text = untrimmed.trim()
  const start = raw.start + from + (untrimmed.length - untrimmed.trimStart().length)
  return { text, span: places.span(start, start + text.length) }
}

/** Reads `name = expression`. */
export function readAssignment(places: Places, raw: RawStatement): Assignment | undefined {
  const match = ASSIGNMENT.exec(raw.text)
  if (!match) return undefined
  const name = match[1] as string
  return {
    kind: 'assignment',
    ...base(places, raw),
    name,
    nameSpan: places.span(raw.start, raw.start + name.length),
    expression: expressionAt(places, raw, match[0].length),
  }
}

/** Reads `name : kind`. */
export function readCallerInput(places: Places, raw: RawStatement): CallerInput | undefined {
  const match = CALLER_INPUT.exec(raw.text)
  if (!match) return undefined
  const [whole, name, inputKind] = match as unknown as [string, string, string]
  const kindStart = raw.start + whole.length - inputKind.length
  return {
    kind: 'caller-input',
    ...base(places, raw),
    name,
    nameSpan: places.span(raw.start, raw.start + name.length),
    inputKind,
    inputKindSpan: places.span(kindStart, kindStart + inputKind.length),
  }
}

/** Reads `f(x, P) = expression`. */
export function readFunction(places: Places, raw: RawStatement): Read<FunctionDefinition> | undefined {
  const match = FUNCTION.exec(raw.text)
  if (!match) return undefined
  const [whole, name, list] = match as unknown as [string, string, string]
  const parameters: { name: string; span: ReturnType<Places['span']> }[] = []
  let at = raw.start + raw.text.indexOf('(') + 1
  for (const part of list.split(',')) {
    const parameter = part.trim()
    const start = at + (part.length - part.trimStart().length)
    const span = places.span(start, start + Math.max(parameter.length, 1))
    if (!new RegExp(`^${NAME}$`).test(parameter)) {
      const message =
        parameter === '' ? 'the name of an argument was expected' : `\`${parameter}\` is not a name`
      return {
        problem: { rule: 'bad-block', message, hint: `write for example \`${name}(x, P) = …\``, span },
      }
    }
    if (parameters.some((other) => other.name === parameter)) {
      return {
        problem: {
          rule: 'duplicate-name',
          message: `the argument \`${parameter}\` is named twice`,
          hint: 'give each argument its own name',
          span,
        },
      }
    }
    parameters.push({ name: parameter, span })
    at += part.length + 1
  }
  const nameSpan = places.span(raw.start, raw.start + name.length)
  const expression = expressionAt(places, raw, whole.length)
  return { ok: { kind: 'function', ...base(places, raw), name, nameSpan, parameters, expression } }
}

/** Reads `a <= b`: exactly one comparison outside brackets and quoted text. */
export function readAcceptance(places: Places, raw: RawStatement): Read<Acceptance> {
  const relations = relationsIn(raw.text)
  const [only] = relations
  const span = places.span(raw.start, raw.start + raw.text.length)
  if (!only || relations.length > 1 || only.text === '==' || only.text === '!=' || only.text === '=') {
    const message = !only
      ? 'a check compares two values, and there is no comparison here'
      : relations.length > 1
        ? `a check holds one comparison, and there are ${relations.length} here`
        : `\`${only.text}\` does not make a check`
    return {
      problem: {
        rule: 'bad-block',
        message,
        hint: 'write one of `a <= b`, `a < b`, `a >= b`, `a > b`; one check a line',
        span,
      },
    }
  }
  const left = expressionAt(places, raw, 0, only.at)
  const right = expressionAt(places, raw, only.at + only.text.length)
  return { ok: { kind: 'acceptance', ...base(places, raw), left, relation: only.text as Relation, right } }
}

function relationsIn(text: string): { at: number; text: string }[] {
  const found: { at: number; text: string }[] = []
  let depth = 0
  let quote = ''
  for (let at = 0; at < text.length; at++) {
    const c = text[at] ?? ''
    if (quote !== '') {
      if (c === quote) quote = ''
      continue
    }
    if (c === '"' || c === "'") quote = c
    else if ('([{'.includes(c)) depth++
    else if (')]}'.includes(c)) depth--
    else if (depth === 0 && '<>=!'.includes(c)) {
      const two = text.slice(at, at + 2)
      const relation = ['<=', '>=', '==', '!='].includes(two) ? two : c
      found.push({ at, text: relation })
      at += relation.length - 1
    }
  }
  return found
}
