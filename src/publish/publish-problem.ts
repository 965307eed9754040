/** The rules of `verify/rules.ts` that tell of an output that could not be made. */
export type PublishRule = 'browser-missing' | 'browser-failed' | 'output-unwritable'

/**
 * An output that could not be made. `message` says what is there and what was expected (lower case, no full stop);
 * `hint` is one act to try; `cause` is the original error. The caller, who knows the sheet, makes the finding.
 */
export class PublishProblem extends Error {
  override readonly name = 'PublishProblem'

  constructor(
    readonly rule: PublishRule,
    message: string,
    readonly hint: string,
    cause?: unknown,
  ) {
    super(message, cause === undefined ? {} : { cause })
  }
}
