/** What the user can mend: exit code 2 and the message alone, never a stack trace. */

/** Bad input or usage. The message says what was given, what is allowed and what to do next. */
export class InputError extends Error {
  constructor(message: string) {
    super(message);
    this.name = "InputError";
  }
}

/** Runs `read`; a RangeError or TypeError of a room's own checks ("key: expected ..., found ...") becomes an InputError. */
export function asInput<T>(read: () => T): T {
  try {
    return read();
  } catch (error) {
    if (error instanceof RangeError || error instanceof TypeError) throw new InputError(error.message);
    throw error;
  }
}
