import type { CommanderError } from 'commander'
import { nearestName } from '../quantity/nearest-name.ts'
import type { Command } from './command.ts'

type Problem = readonly [message: string, hint: string]

/** Commander's complaint about a call in our words, with what was probably meant. */
export function usageProblem(
  error: CommanderError,
  argv: readonly string[],
  commands: readonly Command[],
): Problem {
  const name = argv.find((arg) => !arg.startsWith('-')) ?? ''
  const command = commands.find((known) => known.name === name)
  const help = command
    ? `\`stanchion ${name} --help\` lists its options`
    : '`stanchion --help` lists the commands'
  const call = command ? `call it as \`stanchion ${`${name} ${command.args}`.trim()}\`` : help
  const quoted = /'([^']+)'/.exec(error.message)?.[1] ?? ''
  switch (error.code) {
    case 'commander.help':
      return ['a command is needed', help]
    case 'commander.unknownCommand':
      return unknownCommand(name, commands)
    case 'commander.unknownOption': {
      const near = nearestName(quoted, optionsOf(command))
      return [`there is no option \`${quoted}\``, near ? `did you mean \`${near}\`?` : help]
    }
    case 'commander.optionMissingArgument':
      return [`the option \`${quoted}\` needs a value`, help]
    case 'commander.missingArgument':
      return [`\`${name}\` needs \`${command?.args ?? quoted}\``, call]
    case 'commander.excessArguments': {
      const [expected = '', given = ''] = error.message.match(/\d+/g) ?? []
      return [
        `\`${name}\` takes ${expected} argument${expected === '1' ? '' : 's'}, and ${given} are given`,
        call,
      ]
    }
    default:
      return [error.message.replace(/^error: /, '').replaceAll("'", '`'), call]
  }
}

function unknownCommand(name: string, commands: readonly Command[]): Problem {
  const near = nearestName(
    name,
    commands.map((known) => known.name),
  )
  const path = /\.(md|markdown)$/i.test(name) ? `; to calculate a sheet: \`stanchion check ${name}\`` : ''
  return [
    `there is no command \`${name}\``,
    near ? `did you mean \`${near}\`?` : `\`stanchion --help\` lists the commands${path}`,
  ]
}

/** The long options of a command; without one, those of the program. */
function optionsOf(command: Command | undefined): string[] {
  if (!command) return ['--help', '--version']
  return [...command.flags.flatMap(({ flags }) => flags.match(/--[a-z]+/g) ?? []), '--debug', '--help']
}
