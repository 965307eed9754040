import { StabilityError } from '../result.ts'

/** A restraint: held, released, or a spring in N·m/rad (rotation) or N/m (translation), not negative. */
export type Restraint = 'fixed' | 'free' | number

export interface End {
  readonly rotation: Restraint
  readonly translation: Restraint
}

/** The usual end conditions. `guided`: no rotation, free to sway. */
export const END_CONDITIONS = {
  fixed: { rotation: 'fixed', translation: 'fixed' },
  free: { rotation: 'free', translation: 'free' },
  guided: { rotation: 'fixed', translation: 'free' },
  pinned: { rotation: 'free', translation: 'fixed' },
} as const satisfies Record<string, End>

/** A uniform elastic column under an axial load at its top, free to shorten. */
export interface Column {
  /** Length, m, above zero. */
  readonly L: number
  /** Flexural rigidity E·I, N·m², above zero. */
  readonly EI: number
  readonly base: End
  readonly top: End
}

/**
 * Refuses a column that could move as a rigid body: it has no stiffness to lose.
 *
 * @throws StabilityError naming the end and what to add
 */
export function expectHeld(column: Column): void {
  for (const [end, { rotation, translation }] of [
    ['base', column.base],
    ['top', column.top],
  ] as const) {
    for (const [what, stiffness] of [
      ['rotational', rotation],
      ['translational', translation],
    ] as const) {
      if (typeof stiffness === 'number' && !(Number.isFinite(stiffness) && stiffness >= 0)) {
        throw new StabilityError(
          `the ${what} stiffness at the ${end} is ${stiffness}, and must not be negative`,
          'check its value and unit',
        )
      }
    }
  }
  const held = (restraint: Restraint) =>
    restraint === 'fixed' || (typeof restraint === 'number' && restraint > 0)
  const sway = held(column.base.translation) || held(column.top.translation)
  const lean =
    held(column.base.rotation) ||
    held(column.top.rotation) ||
    (held(column.base.translation) && held(column.top.translation))
  if (!sway)
    throw new StabilityError(
      'nothing holds the column sideways: both ends are free to sway',
      'hold one end, as in `base: "pinned"`',
    )
  if (!lean) {
    const end = held(column.base.translation) ? 'base' : 'top'
    throw new StabilityError(
      `the column is a mechanism: it can turn about its ${end} without bending`,
      'hold the other end sideways, or give one end a rotational restraint',
    )
  }
}
