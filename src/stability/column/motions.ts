import type { Column, Restraint } from './ends.ts'

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

const BASE_TURNS: Motion = [0.5, 0.5, 0, 0]
const TOP_TURNS: Motion = [0.5, -0.5, 0, 0]
const SWAYS: Motion = [0, 0, 0, 1]

const strength = (restraint: Restraint) =>
  restraint === 'fixed' ? Infinity : restraint === 'free' ? 0 : restraint

/**
 * The independent motions that the fixed ends leave. They are chosen by the springs' size, so that no stiffness is lost as
 * the small difference of large ones: each end's turn moves nothing else; in the lean, the end with the stronger
 * translational spring stays in place, and an end that is held against rotation more strongly than the member could hold it
 * keeps its direction.
 */
export function freeMotions({ L, EI, base, top }: Column): Motion[] {
  const motions: Motion[] = []
  if (base.rotation !== 'fixed') motions.push(BASE_TURNS)
  if (top.rotation !== 'fixed') motions.push(TOP_TURNS)
  const [baseHold, topHold] = [strength(base.translation), strength(top.translation)]
  if (Math.min(baseHold, topHold) === Infinity) return motions
  const stiff = (restraint: Restraint) => (strength(restraint) * L > EI ? 1 : 0)
  const [baseBack, topBack] = [stiff(base.rotation), stiff(top.rotation)]
  motions.push([-(baseBack + topBack) / 2, (topBack - baseBack) / 2, 1, topHold > baseHold ? -1 : 0])
  if (Math.max(baseHold, topHold) < Infinity) motions.push(SWAYS)
  return motions
}

/** The dimensionless stiffness that the end springs give to the motions, summed spring by spring. */
export function springStiffness({ L, EI, base, top }: Column, motions: readonly Motion[]): number[][] {
  const springs: readonly (readonly [Restraint, Motion, number])[] = [
    [base.translation, END_MOTIONS.baseTranslation, (L * L * L) / EI],
    [base.rotation, END_MOTIONS.baseRotation, L / EI],
    [top.translation, END_MOTIONS.topTranslation, (L * L * L) / EI],
    [top.rotation, END_MOTIONS.topRotation, L / EI],
  ]
  const K = motions.map(() => motions.map(() => 0))
  for (const [spring, end, scale] of springs)
    if (typeof spring === 'number')
      addProduct(
        K,
        spring * scale,
        motions.map((motion) => along(end, motion)),
      )
  return K
}

/** Adds factor · v vᵀ to K. */
export function addProduct(K: number[][], factor: number, v: readonly number[]): void {
  for (const [i, row] of K.entries())
    for (const j of row.keys()) row[j] = (row[j] as number) + factor * (v[i] as number) * (v[j] as number)
}

/** How far an end moves with a motion: sums of halves and ones, so that what stays in place is exactly zero. */
const along = (end: Motion, motion: Motion) =>
  end[0] * motion[0] + end[1] * motion[1] + end[2] * motion[2] + end[3] * motion[3]
