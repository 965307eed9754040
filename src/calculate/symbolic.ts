/**
 * A formula of plain numbers in some variables, kept as a graph in which equal parts are one part. It exists to be
 * differentiated exactly, to any order, and to be run fast.
 */
export interface Term {
  readonly id: number
  readonly kind: 'constant' | 'variable' | 'sum' | 'product' | 'quotient' | 'power' | 'call'
  readonly value?: number
  readonly variable?: number
  readonly name?: SmoothFunction
  readonly args: readonly Term[]
}

export type SmoothFunction =
  | 'acos'
  | 'acosh'
  | 'asin'
  | 'asinh'
  | 'atan'
  | 'atanh'
  | 'cbrt'
  | 'cos'
  | 'cosh'
  | 'exp'
  | 'log'
  | 'log10'
  | 'sin'
  | 'sinh'
  | 'sqrt'
  | 'tan'
  | 'tanh'

type Derivative = (graph: Symbolic, x: Term, self: Term) => Term

interface Smooth {
  readonly value: (x: number) => number
  readonly derivative: Derivative
}

const c = (value: number) => (g: Symbolic) => g.constant(value)
const one = c(1)

/** Smooth functions of one variable with their derivatives (any table of derivatives). */
const FUNCTIONS: Readonly<Record<SmoothFunction, Smooth>> = {
  acos: {
    value: Math.acos,
    derivative: (g, x) =>
      g.negative(g.quotient(one(g), g.call('sqrt', g.difference(one(g), g.product(x, x))))),
  },
  acosh: {
    value: Math.acosh,
    derivative: (g, x) => g.quotient(one(g), g.call('sqrt', g.difference(g.product(x, x), one(g)))),
  },
  asin: {
    value: Math.asin,
    derivative: (g, x) => g.quotient(one(g), g.call('sqrt', g.difference(one(g), g.product(x, x)))),
  },
  asinh: {
    value: Math.asinh,
    derivative: (g, x) => g.quotient(one(g), g.call('sqrt', g.sum(g.product(x, x), one(g)))),
  },
  atan: { value: Math.atan, derivative: (g, x) => g.quotient(one(g), g.sum(one(g), g.product(x, x))) },
  atanh: {
    value: Math.atanh,
    derivative: (g, x) => g.quotient(one(g), g.difference(one(g), g.product(x, x))),
  },
  cbrt: {
    value: Math.cbrt,
    derivative: (g, _x, self) => g.quotient(one(g), g.product(c(3)(g), g.product(self, self))),
  },
  cos: { value: Math.cos, derivative: (g, x) => g.negative(g.call('sin', x)) },
  cosh: { value: Math.cosh, derivative: (g, x) => g.call('sinh', x) },
  exp: { value: Math.exp, derivative: (_g, _x, self) => self },
  log: { value: Math.log, derivative: (g, x) => g.quotient(one(g), x) },
  log10: { value: Math.log10, derivative: (g, x) => g.quotient(c(1 / Math.LN10)(g), x) },
  sin: { value: Math.sin, derivative: (g, x) => g.call('cos', x) },
  sinh: { value: Math.sinh, derivative: (g, x) => g.call('cosh', x) },
  sqrt: { value: Math.sqrt, derivative: (g, _x, self) => g.quotient(c(0.5)(g), self) },
  tan: { value: Math.tan, derivative: (g, _x, self) => g.sum(one(g), g.product(self, self)) },
  tanh: { value: Math.tanh, derivative: (g, _x, self) => g.difference(one(g), g.product(self, self)) },
}

export function isSmoothFunction(name: string): name is SmoothFunction {
  return Object.hasOwn(FUNCTIONS, name)
}

/** Builds, differentiates and compiles terms. Constants are folded, so that no 0·∞ is left behind by differentiation. */
export class Symbolic {
  private readonly terms = new Map<string, Term>()
  private readonly derivatives = new Map<string, Term>()

  constant(value: number): Term {
    return this.make('constant', [], { value: value + 0 })
  }

  variable(index: number): Term {
    return this.make('variable', [], { variable: index })
  }

  sum(a: Term, b: Term): Term {
    if (a.value !== undefined && b.value !== undefined) return this.constant(a.value + b.value)
    if (a.value === 0) return b
    if (b.value === 0) return a
    return this.make('sum', [a, b])
  }

  difference(a: Term, b: Term): Term {
    return this.sum(a, this.negative(b))
  }

  negative(a: Term): Term {
    return this.product(this.constant(-1), a)
  }

  product(a: Term, b: Term): Term {
    if (a.value !== undefined && b.value !== undefined) return this.constant(a.value * b.value)
    if (a.value === 0 || b.value === 0) return this.constant(0)
    if (a.value === 1) return b
    if (b.value === 1) return a
    return this.make('product', [a, b])
  }

  quotient(a: Term, b: Term): Term {
    if (a.value !== undefined && b.value !== undefined && b.value !== 0)
      return this.constant(a.value / b.value)
    if (a.value === 0 && b.value !== 0) return a
    if (b.value === 1) return a
    return this.make('quotient', [a, b])
  }

  power(a: Term, b: Term): Term {
    if (a.value !== undefined && b.value !== undefined) return this.constant(Math.pow(a.value, b.value))
    if (b.value === 0) return this.constant(1)
    if (b.value === 1) return a
    return this.make('power', [a, b])
  }

  call(name: SmoothFunction, a: Term): Term {
    return a.value === undefined
      ? this.make('call', [a], { name })
      : this.constant(FUNCTIONS[name].value(a.value))
  }

  /** The partial derivative by a variable. */
  derivative(term: Term, variable: number): Term {
    const key = `${term.id},${variable}`
    const known = this.derivatives.get(key)
    if (known) return known
    const result = this.differentiate(term, variable)
    this.derivatives.set(key, result)
    return result
  }

  private differentiate(term: Term, variable: number): Term {
    const by = (part: Term) => this.derivative(part, variable)
    const [a, b] = term.args as [Term, Term]
    switch (term.kind) {
      case 'constant':
        return this.constant(0)
      case 'variable':
        return this.constant(term.variable === variable ? 1 : 0)
      case 'sum':
        return this.sum(by(a), by(b))
      case 'product':
        return this.sum(this.product(by(a), b), this.product(a, by(b)))
      case 'quotient':
        return this.difference(this.quotient(by(a), b), this.quotient(this.product(term, by(b)), b))
      case 'power': {
        if (b.value !== undefined)
          return this.product(this.product(b, this.power(a, this.constant(b.value - 1))), by(a))
        const logarithmic = this.sum(
          this.product(by(b), this.call('log', a)),
          this.product(b, this.quotient(by(a), a)),
        )
        return this.product(term, logarithmic)
      }
      case 'call': {
        const smooth = FUNCTIONS[term.name as SmoothFunction]
        return this.product(smooth.derivative(this, a, term), by(a))
      }
    }
  }

  /** A function of the variables' values that gives the term's value. */
  compile(term: Term): (variables: ArrayLike<number>) => number {
    const order = inOrderOfUse(term)
    const place = new Map(order.map((part, i) => [part, i]))
    const values = new Float64Array(order.length)
    const steps = order.map((part, i) =>
      step(
        part,
        i,
        part.args.map((arg) => place.get(arg) as number),
        values,
      ),
    )
    return (variables) => {
      for (const run of steps) run(variables)
      return values[values.length - 1] as number
    }
  }

  private make(kind: Term['kind'], args: readonly Term[], more: Partial<Term> = {}): Term {
    const key = `${kind}|${args.map((arg) => arg.id).join()}|${Object.is(more.value, -0) ? 0 : (more.value ?? '')}|${more.variable ?? ''}|${more.name ?? ''}`
    const known = this.terms.get(key)
    if (known) return known
    const term: Term = { id: this.terms.size, kind, args, ...more }
    this.terms.set(key, term)
    return term
  }
}

/** All parts of a term, each after the parts it is made of. */
function inOrderOfUse(term: Term): Term[] {
  const order: Term[] = []
  const seen = new Set<Term>()
  const visit = (part: Term): void => {
    if (seen.has(part)) return
    seen.add(part)
    part.args.forEach(visit)
    order.push(part)
  }
  visit(term)
  return order
}

type Step = (variables: ArrayLike<number>) => void

function step(part: Term, i: number, args: readonly number[], v: Float64Array): Step {
  const [a, b] = args as [number, number]
  switch (part.kind) {
    case 'constant': {
      v[i] = part.value as number
      return () => undefined
    }
    case 'variable': {
      const index = part.variable as number
      return (variables) => void (v[i] = variables[index] as number)
    }
    case 'sum':
      return () => void (v[i] = (v[a] as number) + (v[b] as number))
    case 'product':
      return () => void (v[i] = (v[a] as number) * (v[b] as number))
    case 'quotient':
      return () => void (v[i] = (v[a] as number) / (v[b] as number))
    case 'power':
      return () => void (v[i] = Math.pow(v[a] as number, v[b] as number))
    case 'call': {
      const f = FUNCTIONS[part.name as SmoothFunction].value
      return () => void (v[i] = f(v[a] as number))
    }
  }
}
