/** What a command may use of the world; tests give their own. */
export interface Io {
  readonly cwd: string
  readonly env: Readonly<Record<string, string | undefined>>
  /** The product. */
  out(text: string): void
  /** Messages. */
  err(text: string): void
  /** Everything on standard input; rejects with the system's error when it cannot be read. */
  readStdin(): Promise<Uint8Array>
}

export interface Flag {
  /** As commander writes it: `-o, --output <dir>`. */
  readonly flags: string
  readonly summary: string
}

/** The options given, by the flag's long name. */
export type Options = Readonly<Record<string, string | boolean | undefined>>

/** 0: calculated and every check passes; 1: calculated, a check does not pass; 2: not calculated. */
export type ExitStatus = 0 | 1 | 2

export type Run = (args: readonly string[], options: Options, io: Io) => Promise<ExitStatus>

/** What is known of a command before it is loaded: its help and the README's table are made from it. */
export interface Command {
  readonly name: string
  /** The arguments as commander writes them: `<sheet...>`. */
  readonly args: string
  readonly summary: string
  /** A few sentences below the summary in the help. */
  readonly details: string
  readonly flags: readonly Flag[]
  /** Reads the program that the command needs; asked only when it is called. */
  load(): Promise<{ readonly run: Run }>
}

/** A mistake in how the command was called, or in its surroundings: told in one line with one act to try, exit status 2. */
export class UsageError extends Error {
  override readonly name = 'UsageError'
  readonly hint: string

  constructor(message: string, hint: string, cause?: unknown) {
    super(message, cause === undefined ? {} : { cause })
    this.hint = hint
  }
}
