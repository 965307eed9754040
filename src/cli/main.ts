import type { Io } from './command.ts'
import { run } from './run.ts'

const io: Io = {
  cwd: process.cwd(),
  env: process.env,
  out: (text) => void process.stdout.write(text),
  err: (text) => void process.stderr.write(text),
  async readStdin() {
    const chunks: Buffer[] = []
    for await (const chunk of process.stdin) chunks.push(chunk as Buffer)
    return Buffer.concat(chunks)
  },
}

let lost = false

/**
 * The reader of a pipe may close it early (`| head`): that is no error, and what is left to do is done without it. Anything
 * else, such as a full disk, means that the product is not whole.
 */
function onWriteError(error: NodeJS.ErrnoException): void {
  if (error.code === 'EPIPE' || lost) return
  lost = true
  process.exitCode = 2
  io.err(
    `stanchion: standard output cannot be written (${error.code ?? error.message})\nhint: check where it is sent and the space there\n`,
  )
}

process.stdout.on('error', onWriteError)
process.stderr.on('error', onWriteError)

const status = await run(process.argv.slice(2), io)
process.exitCode = lost ? 2 : status
