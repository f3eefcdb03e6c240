import { wrapToPi } from '../../stats/circular.js';
import { median } from '../../stats/quantile.js';

/** Steps on either side that tell the sway: three strides. */
const REACH = 6;

/**
 * Directions of steps without the part that alternates from step to step: pelvis, arm and thigh turn to and fro once a
 * stride, and the walker does not. Turns, which do not alternate, stay as they are.
 *
 * @param direction - shape (n), rad, within one spell of walking.
 * @returns shape (n), rad.
 */
export function withoutSway(direction: Float64Array): Float64Array {
  const n = direction.length;
  if (n < 5) return direction.slice();
  const alternating = new Float64Array(n);
  for (let k = 1; k < n - 1; k++) {
    const before = wrapToPi(direction[k - 1]! - direction[k]!);
    const after = wrapToPi(direction[k + 1]! - direction[k]!);
    alternating[k] = ((k % 2 ? 1 : -1) * (before + after)) / 4;
  }
  return direction.map((value, k) => {
    const near = alternating.subarray(Math.max(1, k - REACH), Math.min(n - 1, k + REACH + 1));
    return wrapToPi(value + (k % 2 ? 1 : -1) * median(near));
  });
}
