import type { Command } from '../command.ts'
import { check } from './check.ts'
import { explain } from './explain.ts'
import { methods } from './methods.ts'
import { newSheet } from './new.ts'
import { print } from './print.ts'
import { schema } from './schema.ts'
import { values } from './values.ts'

/** Every command, in the order of the help. */
export const COMMANDS: readonly Command[] = [print, check, values, newSheet, methods, explain, schema]
