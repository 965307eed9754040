import { stableJson } from '../../record/stable-json.ts'
import { UsageError, type ExitStatus, type Io, type Options } from '../command.ts'
import { JSON_SCHEMAS } from '../json-schemas.ts'

export function run([name = '']: readonly string[], _options: Options, io: Io): Promise<ExitStatus> {
  if (!Object.hasOwn(JSON_SCHEMAS, name))
    throw new UsageError(
      `there is no schema \`${name}\``,
      `the schemas are ${Object.keys(JSON_SCHEMAS).join(', ')}`,
    )
  io.out(stableJson(JSON_SCHEMAS[name as keyof typeof JSON_SCHEMAS]()))
  return Promise.resolve(0)
}
