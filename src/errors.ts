/**
 * A mistake in what the user gave: a file, a row, a key, a flag.
 *
 * The message is one line: where, what must hold (with its unit), what was found, what to do.
 * The code is stable and may be tested against; the wording is not.
 */
export class InputError extends Error {
  readonly code: string;

  constructor(code: string, message: string, options?: ErrorOptions) {
    super(message, options);
    this.name = 'InputError';
    this.code = code;
  }
}

/**
 * Several mistakes found in one pass, so that a user mends a campaign in one go.
 * `message` is the problems joined by line breaks; `problems` holds one line each.
 */
export class InputErrors extends InputError {
  readonly problems: readonly string[];

  constructor(code: string, problems: readonly string[]) {
    super(code, problems.join('\n'));
    this.name = 'InputErrors';
    this.problems = problems;
  }
}

/** The message of anything thrown, without a stack. */
export function messageOf(error: unknown): string {
  return error instanceof Error ? error.message : String(error);
}
