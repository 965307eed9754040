import type { Calculation } from '../calculate/types.ts'
import { pathsIn } from './paths-in.ts'

const found = new WeakMap<Calculation, readonly string[]>()

/** Every dotted path that the formulas and values of a sheet mention, in code-unit order. */
export function pathsUsed(calculation: Calculation): readonly string[] {
  let paths = found.get(calculation)
  if (paths === undefined) found.set(calculation, (paths = collect(calculation)))
  return paths
}

function collect({ blocks, inlineValues }: Calculation): string[] {
  const formulas = [
    ...blocks.flatMap(({ lines }) =>
      lines.flatMap((line) =>
        line.kind === 'check' ? [line.demandFormula, line.capacityFormula] : [line.formula],
      ),
    ),
    ...inlineValues.flatMap(({ formula }) => formula ?? []),
  ]
  return [...new Set(formulas.flatMap((formula) => pathsIn(formula)))].sort()
}
