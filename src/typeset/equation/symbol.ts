import { greekTex } from './greek.ts'

/** Trailing parts of a name that are marks over its letter. */
const ACCENTS: ReadonlyMap<string, { readonly narrow: string; readonly wide: string }> = new Map([
  ['bar', { narrow: '\\bar', wide: '\\overline' }],
  ['hat', { narrow: '\\hat', wide: '\\widehat' }],
])

interface Parts {
  readonly base: string
  readonly accents: readonly string[]
  readonly subscripts: readonly string[]
}

/** `lambda_bar_z` and `lambda_z_bar` are both λ with a bar and the subscript z; a mark elsewhere is a subscript like any other. */
function partsOf(name: string): Parts {
  const [base = '', ...rest] = name.split('_')
  const accents: string[] = []
  const isAccent = (part: string | undefined) => part !== undefined && (ACCENTS.has(part) || part === 'prime')
  while (isAccent(rest[0])) accents.push(rest.shift() as string)
  const last: string[] = []
  while (isAccent(rest.at(-1))) last.unshift(rest.pop() as string)
  return { base, accents: [...accents, ...last], subscripts: rest }
}

/**
 * A name of a sheet as a symbol in TeX: the first `_` starts the subscripts, Greek is spelled, `_bar`, `_hat` and `_prime`
 * are marks on the letter. One letter is italic, more are upright; subscripts are upright and parted by commas.
 */
export function symbolTex(name: string): string {
  return withSubscripts(name, '')
}

/**
 * A dotted path, such as `tube.A`: the symbol with its owner in italics as the last subscript, parted by a semicolon from
 * subscripts of its own. So `tube.A` differs from a name `A_tube`, whose subscript is upright.
 */
export function pathTex(path: readonly string[]): string {
  const owner = path.slice(0, -1).join('.')
  return ownedTex(path.at(-1) ?? '', owner)
}

/** The part `key` of what `owner` says, verbatim. */
export function ownedTex(key: string, owner: string): string {
  return withSubscripts(key, owner === '' ? '' : `\\textit{${owner.replaceAll('_', '\\_')}}`)
}

function withSubscripts(name: string, owner: string): string {
  const { base, accents, subscripts } = partsOf(name)
  const own = subscriptsTex(subscripts)
  const all = [own, owner].filter((part) => part !== '').join(';')
  const { marked, primes } = markedTex(baseTex(base), accents, isGlyph(base))
  return `${marked}${primes}${all === '' ? '' : `_{${all}}`}`
}

function markedTex(letter: string, accents: readonly string[], glyph: boolean) {
  let marked = letter
  let primes = ''
  for (const accent of accents) {
    const command = ACCENTS.get(accent)
    if (command === undefined) primes += "'"
    else marked = `${glyph ? command.narrow : command.wide}{${marked}}`
  }
  return { marked, primes }
}

function baseTex(base: string): string {
  return greekTex(base) ?? (base.length === 1 ? base : `\\mathrm{${base}}`)
}

/** Neighbouring parts in Latin letters share one upright group: `\mathrm{b,Rd}`. */
function subscriptsTex(parts: readonly string[]): string {
  const groups: string[] = []
  let upright: string[] = []
  const close = () => {
    const text = upright.join(',')
    if (upright.length > 0) groups.push(/^[\d,]+$/.test(text) ? text : `\\mathrm{${text}}`)
    upright = []
  }
  for (const part of parts) {
    const greek = greekTex(part)
    if (greek === undefined) upright.push(part === '' ? '\\_' : part)
    else {
      close()
      groups.push(greek)
    }
  }
  close()
  return groups.join(',')
}

/** Whether a symbol carries a prime, which leaves no room for a power without brackets. */
export function hasPrime(name: string): boolean {
  return partsOf(name).accents.includes('prime')
}

/** Whether a symbol's letter is one glyph, so that a thin space beside it reads as a product. */
export function isSingleGlyph(name: string): boolean {
  return isGlyph(partsOf(name).base)
}

function isGlyph(base: string): boolean {
  return base.length === 1 || greekTex(base) !== undefined
}

/** A name as spoken: `lambda_bar_z` is 'lambda bar sub z', `N_b_Rd` is 'N sub b Rd'. */
export function symbolWords(name: string): string {
  const { base, accents, subscripts } = partsOf(name)
  const marked = [base, ...accents].join(' ')
  const parts = subscripts.filter((part) => part !== '')
  return parts.length === 0 ? marked : `${marked} sub ${parts.join(' ')}`
}

/** A dotted path as spoken: `tube.A` is 'A of tube'. */
export function pathWords(path: readonly string[]): string {
  return [...path]
    .reverse()
    .map((name) => symbolWords(name))
    .join(' of ')
}
