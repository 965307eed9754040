import { z } from 'zod'
import { calculationSchema } from '../record/calculation-schema.ts'
import type { Json } from '../record/stable-json.ts'
import { frontMatterSchema } from '../sheet/front-matter.ts'

interface Schema {
  readonly type?: string | readonly string[]
  readonly enum?: readonly (string | null)[]
  readonly pattern?: string
  readonly properties?: Readonly<Record<string, Schema>>
  readonly required?: readonly string[]
  readonly anyOf?: readonly Schema[]
  readonly items?: Schema
  readonly additionalProperties?: Schema | boolean
}

/** The published JSON Schemas (draft 2020-12), by name. */
export const JSON_SCHEMAS: Readonly<Record<'calculation' | 'front-matter', () => Json>> = {
  calculation: () =>
    titled('What stanchion check --json prints for one sheet', jsonSchema(calculationSchema)),
  'front-matter': () => titled('The front matter of a sheet', asWritten(jsonSchema(frontMatterSchema))),
}

/** What is given, not what reading makes of it. */
function jsonSchema(schema: z.ZodType): Schema {
  return z.toJSONSchema(schema, { io: 'input' }) as Schema
}

function titled(title: string, schema: Schema): Json {
  return { title, ...schema } as unknown as Json
}

/**
 * Front matter as editors read it. They see `revision: 2` as a number and `checker:` as nothing, which we read as text and as
 * a key that is not there, so both must be allowed.
 */
function asWritten(schema: Schema): Schema {
  const { type, properties, required = [], anyOf, items, additionalProperties } = schema
  const isFreeText = type === 'string' && !schema.enum && !schema.pattern
  const entries = Object.entries(properties ?? {}).map(([key, inner]): [string, Schema] => {
    const written = asWritten(inner)
    return [key, required.includes(key) ? written : orNothing(written)]
  })
  return {
    ...schema,
    ...(isFreeText ? { type: ['string', 'number'] } : {}),
    ...(properties ? { properties: Object.fromEntries(entries) } : {}),
    ...(anyOf ? { anyOf: anyOf.map(asWritten) } : {}),
    ...(items ? { items: asWritten(items) } : {}),
    ...(typeof additionalProperties === 'object'
      ? { additionalProperties: asWritten(additionalProperties) }
      : {}),
  }
}

function orNothing(schema: Schema): Schema {
  const { type, anyOf } = schema
  if (anyOf) return { ...schema, anyOf: [...anyOf, { type: 'null' }] }
  if (type === undefined) return schema
  const types = [...(typeof type === 'string' ? [type] : type), 'null']
  return { ...schema, type: types, ...(schema.enum ? { enum: [...schema.enum, null] } : {}) }
}
