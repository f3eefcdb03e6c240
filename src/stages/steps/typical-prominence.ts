import type { PeakCandidates } from './peak-candidates.js';

const WINDOW_S = 5;

/** A walker may slow down to this share of the log's usual prominence without the steps looking odd. */
const LEAST_SHARE = 0.25;

/**
 * Prominence that a step would have around each candidate: the median of the peaks within five seconds, each
 * weighted by its own prominence so that the many small ones between steps count little; nowhere less than a quarter
 * of the whole log's.
 *
 * @returns m/s2, shape (count).
 */
export function typicalProminence({ count, at, prominence, rateHz }: PeakCandidates): Float64Array {
  const least = LEAST_SHARE * selfWeightedMedian(prominence);
  const out = new Float64Array(count);
  const reach = WINDOW_S * rateHz;
  for (let i = 0, low = 0, high = 0; i < count; i++) {
    while (at[i]! - at[low]! > reach) low++;
    while (high < count && at[high]! - at[i]! <= reach) high++;
    out[i] = Math.max(selfWeightedMedian(prominence.subarray(low, high)), least);
  }
  return out;
}

/** The value at which half of the sum of all values is reached; 0 of none. */
function selfWeightedMedian(values: Float64Array): number {
  const sorted = values.slice().sort();
  let left = 0;
  for (const value of sorted) left += value;
  left /= 2;
  for (const value of sorted) {
    left -= value;
    if (left <= 0) return value;
  }
  return 0;
}
