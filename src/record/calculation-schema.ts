import { z } from 'zod'
import { CALCULATION_SCHEMA } from './calculation-json.ts'

const side = z.strictObject({ si: z.number(), shown: z.string() })
const place = { line: z.int().positive(), sheet: z.string().optional() }

/** The form of `check --json`. */
export const calculationSchema = z.strictObject({
  schema: z.literal(CALCULATION_SCHEMA),
  sheet: z.strictObject({
    id: z.string().optional(),
    title: z.string().optional(),
    revision: z.string().optional(),
    source: z.string(),
  }),
  verdict: z.enum(['pass', 'fail', 'error']),
  values: z.record(
    z.string(),
    z.object({
      kind: z.enum(['given', 'looked-up', 'derived', 'carried', 'bound', 'function', 'model']),
      si: z
        .union([z.number(), z.array(z.union([z.number(), z.array(z.number())]))])
        .optional()
        .describe('In coherent SI units: m, kg, s, N, Pa, rad = 1'),
      dimension: z.string().optional(),
      unit: z.string().optional(),
      shown: z.string().optional(),
      meaning: z.string().optional(),
      reference: z.string().optional(),
      ...place,
    }),
  ),
  checks: z.array(
    z.strictObject({
      title: z.string(),
      demand: side,
      relation: z.enum(['<=', '<']).describe('Between demand and capacity; holds when the verdict is pass'),
      capacity: side,
      utilisation: z.number().optional(),
      verdict: z.enum(['pass', 'fail']),
      reference: z.string().optional(),
      validity: z.boolean().optional().describe('A limit of use of a method'),
      ...place,
    }),
  ),
  findings: z.array(
    z.strictObject({
      rule: z.string(),
      severity: z.enum(['error', 'warning', 'note']),
      line: z.int().positive(),
      column: z.int().positive(),
      message: z.string(),
      hint: z.string(),
      file: z.string().optional().describe('When it is not the sheet itself'),
    }),
  ),
  solutions: z.array(
    z.object({
      question: z.string(),
      route: z.string(),
      si: z.number(),
      dimension: z.string(),
      status: z.string(),
      second: z
        .strictObject({ route: z.string(), value: z.number(), difference: z.number(), allowed: z.number() })
        .optional(),
      ...place,
    }),
  ),
  digest: z
    .string()
    .regex(/^sha256:[0-9a-f]{64}$/)
    .optional(),
})
