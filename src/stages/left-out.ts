import { InputError } from '../errors.js';

/**
 * Thrown by a stage that has nothing to work on, such as a heading without a gyroscope: the stage and
 * all that need its table are left out with this reason, and the walk is no failure.
 */
export class LeftOut extends InputError {
  /** @param reason - why, in plain words, e.g. `the log has no gyroscope`. */
  constructor(reason: string) {
    super('left-out', reason);
    this.name = 'LeftOut';
  }
}
