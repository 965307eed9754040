import { Command as Program, CommanderError } from 'commander'
import { nearestName } from '../quantity/nearest-name.ts'
import { programVersion } from '../version.ts'
import { cleanText } from './clean-text.ts'
import { UsageError, type ExitStatus, type Io, type Options } from './command.ts'
import { COMMANDS } from './commands/index.ts'

/** Runs the command line. Never throws: what goes wrong is told on `io.err`, and the exit status says it. */
export async function run(argv: readonly string[], io: Io): Promise<ExitStatus> {
  let status: ExitStatus = 0
  const program = new Program('stanchion')
    .description(
      'Calculates Markdown sheets with units and stability methods and prints checked calculation documents.',
    )
    .version(programVersion(), '-V, --version', 'print the version')
    .helpOption('-h, --help', 'print this help')
    .helpCommand(false)
    .exitOverride()
    .showSuggestionAfterError(false)
    .configureOutput({
      writeOut: (text) => io.out(text),
      writeErr: () => undefined,
      outputError: () => undefined,
    })
    .addHelpText(
      'after',
      '\nExit status: 0 every check passes, 1 a check does not pass, 2 not calculated.\nThe program is an aid: local codes and the licensed engineer’s judgement govern.',
    )
  for (const command of COMMANDS) {
    const sub = program
      .command(`${command.name} ${command.args}`.trim())
      .summary(command.summary)
      .description(`${command.summary}\n\n${command.details}`)
    for (const { flags, summary } of command.flags) sub.option(flags, summary)
    sub.option('--debug', 'show where in the program an error arose')
    sub.action(async (...received: unknown[]) => {
      const options = received.at(-2) as Options
      const args = received
        .slice(0, -2)
        .flat()
        .filter((arg): arg is string => typeof arg === 'string')
      status = await command.run(args, options, io)
    })
  }
  try {
    await program.parseAsync([...argv], { from: 'user' })
    return status
  } catch (error) {
    return told(error, argv, io)
  }
}

function told(error: unknown, argv: readonly string[], io: Io): ExitStatus {
  if (error instanceof CommanderError && error.exitCode === 0) return 0
  const debug = argv.includes('--debug')
  const say = (message: string, hint: string): ExitStatus => {
    io.err(cleanText(`stanchion: ${message}\nhint: ${hint}\n`))
    if (debug && error instanceof Error && error.stack) io.err(`${error.stack}\n`)
    return 2
  }
  if (error instanceof UsageError) return say(error.message, error.hint)
  if (error instanceof CommanderError) return say(...usage(error, argv))
  return say(
    `the program failed: ${error instanceof Error ? error.message : String(error)}`,
    'run again with `--debug`, and report what it prints',
  )
}

/** Commander's complaint in our words, with what was probably meant. */
function usage(error: CommanderError, argv: readonly string[]): [message: string, hint: string] {
  const [name = ''] = argv
  const command = COMMANDS.find((known) => known.name === name)
  if (error.code === 'commander.help') return ['a command is needed', '`stanchion --help` lists the commands']
  if (error.code === 'commander.unknownCommand') {
    const near = nearestName(
      name,
      COMMANDS.map((known) => known.name),
    )
    const path = name.endsWith('.md') ? `, as in \`stanchion check ${name}\`` : ''
    return [
      `there is no command \`${name}\``,
      near ? `did you mean \`${near}\`?` : `\`stanchion --help\` lists the commands${path}`,
    ]
  }
  if (error.code === 'commander.unknownOption') {
    const flag = /'([^']+)'/.exec(error.message)?.[1] ?? ''
    const flags = [
      ...(command?.flags ?? []).flatMap((known) => known.flags.match(/--[a-z]+/g) ?? []),
      '--debug',
      '--help',
    ]
    const near = nearestName(flag, flags)
    return [
      `there is no option \`${flag}\``,
      near ? `did you mean \`${near}\`?` : `\`stanchion ${name} --help\` lists the options`,
    ]
  }
  const message = error.message.replace(/^error: /, '')
  return [
    message.replaceAll("'", '`'),
    command
      ? `call it as \`stanchion ${command.name} ${command.args}\``
      : '`stanchion --help` lists the commands',
  ]
}
