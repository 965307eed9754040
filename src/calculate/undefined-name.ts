import { nearestName } from '../quantity/nearest-name.ts'
import { isUnit } from '../quantity/units.ts'
import type { Sheet } from '../sheet/types.ts'
import { FormulaError } from './formula-error.ts'
import { findFunction } from './functions/index.ts'
import type { NameUse } from './names-in.ts'

/** Why a name has no value, and what was probably meant: a later definition, a unit, another name, a function. */
export function undefinedName(
  { name, span, called }: Omit<NameUse, 'path'>,
  sheet: Sheet,
  defined: readonly string[],
): FormulaError {
  const later = sheet.blocks
    .flatMap((block) =>
      block.kind === 'method'
        ? [{ name: block.as, span: block.asSpan }]
        : block.statements.flatMap((s) =>
            s.kind === 'acceptance' ? [] : [{ name: s.name, span: s.nameSpan }],
          ),
    )
    .find((definition) => definition.name === name)
  if (later) {
    return new FormulaError(
      'undefined-name',
      `\`${name}\` is used here and defined below, in line ${later.span.start.line}`,
      'move its definition above its use',
      span,
    )
  }
  if (called)
    return new FormulaError(
      'undefined-name',
      `there is no function \`${name}\``,
      'define it above in a `working` block; `stanchion explain functions` lists the built-in ones',
      span,
    )
  const near = nearestName(name, defined)
  const power = /^([A-Za-z]+)([2-9])$/.exec(name)
  const hint =
    power && isUnit(power[1] as string)
      ? `did you mean the unit \`${power[1]}^${power[2]}\`?`
      : isUnit(name)
        ? `a unit is only read directly after a number: \`1 ${name}\``
        : near
          ? `did you mean \`${near}\`?`
          : findFunction(name)
            ? `\`${name}\` is a function: \`${findFunction(name)?.signature}\``
            : 'define it above, in a `given` or `working` block'
  return new FormulaError('undefined-name', `\`${name}\` is not defined`, hint, span)
}
