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
 * How a column can move, in four parts made dimensionless with L: the ends turned against the chord, equally (bent to an S)
 * and oppositely (bent to a bow), the turn of the chord, and the sway of the base. The member's stiffness is diagonal in them.
 */
export type Motion = readonly [ess: number, bow: number, chord: number, sway: number]

/** Base sway, base rotation, top sway and top rotation, each in terms of the four parts. */
const END_MOTIONS = {
  baseTranslation: [0, 0, 0, 1],
  baseRotation: [1, 1, 1, 0],
  topTranslation: [0, 0, 1, 1],
  topRotation: [1, -1, 1, 0],
} as const satisfies Record<string, Motion>

/** A spring stiffer than the member is treated as nearly fixed, so that neither loses digits to the other. */
const isStrong = (spring: Restraint, scale: number) =>
  spring === 'fixed' || (typeof spring === 'number' && spring * scale > 1)

/**
 * The independent motions that the fixed ends leave, as rows of the four parts. They are chosen by the springs' size: what
 * a strong spring holds stays still in the other motions.
 */
export function freeMotions({ L, EI, base, top }: Column): Motion[] {
  const turn = L / EI
  const push = (L * L * L) / EI
  const motions: Motion[] = []
  const baseTurns = base.rotation !== 'fixed'
  const topTurns = top.rotation !== 'fixed'
  if (baseTurns && topTurns) motions.push([1, 0, 0, 0], [0, 1, 0, 0])
  else if (baseTurns) motions.push([0.5, 0.5, 0, 0])
  else if (topTurns) motions.push([0.5, -0.5, 0, 0])
  const backBase = isStrong(base.rotation, turn) ? -1 : 0
  const backTop = isStrong(top.rotation, turn) ? -1 : 0
  const chordTurn = (chord: number, sway: number): Motion => [
    (chord * (backBase + backTop)) / 2,
    (chord * (backBase - backTop)) / 2,
    chord,
    sway,
  ]
  const [baseHeld, topHeld] = [base.translation === 'fixed', top.translation === 'fixed']
  const [baseStrong, topStrong] = [isStrong(base.translation, push), isStrong(top.translation, push)]
  if (!(baseHeld && topHeld)) motions.push(chordTurn(1, topHeld || (topStrong && !baseStrong) ? -1 : 0))
  if (!baseHeld && !topHeld) motions.push(baseStrong && topStrong ? chordTurn(-1, 1) : [0, 0, 0, 1])
  return motions
}

/** The dimensionless stiffness that the end springs give to the four parts. */
export function springStiffness({ L, EI, base, top }: Column): number[][] {
  const K = [0, 1, 2, 3].map(() => [0, 0, 0, 0])
  const springs: readonly [Restraint, Motion, number][] = [
    [base.translation, END_MOTIONS.baseTranslation, (L * L * L) / EI],
    [base.rotation, END_MOTIONS.baseRotation, L / EI],
    [top.translation, END_MOTIONS.topTranslation, (L * L * L) / EI],
    [top.rotation, END_MOTIONS.topRotation, L / EI],
  ]
  for (const [spring, motion, scale] of springs) {
    if (typeof spring !== 'number') continue
    for (const [i, row] of K.entries())
      for (const j of row.keys())
        row[j] = (row[j] as number) + spring * scale * (motion[i] as number) * (motion[j] as number)
  }
  return K
}

/** A matrix of the four parts (and of more after them) seen by the free motions. */
export function reduce(
  K: readonly (readonly number[])[],
  motions: readonly (readonly number[])[],
): number[][] {
  return motions.map((a) =>
    motions.map((b) =>
      a.reduce(
        (sum, ai, i) =>
          ai === 0
            ? sum
            : sum +
              ai *
                b.reduce(
                  (inner, bj, j) =>
                    bj === 0 ? inner : inner + bj * ((K[i] as readonly number[])[j] as number),
                  0,
                ),
        0,
      ),
    ),
  )
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
