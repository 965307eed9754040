import type {
  CalculatedBlock,
  Calculation,
  CheckLine,
  Failure,
  Line,
  NamedLine,
  UsedSheet,
} from '../calculate/types.ts'
import { pathsUsed } from './paths-used.ts'

/** Something that gets a line of its own on the page: a calculated line, or one that could not be calculated. */
export type Entry = Line | Failure

export const isFailure = (entry: Entry): entry is Failure => !('kind' in entry)

/** What a block prints as numbered lines, in document order; a used sheet's lines stand where it is used. */
export function entriesOf(block: CalculatedBlock, user: Calculation): readonly Entry[] {
  const { used } = block
  if (used && !used.brief) return allEntries(used.calculation)
  if (used) return [...briefResults(used, user), ...limitsOf(used)]
  if (block.block.kind === 'method') return block.failures
  return [...block.lines, ...block.failures].sort(
    (a, b) => a.statement.span.start.offset - b.statement.span.start.offset,
  )
}

/** All that a sheet prints as numbered lines. */
export function allEntries(calculation: Calculation): readonly Entry[] {
  return calculation.blocks.flatMap((block) => entriesOf(block, calculation))
}

/**
 * The results that a `brief` use prints: of a built-in method all that it returns; of another sheet, which may hold values
 * for many, those that this sheet uses.
 */
export function briefResults(
  { as, builtIn, calculation }: UsedSheet,
  user: Calculation,
): readonly NamedLine[] {
  const { sheet, names, blocks } = calculation
  const returned = (sheet.meta.returns ?? []).flatMap((name) => names.get(name) ?? [])
  const mentioned = new Set(pathsUsed(user))
  const wanted = [...names.values()].filter(({ name }) => mentioned.has(`${as}.${name}`))
  if (!builtIn && wanted.length > 0) return wanted
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
