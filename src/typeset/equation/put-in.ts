import type { Quantity, Value } from '../../calculate/types.ts'
import type { Profile } from '../../quantity/profile.ts'
import { show, type Shown } from '../../quantity/show.ts'
import type { Meant } from './operand.ts'
import { showOperand } from './quantity-tex.ts'

/** How an angle in degrees is put in: as it is alone and as an argument; in radians where it is reckoned with as a number. */
export type Angles = 'as-shown' | 'degrees' | 'radians'

/** Whether the value of a name is put in for it. Models, functions and rows of tables keep their names. */
export function isPutIn(value: Value): boolean {
  return (
    value.type === 'quantity' || value.type === 'array' || value.type === 'text' || value.type === 'truth'
  )
}

const RADIAN = [{ unit: 'rad', exponent: 1 }]

/** The number put in for a name. */
export function showPutIn(meant: Meant, value: Quantity, profile: Profile, angles: Angles): Shown {
  const shown = showOperand(meant, value, profile)
  return angles === 'radians' && isDegrees(shown) ? show(value, profile, { unit: RADIAN }) : shown
}

function isDegrees({ unit }: Shown): boolean {
  return unit.length === 1 && unit[0]?.unit === 'deg' && unit[0].exponent === 1
}
