import type { Code } from 'mdast'
import type { Places } from './places.ts'
import {
  readAcceptance,
  readAssignment,
  readCallerInput,
  readFunction,
  splitStatements,
  type Problem,
  type RawStatement,
  type Read,
} from './statement.ts'
import type { Block, Span, Statement } from './types.ts'

export const BLOCK_KINDS = ['check', 'given', 'method', 'working'] as const
/** Blocks of the sheet language that this version does not calculate; passing over one would hide it. */
export const RESERVED_KINDS = [
  'assumptions',
  'combinations',
  'figure',
  'loads',
  'model',
  'premises',
  'schedule',
] as const

export type BlockKind = (typeof BLOCK_KINDS)[number]

export interface ReadBlock {
  readonly block?: Block
  readonly problems: readonly Problem[]
}

interface Fence {
  readonly node: Code
  readonly span: Span
  readonly heading?: string
  /** The opening line: where it stands, and its words after the fence. */
  readonly info: string
  readonly infoStart: number
  readonly contentStart: number
  readonly contentEnd: number
}

/** Reads one fenced block of the sheet language. */
export function readBlock(places: Places, node: Code, heading: string | undefined): ReadBlock {
  const fence = readFence(places, node, heading)
  switch (node.lang as BlockKind) {
    case 'given':
      return read(
        places,
        fence,
        '',
        (raw) => named(places, raw, 'given'),
        (statements) => ({ kind: 'given', ...common(fence), statements }) as Block,
      )
    case 'working':
      return read(
        places,
        fence,
        '',
        (raw) => named(places, raw, 'working'),
        (statements) => ({ kind: 'working', ...common(fence), statements }) as Block,
      )
    case 'check': {
      const validity = node.meta?.trim() === 'validity'
      const build = (statements: readonly Statement[]) =>
        ({ kind: 'check', ...common(fence), validity, statements }) as Block
      return read(places, fence, validity ? 'validity' : '', (raw) => readAcceptance(places, raw), build)
    }
    case 'method':
      return readMethod(places, fence)
  }
}

function readFence(places: Places, node: Code, heading: string | undefined): Fence {
  const start = node.position?.start.offset ?? 0
  const end = node.position?.end.offset ?? start
  const { text } = places
  const firstEnd = text.indexOf('\n', start)
  const openEnd = firstEnd < 0 || firstEnd > end ? end : firstEnd
  const marker = /^(`{3,}|~{3,})\s*/.exec(text.slice(start, openEnd))?.[0] ?? ''
  const lastStart = text.lastIndexOf('\n', end - 1) + 1
  const closed = lastStart > openEnd && /^\s*(`{3,}|~{3,})\s*$/.test(text.slice(lastStart, end))
  const contentStart = Math.min(openEnd + 1, end)
  return {
    node,
    span: places.span(start, end),
    ...(heading === undefined ? {} : { heading }),
    info: text.slice(start + marker.length, openEnd).trimEnd(),
    infoStart: start + marker.length,
    contentStart,
    contentEnd: Math.max(contentStart, closed ? lastStart - 1 : end),
  }
}

function common({ span, node, heading }: Fence) {
  return { span, node, ...(heading === undefined ? {} : { heading }) }
}

function read(
  places: Places,
  fence: Fence,
  meta: string,
  one: (raw: RawStatement) => Read<Statement>,
  build: (statements: readonly Statement[]) => Block,
): ReadBlock {
  const problems: Problem[] = []
  if ((fence.node.meta ?? '').trim() !== meta) {
    const infoSpan = places.span(fence.infoStart, fence.infoStart + fence.info.length)
    const expected =
      fence.node.lang === 'check' ? '`check` or `check validity`' : `\`${fence.node.lang}\` alone`
    problems.push({
      rule: 'bad-block',
      message: `the opening line is \`${fence.info}\`, and ${expected} was expected`,
      hint: 'remove the other words',
      span: infoSpan,
    })
  }
  const statements: Statement[] = []
  for (const raw of splitStatements(places, fence.contentStart, fence.contentEnd)) {
    const result = 'ok' in raw ? one(raw.ok) : raw
    if ('ok' in result) statements.push(result.ok)
    else problems.push(result.problem)
  }
  return { block: build(statements), problems }
}

function named(places: Places, raw: RawStatement, kind: 'given' | 'working'): Read<Statement> {
  const definition = readFunction(places, raw)
  if (definition) {
    if (kind === 'working' || 'problem' in definition) return definition
    return {
      problem: {
        rule: 'bad-block',
        message: `the function \`${definition.ok.name}\` is defined in a \`given\` block`,
        hint: 'define functions in a `working` block',
        span: definition.ok.span,
      },
    }
  }
  const statement = readAssignment(places, raw) ?? readCallerInput(places, raw)
  if (!statement) return notNamed(places, raw, kind)
  if (statement.kind === 'caller-input' && kind === 'working') {
    return {
      problem: {
        rule: 'bad-block',
        message: `\`${raw.text}\` asks for an input in a \`working\` block`,
        hint: 'inputs stand in a `given` block',
        span: statement.span,
      },
    }
  }
  return { ok: statement }
}

function notNamed(places: Places, raw: RawStatement, kind: string): { problem: Problem } {
  const span = places.span(raw.start, raw.start + raw.text.length)
  const compared = /[<>]/.test(raw.text)
  const oddName = /^([^=:]*?)\s*[=:]/.exec(raw.text)?.[1]
  const message =
    oddName !== undefined && oddName !== ''
      ? `\`${oddName}\` is not a name: names are letters, digits and \`_\`, and begin with a letter`
      : `\`${clip(raw.text)}\` is not a statement of the form \`name = expression\``
  const hint = compared
    ? 'a comparison stands in a `check` block'
    : /[^\x20-\x7e]/.test(oddName ?? '')
      ? 'spell Greek letters, as in `lambda_bar`'
      : kind === 'given'
        ? 'write `name = expression`, or `name : kind` for an input that the using sheet supplies'
        : 'write `name = expression`'
  return { problem: { rule: 'bad-block', message, hint, span } }
}

const METHOD = /^method\s+(\S+)\s+as\s+([A-Za-z][A-Za-z0-9_]*)(\s+brief)?$/

function readMethod(places: Places, fence: Fence): ReadBlock {
  const problems: Problem[] = []
  const bindings = []
  for (const raw of splitStatements(places, fence.contentStart, fence.contentEnd)) {
    if ('problem' in raw) problems.push(raw.problem)
    else {
      const binding = readAssignment(places, raw.ok)
      if (binding) bindings.push(binding)
      else problems.push(notNamed(places, raw.ok, 'method').problem)
    }
  }
  const match = METHOD.exec(fence.info)
  if (!match) {
    const span = places.span(fence.infoStart, fence.infoStart + Math.max(fence.info.length, 1))
    problems.push({
      rule: 'bad-block',
      message: `the opening line is \`${fence.info}\`, and \`method ID as NAME\` was expected`,
      hint: 'write for example `method en1993-1-1/6.3.1 as minor`, with `brief` after it for results only',
      span,
    })
    return { problems }
  }
  const [, id, as, brief] = match as unknown as [string, string, string, string | undefined]
  const idStart = fence.infoStart + fence.info.indexOf(id, 'method'.length)
  const asStart = fence.infoStart + fence.info.length - (brief?.length ?? 0) - as.length
  const block: Block = {
    kind: 'method',
    ...common(fence),
    id,
    idSpan: places.span(idStart, idStart + id.length),
    as,
    asSpan: places.span(asStart, asStart + as.length),
    brief: brief !== undefined,
    bindings,
  }
  return { block, problems }
}

function clip(text: string): string {
  const line = text.split('\n')[0] ?? ''
  return line.length > 60 ? `${line.slice(0, 57)}…` : line
}
