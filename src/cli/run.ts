import { Command as Program, CommanderError } from 'commander'
import { programVersion } from '../version.ts'
import { cleanText } from './clean-text.ts'
import { UsageError, type ExitStatus, type Io, type Options } from './command.ts'
import { COMMANDS } from './commands/index.ts'
import { usageProblem } from './usage-problem.ts'

/** Runs the command line. Never throws: what goes wrong is told on `io.err`, and the exit status says it. */
export async function run(argv: readonly string[], given: Io): Promise<ExitStatus> {
  // Whatever a message quotes, from a sheet or a file's name, it cannot write over the terminal.
  const io: Io = { ...given, err: (text) => given.err(cleanText(text)) }
  let status: ExitStatus = 0
  const program = programFor(io)
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
      const loaded = await command.load()
      status = await loaded.run(args, options, io)
    })
  }
  try {
    await program.parseAsync([...argv], { from: 'user' })
    return status
  } catch (error) {
    return told(error, argv, io)
  }
}

function programFor(io: Io): Program {
  return new Program('stanchion')
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
}

function told(error: unknown, argv: readonly string[], io: Io): ExitStatus {
  if (error instanceof CommanderError && error.exitCode === 0) return 0
  const [message, hint] = messageOf(error, argv)
  io.err(`stanchion: ${message}\nhint: ${hint}\n`)
  if (argv.includes('--debug') && error instanceof Error && error.stack) io.err(`${error.stack}\n`)
  return 2
}

function messageOf(error: unknown, argv: readonly string[]): readonly [message: string, hint: string] {
  if (error instanceof UsageError) return [error.message, error.hint]
  if (error instanceof CommanderError) return usageProblem(error, argv, COMMANDS)
  return [
    `the program failed: ${error instanceof Error ? error.message : String(error)}  internal-error`,
    'run again with `--debug`, and report what it prints',
  ]
}
