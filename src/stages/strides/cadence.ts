import type { Steps } from '../../tables/schemas.js';

/** Intervals on either side of a step that its cadence is the median of: two strides, so that a limp averages out. */
const REACH = 2;

/**
 * Steps per second around each step: one over the median time between the events nearby in the same bout.
 *
 * @returns shape (steps), hertz; a bout of one step takes the length of the step itself.
 */
export function cadenceOf(steps: Steps): Float64Array {
  const n = steps.t_s.length;
  const out = new Float64Array(n);
  const nearby: number[] = [];
  for (let k = 0; k < n; k++) {
    nearby.length = 0;
    for (let i = Math.max(1, k - REACH + 1); i <= Math.min(n - 1, k + REACH); i++)
      if (steps.bout[i] === steps.bout[k] && steps.bout[i - 1] === steps.bout[k])
        nearby.push(steps.t_s[i]! - steps.t_s[i - 1]!);
    if (nearby.length === 0) nearby.push(steps.end_s[k]! - steps.start_s[k]!);
    nearby.sort((a, b) => a - b);
    const half = nearby.length >> 1;
    const period = nearby.length % 2 ? nearby[half]! : 0.5 * (nearby[half - 1]! + nearby[half]!);
    out[k] = 1 / period;
  }
  return out;
}
