import { allFunctions } from '../../calculate/functions/index.ts'
import { builtInIds, SheetLibrary } from '../../sheet/library.ts'
import { columns } from '../columns.ts'
import type { ExitStatus, Io, Options } from '../command.ts'

/** The groups of functions, in the order of the list. */
const GROUPS = ['model', 'question', 'closed form', 'table', 'arithmetic'] as const

export function run(_args: readonly string[], _options: Options, io: Io): Promise<ExitStatus> {
  const functions = GROUPS.flatMap((group) =>
    allFunctions()
      .filter((fn) => fn.group === group)
      .map((fn) => [fn.group, fn.signature, fn.summary]),
  )
  io.out(`Methods\n${indented(methodRows(io.cwd))}\nFunctions\n${indented(functions)}`)
  return Promise.resolve(0)
}

/** Id, title, source and number of published check values of every built-in method. */
export function methodRows(cwd: string): string[][] {
  const library = new SheetLibrary()
  return builtInIds().map((id) => {
    const found = library.find(id, '.', cwd)
    const meta = 'rule' in found ? undefined : found.parsed.sheet?.meta
    const cases = meta?.published?.length ?? 0
    return [
      id,
      meta?.title ?? 'cannot be read',
      [meta?.source, meta?.clause].filter(Boolean).join(', '),
      `${cases} published check value${cases === 1 ? '' : 's'}`,
    ]
  })
}

function indented(rows: readonly (readonly string[])[]): string {
  return columns(rows)
    .map((row) => `  ${row}\n`)
    .join('')
}
