import { expect } from 'vitest'
import type { NamedLine } from '../../src/calculate/types.ts'
import { prepareSheet, type Prepared } from '../../src/pipeline.ts'

export type Bindings = Readonly<Record<string, string | number>>

/** A method used with `bindings` by a sheet that has nothing else, and the names `read` (expressions in `m.`) taken from it. */
export function useMethod(id: string, bindings: Bindings, read: readonly string[] = []): Prepared {
  const lines = Object.entries(bindings).map(([name, expression]) => `${name} = ${expression}`)
  const working = read.map((expression, i) => `result_${i} = ${expression}`)
  const text = [
    '---',
    'sheet: T-1',
    'title: trial of a method',
    '---',
    '',
    `\`\`\`method ${id} as m`,
    ...lines,
    '```',
    '',
    '```working',
    ...working,
    '```',
    '',
  ].join('\n')
  return prepareSheet({ path: 'trial.md', text })
}

/** The SI values of `read`, all of which must be quantities. */
export function results(prepared: Prepared, read: readonly string[]): number[] {
  return read.map((expression, i) => {
    const line: NamedLine | undefined = prepared.calculation?.names.get(`result_${i}`)
    if (line?.value.type !== 'quantity')
      throw new Error(`no value for ${expression}: ${prepared.findings.map(String).join('\n')}`)
    return line.value.si
  })
}

/** What was found wrong, apart from the trial sheet's having no check of its own. */
export function problems(prepared: Prepared): string[] {
  return prepared.findings
    .filter(({ ruleId }) => ruleId !== 'no-checks')
    .map(({ ruleId, reason }) => `${ruleId}: ${reason}`)
}

/** Relative closeness; an expected zero must be met exactly. */
export function expectWithin(what: string, value: number, expected: number, tolerance: number): void {
  const difference = Math.abs(value - expected) / (Math.abs(expected) || 1)
  expect(
    `${what} ${difference <= tolerance ? 'within' : `${value} differs by ${difference}, not within`} ${tolerance}`,
  ).toBe(`${what} within ${tolerance}`)
}
