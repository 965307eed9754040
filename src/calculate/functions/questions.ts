import { DIMENSIONLESS, sameDimension, type Dimension } from '../../quantity/dimension.ts'
import type { Column } from '../../stability/column/ends.ts'
import { columnCriticalLoad, columnEffectiveLength } from '../../stability/column/column.ts'
import { eulerLoad } from '../../stability/euler.ts'
import { criticalLoad } from '../../stability/mechanism/critical.ts'
import { equilibrium as equilibria } from '../../stability/mechanism/equilibrium.ts'
import { postBuckling } from '../../stability/mechanism/post-buckling.ts'
import { StabilityError, type SolverResult } from '../../stability/result.ts'
import { describeValue, quantity } from '../describe.ts'
import { FormulaError } from '../formula-error.ts'
import type { ModelValue, Value } from '../types.ts'
import { argumentAt, expectCount, misused, modelOf, ordinalOf, quantityOf } from './arguments.ts'
import type { Mechanism } from './mechanism.ts'
import type { CallContext, SheetFunction } from './types.ts'

const FORCE: Dimension = [1, 1, -2, 0]
const LENGTH: Dimension = [0, 1, 0, 0]

/** Runs a solver; what it refuses becomes a finding at the call. */
function ask<T>(context: CallContext, run: () => T): T {
  try {
    return run()
  } catch (error) {
    if (!(error instanceof StabilityError)) throw error
    throw new FormulaError(
      error.kind === 'solver' ? 'solver-failed' : 'function-misused',
      error.message,
      error.hint,
      context.formula.span,
      error,
    )
  }
}

/** Hands on the result, with how it was obtained, to the printed line. */
function answer(
  context: CallContext,
  result: SolverResult,
  dimension: Dimension,
  source: string | undefined,
): Value {
  const { value, route, status, iterations, residual, second } = result
  context.report({
    question: context.source(context.formula),
    route,
    value,
    dimension,
    status,
    iterations,
    residual,
    second,
    ...(source ? { source } : {}),
  })
  return quantity(value, dimension)
}

function wrongModel(model: ModelValue, context: CallContext, question: string, takes: string): FormulaError {
  return misused(
    argumentAt(context, 0),
    `\`${question}\` cannot be asked of a ${model.of}`,
    `it takes ${takes}`,
  )
}

const COLUMN_SOURCE =
  'Wittrick and Williams, Q. J. Mech. Appl. Math. 24 (1971); Timoshenko and Gere, Theory of Elastic Stability, ch. 2'
const MECHANISM_SOURCE = 'Thompson and Hunt, A General Theory of Elastic Stability (1973)'

const asColumn = (model: ModelValue) => model.model as Column
const asMechanism = (model: ModelValue) => model.model as Mechanism

function modeNumber(args: readonly Value[], context: CallContext): number {
  return args[1] ? ordinalOf(args[1], argumentAt(context, 1), 'the number of the mode', context) : 1
}

export const euler_load: SheetFunction = {
  name: 'euler_load',
  signature: 'euler_load(E, I, L)',
  summary: 'elastic critical load of a uniform pinned column, π² E I / L²',
  explain:
    'E: modulus of elasticity, I: second moment of area, L: length between pins, or effective length; all above zero. Gives a force, for a straight elastic column in its own plane of bending.',
  source: 'Euler (1744); Timoshenko and Gere, Theory of Elastic Stability, Art. 2.1',
  group: 'closed form',
  call(args, context) {
    expectCount(args, 3, 3, context, this.signature)
    const [E, I, L] = args.map((value, i) =>
      quantityOf(
        value,
        ([[1, -1, -2, 0], [0, 4, 0, 0], LENGTH] as Dimension[])[i] as Dimension,
        argumentAt(context, i),
        `argument ${i + 1} of \`euler_load\`,`,
        context,
      ),
    ) as [number, number, number]
    const value = ask(context, () => eulerLoad(E, I, L))
    const second = ask(context, () =>
      columnCriticalLoad({
        L,
        EI: E * I,
        base: { rotation: 'free', translation: 'fixed' },
        top: { rotation: 'free', translation: 'fixed' },
      }),
    )
    return answer(
      context,
      {
        value,
        route: 'closed form',
        status: 'closed-form',
        iterations: 0,
        residual: 0,
        second: {
          route: second.route,
          value: second.value,
          difference: Math.abs(second.value - value) / value,
          allowed: 1e-9,
        },
      },
      FORCE,
      this.source,
    )
  },
}

export const critical_load: SheetFunction = {
  name: 'critical_load',
  signature: 'critical_load(m) or critical_load(m, n)',
  summary: 'n-th elastic critical load of a column or mechanism (the lowest when n is left out)',
  explain:
    'm: a model; n: 1 for the lowest, up to 20 for a column. For a column a force, by the exact member with all eigenvalues counted. For a mechanism a load of the dimension that its energy implies, from the Hessian along the path that starts at the unloaded state; for a structure that snaps it is the limit load. An independent second route is always calculated; a difference beyond what is allowed is an error.',
  source: `${COLUMN_SOURCE} (columns); ${MECHANISM_SOURCE} (mechanisms)`,
  group: 'question',
  call(args, context) {
    expectCount(args, 1, 2, context, this.signature)
    const model = modelOf(args[0] as Value, argumentAt(context, 0), 'the model')
    const n = modeNumber(args, context)
    if (model.of === 'column')
      return answer(
        context,
        ask(context, () => columnCriticalLoad(asColumn(model), n)),
        FORCE,
        COLUMN_SOURCE,
      )
    if (model.of !== 'mechanism') throw wrongModel(model, context, 'critical_load', 'a column or a mechanism')
    const { energy, fn } = asMechanism(model)
    const result = ask(context, () => criticalLoad(energy, n))
    return answer(
      context,
      { ...result, route: `${result.route} (${result.kind})` },
      fn.loadDimension,
      MECHANISM_SOURCE,
    )
  },
}

export const effective_length: SheetFunction = {
  name: 'effective_length',
  signature: 'effective_length(m) or effective_length(m, n)',
  summary: 'length of the pinned column with the same critical load as the column m',
  explain: 'm: a column; n: number of the mode, 1 when left out. Gives a length, π·sqrt(E I / N_cr).',
  source: 'definition; Timoshenko and Gere, Theory of Elastic Stability, Art. 2.2',
  group: 'question',
  call(args, context) {
    expectCount(args, 1, 2, context, this.signature)
    const model = modelOf(args[0] as Value, argumentAt(context, 0), 'the model')
    if (model.of !== 'column') throw wrongModel(model, context, 'effective_length', 'a column')
    return answer(
      context,
      ask(context, () => columnEffectiveLength(asColumn(model), modeNumber(args, context))),
      LENGTH,
      this.source,
    )
  },
}

export const mode_shape: SheetFunction = {
  name: 'mode_shape',
  signature: 'mode_shape(m) or mode_shape(m, n)',
  summary: 'coordinates of a mechanism’s n-th buckling mode, the largest being one of its size',
  explain:
    'm: a mechanism; n: number of the mode, 1 when left out. Gives an array of the coordinates in the order of the energy’s arguments (a list when they differ in dimension).',
  source: MECHANISM_SOURCE,
  group: 'question',
  call(args, context) {
    expectCount(args, 1, 2, context, this.signature)
    const model = modelOf(args[0] as Value, argumentAt(context, 0), 'the model')
    if (model.of !== 'mechanism') throw wrongModel(model, context, 'mode_shape', 'a mechanism')
    const { energy, fn } = asMechanism(model)
    const result = ask(context, () => criticalLoad(energy, modeNumber(args, context)))
    answer(context, result, fn.loadDimension, this.source)
    const [first] = fn.coordinates
    const alike = fn.coordinates.every(({ size }) =>
      sameDimension(size.dimension, first?.size.dimension ?? DIMENSIONLESS),
    )
    if (alike) return { type: 'array', si: result.mode, dimension: first?.size.dimension ?? DIMENSIONLESS }
    return {
      type: 'list',
      items: result.mode.map((value, i) =>
        quantity(value, fn.coordinates[i]?.size.dimension ?? DIMENSIONLESS),
      ),
    }
  },
}

export const post_buckling: SheetFunction = {
  name: 'post_buckling',
  signature: 'post_buckling(m) or post_buckling(m, n)',
  summary: 'how a mechanism behaves just beyond a critical load: stable or unstable, symmetric or not',
  explain:
    'm: a mechanism whose unloaded state stays in equilibrium under the load; n: number of the critical load, 1 when left out. Gives a record: `kind` ("stable symmetric", "unstable symmetric", "asymmetric", or "undecided" when the coefficients vanish), and `a` and `b` of P = P_cr (1 + a s + b s²), where s is the amplitude of the mode in its largest coordinate, in rad or in the size given. An unstable or asymmetric structure is sensitive to imperfections: its real limit load lies below the critical load.',
  source:
    'Koiter, On the Stability of Elastic Equilibrium (1945); Budiansky, Advances in Applied Mechanics 14 (1974)',
  group: 'question',
  call(args, context) {
    expectCount(args, 1, 2, context, this.signature)
    const model = modelOf(args[0] as Value, argumentAt(context, 0), 'the model')
    if (model.of !== 'mechanism') throw wrongModel(model, context, 'post_buckling', 'a mechanism')
    const found = ask(context, () => postBuckling(asMechanism(model).energy, modeNumber(args, context)))
    const decides = found.a !== 0 ? found.a : found.b
    context.report({
      question: context.source(context.formula),
      route: `expansion to the fourth derivatives of the energy (coefficient ${found.a !== 0 ? 'a' : 'b'})`,
      value: decides,
      dimension: DIMENSIONLESS,
      status: 'converged',
      second: found.second,
      ...(this.source ? { source: this.source } : {}),
    })
    return {
      type: 'record',
      of: 'record',
      title: found.kind,
      fields: {
        kind: { type: 'text', value: found.kind },
        a: quantity(found.a, DIMENSIONLESS),
        b: quantity(found.b, DIMENSIONLESS),
      },
    }
  },
}

export const equilibrium: SheetFunction = {
  name: 'equilibrium',
  signature: 'equilibrium(m, P)',
  summary:
    'the states of equilibrium of a mechanism under the load P that are found, each stable or unstable',
  explain:
    'm: a mechanism; P: a load. Gives a list of records, nearest to the unloaded state first: each coordinate by its name, `stable` (true or false) and `stability` ("stable", "unstable" or "critical"). Searched within a quarter turn (for a coordinate with a size: 1.57 times the size) of the unloaded state, from a grid of starting points; what is found is listed, and a search does not prove that there is nothing else.',
  source: MECHANISM_SOURCE,
  group: 'question',
  call(args, context) {
    expectCount(args, 2, 2, context, this.signature)
    const model = modelOf(args[0] as Value, argumentAt(context, 0), 'the model')
    if (model.of !== 'mechanism') throw wrongModel(model, context, 'equilibrium', 'a mechanism')
    const { energy, fn } = asMechanism(model)
    const load = quantityOf(
      args[1] as Value,
      fn.loadDimension,
      argumentAt(context, 1),
      `the load \`${fn.loadName}\`,`,
      context,
    )
    const found = ask(context, () => equilibria(energy, load))
    if (!found.second.agrees) {
      throw new FormulaError(
        'cross-check-failed',
        `\`${context.source(context.formula)}\`: the stability of a state differs between the exact derivatives and the energy’s values`,
        'the state is too close to critical to decide; change the load slightly',
        context.formula.span,
      )
    }
    context.report({
      question: context.source(context.formula),
      route: `Newton’s method from ${found.starts} starting points; ${found.states.length} ${found.states.length === 1 ? 'state' : 'states'} found`,
      value: load,
      dimension: fn.loadDimension,
      status: 'converged',
      iterations: found.iterations,
      residual: found.residual,
      second: {
        route: found.second.route,
        value: load * (1 + found.second.residual),
        difference: found.second.residual,
        allowed: found.second.allowed,
      },
      ...(this.source ? { source: this.source } : {}),
    })
    return {
      type: 'list',
      items: found.states.map(({ q, stability }): Value => {
        const coordinates = fn.coordinates.map(
          ({ name, size }, i) => [name, quantity(q[i] as number, size.dimension)] as const,
        )
        const shown = coordinates.map(([name, value]) => `${name} = ${describeValue(value)}`).join(', ')
        return {
          type: 'record',
          of: 'record',
          title: `${shown}: ${stability}`,
          fields: {
            ...Object.fromEntries(coordinates),
            stable: { type: 'truth', value: stability === 'stable' },
            stability: { type: 'text', value: stability },
          },
        }
      }),
    }
  },
}
