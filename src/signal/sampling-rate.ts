/**
 * Sampling rate of a log by the median time between readings, which gaps, duplicates and bursts do not move.
 *
 * @param t - shape (n), seconds, ascending.
 * @returns hertz; NaN with fewer than two different times.
 */
export function medianRateHz(t: Float64Array): number {
  const steps = new Float64Array(Math.max(0, t.length - 1));
  let count = 0;
  for (let i = 1; i < t.length; i++) {
    const step = t[i]! - t[i - 1]!;
    if (step > 0) steps[count++] = step;
  }
  if (count === 0) return Number.NaN;
  const sorted = steps.subarray(0, count).sort();
  const half = count >> 1;
  const median = count % 2 ? sorted[half]! : 0.5 * (sorted[half - 1]! + sorted[half]!);
  // Millisecond stamps make a 66.7 Hz log step 15 ms: the mean of the steps that are no gaps undoes the rounding.
  let sum = 0;
  let used = 0;
  for (let i = 0; i < count && sorted[i]! <= 1.5 * median; i++) {
    sum += sorted[i]!;
    used++;
  }
  return used / sum;
}
