import { InputError, InputErrors } from '../errors.js';

/** Gathers everything that is wrong with a folder, so that a user mends it in one go. */
export class Problems {
  readonly #lines = new Set<string>();

  /** One line: file and place, what is wrong, what would be right. */
  add(line: string): void {
    // A set: two readers may come upon the same fault of the same file.
    this.#lines.add(line);
  }

  /** Runs `read`; a mistake in the user's input becomes a problem and the result null. */
  attempt<T>(read: () => T): T | null {
    try {
      return read();
    } catch (error) {
      if (!(error instanceof InputError)) throw error;
      for (const line of error instanceof InputErrors ? error.problems : [error.message]) this.add(line);
      return null;
    }
  }

  get any(): boolean {
    return this.#lines.size > 0;
  }

  /** @throws InputErrors with the given code where there is any problem. */
  throwIfAny(code: string): void {
    if (this.any) throw new InputErrors(code, [...this.#lines]);
  }
}
