import type { StartContext } from '../../campaign/context.js';
import { circularMean, wrapToPi } from '../../stats/circular.js';
import type { Steps } from '../../tables/schemas.js';

/** What a given start heading tells of the offset. */
export interface StartOffset {
  /** Walking direction minus the device's, rad. */
  offsetRad: number;
  /** The steps it was told by: [from, to). */
  from: number;
  to: number;
}

/**
 * Offset that brings the first steps after the start to the given heading.
 *
 * @param direction - the device's over each step, rad.
 * @param startSteps - how many steps are set to the heading.
 * @returns null where no heading is given or no step follows.
 */
export function startOffset(
  direction: Float64Array,
  steps: Steps,
  start: StartContext | null,
  startSteps: number,
): StartOffset | null {
  if (!start || start.heading_rad === null) return null;
  let from = 0;
  if (start.t_s !== null) while (from < direction.length && steps.t_s[from]! < start.t_s) from++;
  const to = Math.min(direction.length, from + startSteps);
  if (to === from) return null;
  const mean = circularMean(direction.subarray(from, to)).directionRad;
  return mean === null ? null : { offsetRad: wrapToPi(start.heading_rad - mean), from, to };
}
