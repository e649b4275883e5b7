/** What went wrong, as the one sentence that a person at a terminal reads. */
export class CommandError extends Error {
  override readonly name = 'CommandError'

  constructor(
    message: string,
    /** 1: an input cannot be used. 2: the command was not understood. */
    readonly exitCode: 1 | 2 = 1,
  ) {
    super(message)
  }
}
