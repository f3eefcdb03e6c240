import type { PeakCandidates } from './peak-candidates.js';

/** Against the bout's nearest interval: how much sooner or later the first and the last step may come. */
const SOONEST = 0.7;
const LATEST = 1.6;

/**
 * Adds the step before the first and the one after the last of each bout, where there is a peak at its time.
 *
 * Who starts or stops walking takes a step that is half as long and hardly shakes the phone; only its place in the
 * beat of the others tells it from nothing.
 *
 * @param steps - candidates that are steps, ascending.
 * @param longestS - two steps further apart are of two bouts.
 * @param leastMps2 - prominence from which on a peak counts.
 */
export function withBoutEdges(
  { count, at, prominence, rateHz }: PeakCandidates,
  steps: Int32Array,
  longestS: number,
  leastMps2: number,
): Int32Array {
  const longest = longestS * rateHz;
  const out: number[] = [];
  /** The most prominent peak beyond `edge`, away from `inner`, before `limit`; -1 where there is none. */
  const beyond = (edge: number, inner: number, limit: number): number => {
    const interval = Math.abs(at[inner]! - at[edge]!);
    const direction = edge < inner ? -1 : 1;
    let found = -1;
    for (let c = edge + direction; c !== limit; c += direction) {
      const away = Math.abs(at[c]! - at[edge]!);
      if (away > LATEST * interval) break;
      if (away < SOONEST * interval || prominence[c]! < leastMps2) continue;
      if (found < 0 || prominence[c]! > prominence[found]!) found = c;
    }
    return found;
  };
  for (let k = 0; k < steps.length; k++) {
    const here = steps[k]!;
    const before = steps[k - 1];
    const after = steps[k + 1];
    const begins = before === undefined || at[here]! - at[before]! > longest;
    const ends = after === undefined || at[after]! - at[here]! > longest;
    if (begins && !ends) {
      const first = beyond(here, after!, out.at(-1) ?? -1);
      if (first >= 0) out.push(first);
    }
    out.push(here);
    if (ends && !begins) {
      const last = beyond(here, before!, after ?? count);
      if (last >= 0) out.push(last);
    }
  }
  return Int32Array.from(out);
}
