import type { CalculatedBlock, CheckLine, Failure, Line, NamedLine, UsedSheet } from '../calculate/types.ts'

/** Something that gets a line of its own on the page: a calculated line, or one that could not be calculated. */
export type Entry = Line | Failure

export const isFailure = (entry: Entry): entry is Failure => !('kind' in entry)

/** What a block prints as numbered lines, in document order; a used sheet's lines stand where it is used. */
export function entriesOf(block: CalculatedBlock): readonly Entry[] {
  const { used } = block
  if (used && !used.brief) return used.calculation.blocks.flatMap(entriesOf)
  if (used) return [...briefResults(used), ...limitsOf(used)]
  if (block.block.kind === 'method') return block.failures
  return [...block.lines, ...block.failures].sort(
    (a, b) => a.statement.span.start.offset - b.statement.span.start.offset,
  )
}

/**
 * The results that a `brief` use prints: of a built-in method all that it returns; of another sheet, which may hold values
 * for many, those that this sheet uses.
 */
export function briefResults(used: UsedSheet): readonly NamedLine[] {
  const { sheet, names, blocks } = used.calculation
  const returned = (sheet.meta.returns ?? []).flatMap((name) => names.get(name) ?? [])
  if (returned.length > 0) return returned
  return blocks
    .filter(({ block }) => block.kind === 'working')
    .flatMap(({ lines }) => lines.filter((line): line is NamedLine => line.kind === 'named'))
}

/** The checks of a used sheet, of its own used sheets too. */
export function limitsOf(used: UsedSheet): readonly CheckLine[] {
  return used.calculation.blocks.flatMap((block) =>
    block.used
      ? limitsOf(block.used)
      : block.lines.filter((line): line is CheckLine => line.kind === 'check'),
  )
}
