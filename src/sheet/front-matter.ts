import { isMap, isScalar, isSeq, LineCounter, parseDocument, type Node } from 'yaml'
import { z } from 'zod'
import { nearestName } from '../quantity/nearest-name.ts'
import type { Problem } from './statement.ts'
import type { Places } from './places.ts'
import type { FrontMatter, Span } from './types.ts'

const text = z.string().trim().min(1, 'is empty')
/** A calendar date as ISO 8601 writes it, so that it sorts and is read alike everywhere. */
const date = z.iso.date('is not a date such as 2026-03-02')

/** A name alone, or a name and a date. */
const person = z.union([
  text.transform((name) => ({ name })),
  z.strictObject({
    name: text.optional().describe('Name as it is to be printed'),
    date: date.optional().describe('ISO 8601 date'),
  }),
])

const quantityText = z
  .union([z.string().trim().min(1), z.number()])
  .describe('An expression with its unit, for example "285 kN"')

const publishedCase = z.strictObject({
  title: text.optional(),
  given: z.record(z.string(), quantityText).describe('Value of each input'),
  expected: z.record(z.string(), quantityText).describe('Value that each name must then have'),
  tolerance: z
    .union([z.coerce.number().positive(), z.record(z.string(), z.coerce.number().positive())])
    .describe('Relative; one number, or one for each name'),
  source: text.describe('Publication, with table, example or page'),
  origin: text.optional().describe('How the value is known: printed in the source, computed, from memory'),
})

/** The front matter of a sheet. Its JSON Schema is printed by `stanchion schema front-matter`. */
export const frontMatterSchema = z.strictObject({
  sheet: text.describe('Number of the sheet, for example TW-014'),
  title: text.describe('What is calculated'),
  project: text.optional(),
  subject: text.optional(),
  location: text.optional(),
  contract: text.optional().describe('Contract or route number'),
  revision: text.optional(),
  units: z
    .union([z.enum(['metric', 'us']), z.record(z.string(), text)])
    .optional()
    .describe('Unit profile: metric, us, or a map of kind to unit'),
  paper: z.enum(['A4', 'Letter']).optional(),
  language: z
    .string()
    .regex(/^[A-Za-z]{2,3}(-[A-Za-z0-9]{2,8})*$/, 'is not a language tag such as en or en-GB')
    .optional(),
  originator: person.optional(),
  checker: person.optional(),
  approver: person.optional(),
  date: date.optional(),
  source: text.optional().describe('For a method: the publication it follows'),
  edition: text.optional(),
  clause: text.optional(),
  unverified: text
    .optional()
    .describe('For a method: what of it is from memory or not verified against the printed standard'),
  returns: z.array(text).optional().describe('For a method: the names it is used for'),
  published: z.array(publishedCase).optional().describe('For a method: published check values'),
})

/** Nodes that a front matter may hold; more is a mistake or an attack. */
const MAX_LENGTH = 200_000

export interface ReadFrontMatter {
  readonly meta?: FrontMatter
  readonly places: ReadonlyMap<string, Span>
  readonly problems: readonly Problem[]
}

/**
 * Reads and validates the YAML between the two lines of `---`. All scalars are taken as text (`revision: 1.10` stays
 * `1.10`); aliases are refused.
 *
 * @param start offset of the YAML text in the source
 */
export function readFrontMatter(yamlText: string, start: number, places: Places): ReadFrontMatter {
  if (yamlText.length > MAX_LENGTH) {
    const span = places.span(start, start)
    return failed([
      problem(
        `the front matter is longer than ${MAX_LENGTH} characters`,
        'keep it to the sheet’s identity',
        span,
      ),
    ])
  }
  const lines = new LineCounter()
  const document = parseDocument(yamlText, {
    schema: 'failsafe',
    lineCounter: lines,
    uniqueKeys: true,
    prettyErrors: false,
  })
  const at = (range: readonly number[] | null | undefined): Span =>
    places.span(start + (range?.[0] ?? 0), start + Math.min(range?.[1] ?? yamlText.length, yamlText.length))
  if (document.errors.length > 0) {
    return failed(
      document.errors.map((error) =>
        problem(
          `the YAML cannot be read: ${lowerFirst(error.message)}`,
          'write one `key: value` a line, with two spaces for each level',
          at(error.pos),
        ),
      ),
    )
  }
  const contents: unknown = document.contents
  if (!isMap(contents)) {
    return failed([
      problem('the front matter holds no keys', 'write at least `sheet: …` and `title: …`', at(undefined)),
    ])
  }
  const keys = new Map<string, Span>()
  for (const pair of contents.items) {
    if (isScalar(pair.key)) keys.set(String(pair.key.value), at(pair.key.range))
  }
  let plain: unknown
  try {
    plain = document.toJS({ maxAliasCount: 0 })
  } catch (cause) {
    return failed([
      { ...problem('the front matter uses an alias (`*name`)', 'write the value out', at(undefined)), cause },
    ])
  }
  const checked = frontMatterSchema.safeParse(withoutEmpty(plain))
  if (checked.success) return { meta: checked.data, places: keys, problems: [] }
  const problems = checked.error.issues.flatMap((issue) => {
    const node = nodeAt(contents, issue.path)
    const span = at(node?.range)
    const where = issue.path.join('.')
    if (issue.code === 'unrecognized_keys') {
      return issue.keys.map((key) =>
        problem(
          `\`${where === '' ? key : `${where}.${key}`}\` is not a key of the front matter`,
          hintForKey(where, key),
          keyPlace(node ?? contents, key, at) ?? span,
        ),
      )
    }
    if (node === undefined && issue.code === 'invalid_type') {
      return [
        problem(
          `the front matter lacks \`${where}\``,
          `write \`${where}: …\` between the lines of \`---\``,
          places.span(start, start),
        ),
      ]
    }
    return [
      problem(
        `\`${where}\` ${describeIssue(issue)}`,
        'see `stanchion schema front-matter` for what each key takes',
        span,
      ),
    ]
  })
  return { problems, places: keys }
}

const KIND_OF: Readonly<Record<string, string>> = {
  string: 'is not a text',
  object: 'is not a group of entries `{key: value}`',
  array: 'is not a list `[a, b]`',
  record: 'is not a group of entries `{key: value}`',
  number: 'is not a number',
}

const PERSON = '{name: A. Example, date: 2026-03-02}'

function hintForKey(where: string, key: string): string {
  if (where !== '')
    return where.includes('published') ? 'see `stanchion schema front-matter`' : `write it as \`${PERSON}\``
  const keys = Object.keys(frontMatterSchema.shape)
  const near = nearestName(key, keys)
  return near ? `did you mean \`${near}\`?` : `the keys are ${keys.join(', ')}`
}

function describeIssue(issue: z.core.$ZodIssue): string {
  if (issue.code === 'invalid_value') return `is not one of ${issue.values.map(String).join(', ')}`
  if (issue.code === 'invalid_type') return KIND_OF[issue.expected] ?? `is not of the kind ${issue.expected}`
  if (issue.code === 'invalid_union') return 'does not have one of the forms it may have'
  return issue.message
}

/** A key without a value (`checker:`) is a blank to be filled in, as if it were not there. */
function withoutEmpty(value: unknown): unknown {
  if (Array.isArray(value)) return value.map(withoutEmpty)
  if (value === null || typeof value !== 'object') return value
  const entries = Object.entries(value).filter(([, v]) => v !== '' && v !== null)
  return Object.fromEntries(entries.map(([key, v]) => [key, withoutEmpty(v)]))
}

function nodeAt(map: Node, path: readonly PropertyKey[]): Node | undefined {
  let node: unknown = map
  for (const step of path) {
    if (isMap(node)) node = node.get(String(step), true)
    else if (isSeq(node)) node = node.get(Number(step), true)
    else return undefined
  }
  return (node as Node | undefined) ?? undefined
}

function keyPlace(
  node: Node,
  key: string,
  at: (range: readonly number[] | null | undefined) => Span,
): Span | undefined {
  if (!isMap(node)) return undefined
  const pair = node.items.find((item) => isScalar(item.key) && item.key.value === key)
  return pair && isScalar(pair.key) ? at(pair.key.range) : undefined
}

function problem(message: string, hint: string, span: Span): Problem {
  return { rule: 'bad-front-matter', message, hint, span }
}

function failed(problems: readonly Problem[]): ReadFrontMatter {
  return { problems, places: new Map() }
}

function lowerFirst(message: string): string {
  return message.charAt(0).toLowerCase() + message.slice(1)
}
