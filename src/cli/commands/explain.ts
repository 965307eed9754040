import { allFunctions, findFunction } from '../../calculate/functions/index.ts'
import { KINDS } from '../../quantity/kinds.ts'
import { nearestName } from '../../quantity/nearest-name.ts'
import { UNITS, unitText } from '../../quantity/units.ts'
import { builtInIds, SheetLibrary } from '../../sheet/library.ts'
import type { Sheet, Statement } from '../../sheet/types.ts'
import { RULES, type RuleId } from '../../verify/rules.ts'
import { UsageError, type Command } from '../command.ts'
import { columns } from '../columns.ts'
import { wrap } from '../wrap.ts'

export const explain: Command = {
  name: 'explain',
  args: '<id>',
  summary: 'explain a function, method, finding, unit or kind',
  details: 'ID is the name of any of them, or `functions`, `units`, `kinds` or `findings` for a list.',
  flags: [],
  run([id = ''], _options, io) {
    const text = explained(id, io.cwd)
    if (text === undefined) {
      const known = [
        ...Object.keys(RULES),
        ...allFunctions().map(({ name }) => name),
        ...builtInIds(),
        ...Object.keys(KINDS),
        'functions',
        'units',
        'kinds',
        'findings',
      ]
      const near = nearestName(id, known)
      throw new UsageError(
        `nothing is known by the name \`${id}\``,
        near
          ? `did you mean \`${near}\`?`
          : '`stanchion explain functions`, `units`, `kinds` and `findings` list what there is',
      )
    }
    io.out(text)
    return Promise.resolve(0)
  },
}

function explained(id: string, cwd: string): string | undefined {
  if (Object.hasOwn(RULES, id)) return ruleText(id as RuleId)
  const fn = findFunction(id)
  if (fn)
    return `${fn.signature}\n${fn.summary}\n\n${wrap(fn.explain)}\n${fn.source ? `\n${wrap(`Source: ${fn.source}.`)}\n` : ''}`
  if (id === 'functions') return list(allFunctions().map(({ signature, summary }) => [signature, summary]))
  if (id === 'findings')
    return list(Object.entries(RULES).map(([name, { severity, title }]) => [name, severity, title]))
  if (id === 'kinds') return list(Object.entries(KINDS).map(([name, { words }]) => [name, words]))
  if (id === 'units')
    return list(Object.entries(UNITS).map(([name, unit]) => [name, unit.words, `in SI: ${unit.factor}`]))
  if (Object.hasOwn(UNITS, id))
    return `${id}: ${UNITS[id]?.words}, printed ${unitText([{ unit: id, exponent: 1 }])}; one is ${UNITS[id]?.factor} in coherent SI units\n`
  if (Object.hasOwn(KINDS, id))
    return `${id}: ${KINDS[id as keyof typeof KINDS].words}; an input of this kind is declared as \`NAME : ${id}\`\n`
  if (!id.includes('/')) return undefined
  const found = new SheetLibrary().find(id, '.', cwd)
  return 'rule' in found || !found.parsed.sheet ? undefined : methodText(found.id, found.parsed.sheet)
}

function ruleText(id: RuleId): string {
  const { severity, title, explain: text } = RULES[id]
  return `${id} (${severity})\n${title}\n\n${wrap(text)}\n`
}

function methodText(id: string, { meta, blocks }: Sheet): string {
  const statements = blocks.flatMap((block): readonly Statement[] =>
    block.kind === 'given' || block.kind === 'working' ? block.statements : [],
  )
  const inputs = blocks.flatMap((block) =>
    block.kind === 'given'
      ? block.statements.map((s) => [
          s.name,
          s.kind === 'caller-input' ? s.inputKind : `${s.expression.text} unless bound`,
          s.meaning ?? '',
        ])
      : [],
  )
  const returns = (meta.returns ?? []).map((name) => [
    name,
    statements.find((s) => 'name' in s && s.name === name)?.meaning ?? '',
  ])
  const limits = blocks.flatMap((block) =>
    block.kind === 'check' && block.validity
      ? block.statements.map((s) => [s.text, s.meaning ?? '', s.reference ?? ''])
      : [],
  )
  const cases = (meta.published ?? []).map(({ title, source, origin }) => [title ?? '', source, origin ?? ''])
  return [
    `${id}\n${meta.title}\n${[meta.source, meta.clause].filter(Boolean).join(', ')}\n`,
    `Inputs\n${list(inputs, '  ')}`,
    `Results\n${list(returns, '  ')}`,
    `Limits of use\n${list(limits, '  ')}`,
    `Published check values: ${cases.length}\n${list(cases, '  ')}`,
    meta.unverified ? `Not verified\n${wrap(meta.unverified, '  ')}\n` : '',
  ]
    .filter((part) => part !== '')
    .join('\n')
}

function list(rows: readonly (readonly string[])[], indent = ''): string {
  return columns(rows)
    .map((row) => `${indent}${row}\n`)
    .join('')
}
