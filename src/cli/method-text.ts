import type { Block, Sheet, Statement } from '../sheet/types.ts'
import { columns } from './columns.ts'
import { wrap } from './wrap.ts'

/** A sheet made for others in a few paragraphs: what it takes, gives and is limited to, and how it is known to be right. */
export function methodText(id: string, { meta, blocks }: Sheet): string {
  const cases = (meta.published ?? []).map(({ title, source, origin }) => [title ?? '', source, origin ?? ''])
  return [
    [id, meta.title, [meta.source, meta.clause].filter(Boolean).join(', ')].filter(Boolean).join('\n') + '\n',
    part('Inputs', blocks.flatMap(inputRows)),
    part('Results', resultRows(meta.returns ?? [], blocks)),
    part('Limits of use', blocks.flatMap(limitRows)),
    part(`Published check values: ${cases.length}`, cases),
    meta.unverified === undefined ? '' : `Not verified\n${wrap(meta.unverified, '  ')}\n`,
  ]
    .filter((text) => text !== '')
    .join('\n')
}

function inputRows(block: Block): string[][] {
  if (block.kind !== 'given') return []
  return block.statements.map((statement) => [
    statement.name,
    statement.kind === 'caller-input' ? statement.inputKind : `${statement.expression.text} unless bound`,
    statement.meaning ?? '',
  ])
}

function resultRows(returns: readonly string[], blocks: readonly Block[]): string[][] {
  const statements = blocks.flatMap((block): readonly Statement[] =>
    block.kind === 'given' || block.kind === 'working' ? block.statements : [],
  )
  const meaningOf = (name: string) => statements.find((s) => 'name' in s && s.name === name)?.meaning ?? ''
  return returns.map((name) => [name, meaningOf(name)])
}

function limitRows(block: Block): string[][] {
  if (block.kind !== 'check' || !block.validity) return []
  return block.statements.map(({ text, meaning = '', reference = '' }) => [text, meaning, reference])
}

function part(title: string, rows: readonly (readonly string[])[]): string {
  const lines = rows.length === 0 ? ['none'] : columns(rows)
  return `${title}\n${lines.map((line) => `  ${line}\n`).join('')}`
}
