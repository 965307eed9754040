import { DIMENSIONLESS } from '../quantity/dimension.ts'
import type { Span } from '../sheet/types.ts'
import {
  add,
  compare,
  divide,
  isNumeric,
  multiply,
  negate,
  power,
  same,
  subtract,
  type Outcome,
} from './arithmetic.ts'
import { describeKind, describeValue, quantity } from './describe.ts'
import { FormulaError } from './formula-error.ts'
import { inOrder } from './in-order.ts'
import { itemOf, listOf } from './list-value.ts'
import { required } from './required.ts'
import { scopeOfFunction, type Node, type Scope } from './scope.ts'
import { findFunction, nearestFunction } from './functions/index.ts'
import type { BinaryOperator, Formula, FunctionValue, Value } from './types.ts'

/** Sheet functions may call each other this deep; a sheet cannot define a recursion, so this only guards the stack. */
const MAX_CALLS = 200

/**
 * Calculates a formula. Arithmetic is mathjs's, on quantities in SI base units; every operation first checks dimension and
 * kind, so that a mistake is found at its own place.
 *
 * @throws FormulaError at the operation that has no result
 */
export function evaluate(formula: Formula, scope: Scope, calls = 0): Value {
  if (--scope.budget.left < 0) {
    throw new FormulaError(
      'limit-exceeded',
      'the sheet needs more operations than are allowed',
      'functions that call each other many times multiply the work; name intermediate results',
      formula.span,
    )
  }
  const inner = (part: Formula) => evaluate(part, scope, calls)
  switch (formula.type) {
    case 'number':
      return quantity(formula.value, DIMENSIONLESS)
    case 'quantity':
      return quantity(formula.si, formula.dimension)
    case 'constant':
      return quantity(Math.PI, DIMENSIONLESS)
    case 'text':
      return { type: 'text', value: formula.value }
    case 'truth':
      return { type: 'truth', value: formula.value }
    case 'name':
      return evaluatePath(formula, scope)
    case 'field':
      return fieldOf(inner(formula.of), formula.key, formula.span, scope.source(formula.of.span))
    case 'group':
      return inner(formula.body)
    case 'unary':
      return evaluateUnary(formula, inner, scope)
    case 'binary':
      return evaluateBinary(formula, inner, scope)
    case 'relation':
      return evaluateRelation(formula, inner, scope)
    case 'case': {
      const taken = truthOf(inner(formula.condition), formula.condition, scope)
      scope.onBranch?.(formula, taken)
      return inner(taken ? formula.then : formula.otherwise)
    }
    case 'list':
      return listOf(formula, formula.items.map(inner), scope)
    case 'record':
      return {
        type: 'record',
        of: 'record',
        title: 'record',
        fields: Object.fromEntries(formula.fields.map(({ key, value }) => [key, inner(value)])),
      }
    case 'item':
      return itemOf(formula, inner(formula.of), formula.indices.map(inner), scope)
    case 'call':
      return evaluateCall(formula, scope, calls)
  }
}

function evaluatePath(formula: Node<'name'>, scope: Scope): Value {
  const [first, ...keys] = formula.path as [string, ...string[]]
  let value = scope.lookup(first, formula.span)
  let path = first
  for (const key of keys) {
    value = fieldOf(value, key, formula.span, path)
    path = `${path}.${key}`
  }
  return value
}

function fieldOf(value: Value, key: string, span: Span, owner: string): Value {
  if (value.type !== 'record') {
    throw new FormulaError(
      'undefined-name',
      `\`${owner}\` is ${describeKind(value)} and has no \`${key}\``,
      'only sections, materials, used sheets and records have parts',
      span,
    )
  }
  if (Object.hasOwn(value.fields, key)) return value.fields[key] as Value
  const names = Object.keys(value.fields)
  const listed =
    names.length > 0
      ? `it has ${names.slice(0, 30).join(', ')}${names.length > 30 ? ' …' : ''}`
      : 'it has no parts'
  const what = value.of === 'record' ? `\`${owner}\`` : `the ${value.of} ${value.title} (\`${owner}\`)`
  throw new FormulaError('undefined-name', `${what} has no \`${key}\``, listed, span)
}

function truthOf(value: Value, formula: Formula, scope: Scope): boolean {
  if (value.type === 'truth') return value.value
  throw new FormulaError(
    'unit-mismatch',
    `\`${scope.source(formula.span)}\` is ${describeKind(value)}, and a condition is true or false`,
    'compare it with something, as in `a <= b`',
    formula.span,
  )
}

function evaluateUnary(formula: Node<'unary'>, inner: (part: Formula) => Value, scope: Scope): Value {
  const value = inner(formula.body)
  if (formula.operator === 'not') return { type: 'truth', value: !truthOf(value, formula.body, scope) }
  if (!isNumeric(value)) {
    throw new FormulaError(
      'unit-mismatch',
      `\`${scope.source(formula.body.span)}\` is ${describeKind(value)} and has no sign`,
      'use a number or a quantity',
      formula.body.span,
    )
  }
  return formula.operator === '+' ? value : required(negate(value), formula, [formula.body], [value], scope)
}

const ARITHMETIC: Readonly<Partial<Record<BinaryOperator, (a: Value, b: Value) => Outcome<Value>>>> = {
  '+': add,
  '-': subtract,
  '*': multiply,
  '/': divide,
  '^': power,
}

function evaluateBinary(formula: Node<'binary'>, inner: (part: Formula) => Value, scope: Scope): Value {
  const { operator, left, right } = formula
  if (operator === 'and' || operator === 'or') {
    const first = truthOf(inner(left), left, scope)
    if (first === (operator === 'or')) return { type: 'truth', value: first }
    return { type: 'truth', value: truthOf(inner(right), right, scope) }
  }
  const a = inner(left)
  const b = inner(right)
  const operation = ARITHMETIC[operator] as (a: Value, b: Value) => Outcome<Value>
  return required(operation(a, b), formula, [left, right], [a, b], scope)
}

function evaluateRelation(formula: Node<'relation'>, inner: (part: Formula) => Value, scope: Scope): Value {
  const values = formula.operands.map(inner)
  let holds = true
  formula.operators.forEach((operator, i) => {
    const pair: [Formula, Formula] = [formula.operands[i] as Formula, formula.operands[i + 1] as Formula]
    const [a, b] = [values[i] as Value, values[i + 1] as Value]
    const sides = { ...formula, operatorSpan: { start: pair[0].span.end, end: pair[1].span.start } }
    if (operator === '==' || operator === '!=') {
      const { same: equal } = required(same(a, b), sides, pair, [a, b], scope, 'compare')
      holds &&= equal === (operator === '==')
    } else {
      const { order } = required(compare(a, b), sides, pair, [a, b], scope, 'compare')
      holds &&= inOrder(order, operator)
    }
  })
  return { type: 'truth', value: holds }
}

function evaluateCall(formula: Node<'call'>, scope: Scope, calls: number): Value {
  const { name, args, span } = formula
  const builtIn = findFunction(name)
  const nameSpan: Span = {
    start: span.start,
    end: { ...span.start, column: span.start.column + name.length, offset: span.start.offset + name.length },
  }
  if (builtIn) {
    return builtIn.call(
      args.map((arg) => evaluate(arg, scope, calls)),
      {
        formula,
        source: (part) => scope.source(part.span),
        budget: scope.budget,
        report: (report) => scope.onReport?.(report),
        apply: (fn, values) => applyFunction(fn, values, scope, calls + 1),
      },
    )
  }
  let value: Value
  try {
    value = scope.lookup(name, nameSpan)
  } catch (cause) {
    if (cause instanceof FormulaError && cause.rule === 'undefined-name') {
      const near = nearestFunction(name)
      throw new FormulaError(
        'undefined-name',
        `there is no function \`${name}\``,
        near ? `did you mean \`${near}\`?` : '`stanchion explain functions` lists the functions',
        nameSpan,
        cause,
      )
    }
    throw cause
  }
  if (value.type !== 'function') {
    throw new FormulaError(
      'bad-expression',
      `\`${name}\` is ${describeKind(value)}, not a function`,
      `write \`${name}*(…)\` for a product`,
      nameSpan,
    )
  }
  if (args.length !== value.parameters.length) {
    const expected = `${name}(${value.parameters.join(', ')})`
    throw new FormulaError(
      'function-misused',
      `\`${expected}\` is called with ${args.length} argument${args.length === 1 ? '' : 's'}`,
      `call it as \`${expected}\``,
      span,
    )
  }
  const values = args.map((arg) => evaluate(arg, scope, calls))
  try {
    return applyFunction(value, values, scope, calls + 1)
  } catch (cause) {
    if (!(cause instanceof FormulaError) || cause.rule === 'limit-exceeded') throw cause
    const inputs = value.parameters.map(
      (parameter, i) => `${parameter} = ${describeValue(values[i] as Value)}`,
    )
    throw new FormulaError(
      cause.rule,
      `in \`${name}\` with ${inputs.join(', ')}: ${cause.message}`,
      cause.hint,
      span,
      cause,
    )
  }
}

/** Calculates a function of the sheet for given arguments. Its names have the values they had where it was defined. */
export function applyFunction(fn: FunctionValue, args: readonly Value[], scope: Scope, calls = 0): Value {
  if (calls > MAX_CALLS) {
    throw new FormulaError(
      'limit-exceeded',
      `functions call each other more than ${MAX_CALLS} deep`,
      'use fewer levels',
      fn.body.span,
    )
  }
  return evaluate(fn.body, scopeOfFunction(fn, args, scope), calls)
}
