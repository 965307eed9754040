import type { ExitStatus, Io } from '../../src/cli/command.ts'
import { run } from '../../src/cli/run.ts'

export interface Ran {
  readonly status: ExitStatus
  readonly out: string
  readonly err: string
}

/** Runs the command line in this process. */
export async function runCli(
  argv: readonly string[],
  cwd: string,
  stdin: string | Uint8Array | Error = '',
): Promise<Ran> {
  let out = ''
  let err = ''
  const io: Io = {
    cwd,
    env: {},
    out: (text) => void (out += text),
    err: (text) => void (err += text),
    readStdin: () =>
      stdin instanceof Error
        ? Promise.reject(stdin)
        : Promise.resolve(typeof stdin === 'string' ? new TextEncoder().encode(stdin) : stdin),
  }
  const status = await run(argv, io)
  return { status, out, err }
}
