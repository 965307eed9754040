import { z } from 'zod'
import { calculationSchema } from '../../record/calculation-schema.ts'
import { stableJson } from '../../record/stable-json.ts'
import { frontMatterSchema } from '../../sheet/front-matter.ts'
import { UsageError, type ExitStatus, type Io, type Options } from '../command.ts'

const SCHEMAS = {
  calculation: { schema: calculationSchema, title: 'What stanchion check --json prints for one sheet' },
  'front-matter': { schema: frontMatterSchema, title: 'The front matter of a sheet' },
} as const

export function run([name = '']: readonly string[], _options: Options, io: Io): Promise<ExitStatus> {
  if (!Object.hasOwn(SCHEMAS, name))
    throw new UsageError(
      `there is no schema \`${name}\``,
      `the schemas are ${Object.keys(SCHEMAS).join(', ')}`,
    )
  const { schema, title } = SCHEMAS[name as keyof typeof SCHEMAS]
  io.out(stableJson({ title, ...(z.toJSONSchema(schema, { io: 'input' }) as object) }))
  return Promise.resolve(0)
}
