import type { Code, Root } from 'mdast'

/** A place in the source text: 1-based line and column, 0-based offset, all in UTF-16 code units. */
export interface Point {
  readonly line: number
  readonly column: number
  readonly offset: number
}

/** A stretch of the source text; `end` is just after the last character. */
export interface Span {
  readonly start: Point
  readonly end: Point
}

/** A formula as written. It is parsed by the calculate stage; here it is only text with its place. */
export interface Expression {
  readonly text: string
  readonly span: Span
}

/** What may follow a statement: `# meaning [reference]` and `@hold "what is awaited"`. */
export interface Annotation {
  readonly meaning?: string
  readonly reference?: string
  readonly hold?: string
}

interface StatementBase extends Annotation {
  /** The whole statement as written, without its annotation. */
  readonly text: string
  readonly span: Span
}

/** `name = expression`, in `given`, `working` and `method` blocks. */
export interface Assignment extends StatementBase {
  readonly kind: 'assignment'
  readonly name: string
  readonly nameSpan: Span
  readonly expression: Expression
}

/** `name : kind` in a `given` block: an input that the using sheet must supply. */
export interface CallerInput extends StatementBase {
  readonly kind: 'caller-input'
  readonly name: string
  readonly nameSpan: Span
  /** The kind as written, for example `force`; see quantity/kinds.ts for the list. */
  readonly inputKind: string
  readonly inputKindSpan: Span
}

/** `f(x, P) = expression` in a `working` block. */
export interface FunctionDefinition extends StatementBase {
  readonly kind: 'function'
  readonly name: string
  readonly nameSpan: Span
  readonly parameters: readonly { readonly name: string; readonly span: Span }[]
  readonly expression: Expression
}

export type Relation = '<=' | '<' | '>=' | '>'

/** `left <= right` in a `check` block. */
export interface Acceptance extends StatementBase {
  readonly kind: 'acceptance'
  readonly left: Expression
  readonly relation: Relation
  readonly right: Expression
}

export type Statement = Assignment | CallerInput | FunctionDefinition | Acceptance

interface BlockBase {
  /** The whole fence, in the source. */
  readonly span: Span
  /** The fence's node in the Markdown tree; typeset replaces it. */
  readonly node: Code
  /** The heading the block stands under, if any. */
  readonly heading?: string
}

export interface GivenBlock extends BlockBase {
  readonly kind: 'given'
  readonly statements: readonly (Assignment | CallerInput)[]
}

export interface WorkingBlock extends BlockBase {
  readonly kind: 'working'
  readonly statements: readonly (Assignment | FunctionDefinition)[]
}

export interface CheckBlock extends BlockBase {
  readonly kind: 'check'
  /** A block opened with `check validity` states limits of use of a method. */
  readonly validity: boolean
  readonly statements: readonly Acceptance[]
}

/** `method ID as NAME` or `method ID as NAME brief`. */
export interface MethodBlock extends BlockBase {
  readonly kind: 'method'
  readonly id: string
  readonly idSpan: Span
  readonly as: string
  readonly asSpan: Span
  readonly brief: boolean
  readonly bindings: readonly Assignment[]
}

export type Block = GivenBlock | WorkingBlock | CheckBlock | MethodBlock

/** `:value[expression]` in prose, a table cell or a heading. The node in the tree has type `sheetValue` and this as `data`. */
export interface InlineValue {
  readonly expression: Expression
  readonly span: Span
  /** How many blocks stand before it: it sees the names that they define. */
  readonly blocksBefore: number
  /** The line of the heading it stands in, when it stands in one. */
  readonly inHeading: boolean
}

export interface Person {
  readonly name?: string | undefined
  readonly date?: string | undefined
}

/** A published check value of a method sheet: the bindings to give it and what it must then return. */
export interface PublishedCase {
  readonly title?: string | undefined
  /** Expressions with units, as in a `method` block's bindings. */
  readonly given: Readonly<Record<string, string | number>>
  /** Expressions with units for each name of the method. */
  readonly expected: Readonly<Record<string, string | number>>
  /** Relative when a number, or one entry a name. */
  readonly tolerance: number | Readonly<Record<string, number>>
  readonly source: string
  /** How the value is known: seen in print, computed, from memory. */
  readonly origin?: string | undefined
}

/** `metric`, `us`, or a map of kind to unit laid over `metric` (or over the profile named by its key `base`). */
export type UnitProfile = 'metric' | 'us' | Readonly<Record<string, string>>

/** The validated front matter. Every field but `sheet` and `title` may be left out while drafting. */
export interface FrontMatter {
  readonly sheet: string
  readonly title: string
  readonly project?: string | undefined
  readonly subject?: string | undefined
  readonly location?: string | undefined
  readonly contract?: string | undefined
  readonly revision?: string | undefined
  readonly units?: UnitProfile | undefined
  readonly paper?: 'A4' | 'Letter' | undefined
  readonly language?: string | undefined
  readonly originator?: Person | undefined
  readonly checker?: Person | undefined
  readonly approver?: Person | undefined
  readonly date?: string | undefined
  /** For a method sheet: the standard, its edition and clause, as printed under the method's title. */
  readonly source?: string | undefined
  readonly edition?: string | undefined
  readonly clause?: string | undefined
  /** What of the method is from memory or not verified against the printed standard; printed with it. */
  readonly unverified?: string | undefined
  /** For a method sheet: the names it is used for, the first being its main result. */
  readonly returns?: readonly string[] | undefined
  readonly published?: readonly PublishedCase[] | undefined
}

/** A sheet read and parsed: its Markdown tree, blocks and statements with their places. No values. */
export interface Sheet {
  /** The path as the user gave it (or `<standard input>`), used in messages; never absolute unless given so. */
  readonly path: string
  readonly text: string
  readonly meta: FrontMatter
  /** Where each front-matter key stands, for findings about it. */
  readonly metaPlaces: ReadonlyMap<string, Span>
  readonly tree: Root
  readonly blocks: readonly Block[]
  readonly inlineValues: readonly InlineValue[]
}
