import { allFunctions, findFunction } from '../../calculate/functions/index.ts'
import { dimensionName, KINDS } from '../../quantity/kinds.ts'
import { nearestName } from '../../quantity/nearest-name.ts'
import { UNITS, unitText } from '../../quantity/units.ts'
import { builtInIds, SheetLibrary } from '../../sheet/library.ts'
import { RULES, type RuleId } from '../../verify/rules.ts'
import { cleanText } from '../clean-text.ts'
import { columns } from '../columns.ts'
import { UsageError, type ExitStatus, type Io, type Options } from '../command.ts'
import { methodText } from '../method-text.ts'
import { wrap } from '../wrap.ts'
import { methodRows } from './methods.ts'

export function run([id = '']: readonly string[], _options: Options, io: Io): Promise<ExitStatus> {
  const text = LISTS.get(id)?.(io.cwd) ?? explained(id) ?? methodExplained(id, io.cwd)
  if (text === undefined) throw unknown(id)
  io.out(cleanText(text))
  return Promise.resolve(0)
}

const LISTS: ReadonlyMap<string, (cwd: string) => string> = new Map<string, (cwd: string) => string>([
  ['functions', () => list(allFunctions().map(({ signature, summary }) => [signature, summary]))],
  ['methods', (cwd) => list(methodRows(cwd))],
  [
    'findings',
    () => list(Object.entries(RULES).map(([name, { severity, title }]) => [name, severity, title])),
  ],
  ['kinds', () => list(Object.entries(KINDS).map(([name, { words }]) => [name, words]))],
  ['units', () => list(Object.keys(UNITS).map((name) => [name, UNITS[name]?.words ?? '', inSi(name)]))],
])

function explained(id: string): string | undefined {
  if (Object.hasOwn(RULES, id)) return ruleText(id as RuleId)
  const fn = findFunction(id)
  if (fn)
    return `${fn.signature}\n${fn.summary}\n\n${wrap(fn.explain)}\n${fn.source ? `\n${wrap(`Source: ${fn.source}.`)}\n` : ''}`
  if (Object.hasOwn(UNITS, id))
    return `${id}: ${UNITS[id]?.words}, printed ${unitText([{ unit: id, exponent: 1 }])}\n${inSi(id)}\n`
  if (Object.hasOwn(KINDS, id))
    return `${id}: ${KINDS[id as keyof typeof KINDS].words}\nAn input of this kind is declared as \`NAME : ${id}\`.\n`
  return undefined
}

/** `1 kip = 4448.2216152605 SI (force)`: the factor to coherent SI units. */
function inSi(name: string): string {
  const unit = UNITS[name]
  if (!unit) return ''
  const dimension = dimensionName(unit.dimension)
  return `1 ${name} = ${String(unit.factor)} in SI units${dimension === '1' ? ', no dimension' : `, ${dimension}`}`
}

function ruleText(id: RuleId): string {
  const { severity, title, explain: text } = RULES[id]
  return `${id} (${severity})\n${title}\n\n${wrap(text)}\n`
}

/** Stands for a sheet in the folder where the command is called, from which paths are taken. */
const HERE = 'sheet.md'

/** A built-in method, or a sheet of one's own by its path. */
function methodExplained(id: string, cwd: string): string | undefined {
  if (!id.includes('/') && !id.endsWith('.md')) return undefined
  const found = new SheetLibrary().find(id, HERE, cwd)
  if ('rule' in found) {
    if (found.rule === 'method-unknown') return undefined
    throw new UsageError(found.message, found.hint)
  }
  if (!found.parsed.sheet)
    throw new UsageError(`\`${id}\` has no usable front matter`, `\`stanchion check ${id}\` says why`)
  return methodText(found.id, found.parsed.sheet)
}

function unknown(id: string): UsageError {
  const known = [
    ...LISTS.keys(),
    ...Object.keys(RULES),
    ...allFunctions().map(({ name }) => name),
    ...builtInIds(),
    ...Object.keys(KINDS),
    ...Object.keys(UNITS),
  ]
  const near = nearestName(id, known)
  return new UsageError(
    `nothing is known by the name \`${id}\``,
    near
      ? `did you mean \`${near}\`?`
      : '`stanchion explain functions`, `methods`, `units`, `kinds` and `findings` list what there is',
  )
}

function list(rows: readonly (readonly string[])[]): string {
  return columns(rows)
    .map((row) => `${row}\n`)
    .join('')
}
