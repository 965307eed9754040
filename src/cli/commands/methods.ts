import { allFunctions } from '../../calculate/functions/index.ts'
import { builtInIds, SheetLibrary } from '../../sheet/library.ts'
import type { Command } from '../command.ts'
import { columns } from '../columns.ts'

export const methods: Command = {
  name: 'methods',
  args: '',
  summary: 'list the built-in methods and functions',
  details: '`stanchion explain ID` says more about any of them.',
  flags: [],
  run(_args, _options, io) {
    const library = new SheetLibrary()
    const rows = builtInIds().map((id) => {
      const found = library.find(id, '.', io.cwd)
      const meta = 'rule' in found ? undefined : found.parsed.sheet?.meta
      const cases = meta?.published?.length ?? 0
      return [
        id,
        meta?.title ?? 'cannot be read',
        `${meta?.source ?? ''}${meta?.clause ? `, ${meta.clause}` : ''}`,
        `${cases} published check value${cases === 1 ? '' : 's'}`,
      ]
    })
    const groups = ['model', 'question', 'closed form', 'table', 'arithmetic'] as const
    const functions = groups.flatMap((group) =>
      allFunctions()
        .filter((fn) => fn.group === group)
        .map((fn) => [fn.group, fn.signature, fn.summary]),
    )
    io.out(
      `Methods\n${columns(rows)
        .map((row) => `  ${row}\n`)
        .join('')}\nFunctions\n${columns(functions)
        .map((row) => `  ${row}\n`)
        .join('')}`,
    )
    return Promise.resolve(0)
  },
}
