import { COMMANDS } from './commands/index.ts'

/** The command table of the README, from the records of the commands. */
export function readmeCommands(): string {
  const rows = COMMANDS.map(({ name, args, summary, flags }) => {
    const options = flags.map((flag) => `\`${flag.flags}\` ${flag.summary}`).join('; ')
    return `| \`${`${name} ${args}`.trim()}\` | ${summary}${options ? `. ${options}` : ''} |`
  })
  return `| command | does |\n|---|---|\n${rows.join('\n')}\n`
}
