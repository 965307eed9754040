import { z } from 'zod'
import { frontMatterSchema } from '../../sheet/front-matter.ts'
import { calculationSchema } from '../../record/calculation-schema.ts'
import { stableJson } from '../../record/stable-json.ts'
import { UsageError, type Command } from '../command.ts'

const SCHEMAS = {
  calculation: { schema: calculationSchema, title: 'What stanchion check --json prints for one sheet' },
  'front-matter': { schema: frontMatterSchema, title: 'The front matter of a sheet' },
} as const

export const schema: Command = {
  name: 'schema',
  args: '<name>',
  summary: 'print the JSON Schema of `front-matter` or of `calculation`',
  details:
    'Editors use the first to complete and check front matter; other programs use the second to read `check --json`.',
  flags: [],
  run([name = ''], _options, io) {
    if (!Object.hasOwn(SCHEMAS, name))
      throw new UsageError(
        `there is no schema \`${name}\``,
        `the schemas are ${Object.keys(SCHEMAS).join(', ')}`,
      )
    const { schema: chosen, title } = SCHEMAS[name as keyof typeof SCHEMAS]
    io.out(stableJson({ title, ...(z.toJSONSchema(chosen, { io: 'input' }) as object) }))
    return Promise.resolve(0)
  },
}
