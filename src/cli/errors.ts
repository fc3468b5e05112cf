/** Something the user can put right: one message, no stack. */
export class UsageError extends Error {
  override readonly name = 'UsageError';
  constructor(
    message: string,
    /** Where to read on, such as `polarwright polar --help`. */
    readonly help?: string,
  ) {
    super(message);
  }
}
