import type { Motion } from '../../tables/schemas.js';
import { LONGEST_STEP_S } from './step-columns.js';

/** Only intervals this long may be strides of one leg, s: able walkers take less than two steps in this time. */
const SHORTEST_STRIDE_S = 0.75;

/** A thigh or an arm swings the phone by more than this, rad/s (root mean square); a hand that reads does not. */
const SWING_RADPS = 0.5;

/** Correlation of the rotation with itself one interval later from which on it repeats with the interval. */
const REPEATS = 0.6;

/** Fewer events than this tell no period. */
const LEAST_EVENTS = 4;

/**
 * Where only the phone's own leg was heard, the steps of the other one, half way between.
 *
 * In a trouser pocket a weak walker's other leg may leave no trace in the acceleration. The gyroscope tells: thigh and
 * arm swing once a stride, so where their rotation repeats from one event to the next and is turned about half way between,
 * the events are strides.
 *
 * @param motion - with angular rates; without them nothing is added.
 * @param eventS - ascending, s.
 * @returns the instants to add, ascending, s.
 */
export function otherLegSteps(motion: Motion, eventS: Float64Array): number[] {
  const { gx_radps: gx, gy_radps: gy, gz_radps: gz, t_s } = motion;
  if (!gx || !gy || !gz || t_s.length < 2) return [];
  const rateHz = (t_s.length - 1) / (t_s.at(-1)! - t_s[0]!);
  const sampleAt = (t: number) => Math.max(0, Math.min(t_s.length - 1, Math.round((t - t_s[0]!) * rateHz)));
  const added: number[] = [];
  for (let from = 0; from < eventS.length; ) {
    let to = from + 1;
    while (to < eventS.length && eventS[to]! - eventS[to - 1]! <= LONGEST_STEP_S) to++;
    // In stretches of a few strides, for the phone may be moved in mid-bout.
    for (let a = from; a < to; a += LEAST_EVENTS) {
      const b = to - a < 2 * LEAST_EVENTS ? to : a + LEAST_EVENTS;
      addBetween(eventS.subarray(a, Math.min(b + 1, to)), sampleAt, [gx, gy, gz], rateHz, added);
      if (b === to) break;
    }
    from = to;
  }
  return added;
}

function addBetween(
  eventS: Float64Array,
  sampleAt: (t: number) => number,
  rates: readonly [Float64Array, Float64Array, Float64Array],
  rateHz: number,
  added: number[],
): void {
  if (eventS.length < LEAST_EVENTS) return;
  const intervals = Float64Array.from({ length: eventS.length - 1 }, (_, k) => eventS[k + 1]! - eventS[k]!);
  const typical = intervals.slice().sort()[intervals.length >> 1]!;
  if (typical < SHORTEST_STRIDE_S) return;
  const swing = mainRotation(rates, sampleAt(eventS[0]!), sampleAt(eventS.at(-1)!) + 1);
  if (!(swing.rms > SWING_RADPS)) return;
  const lag = Math.round(typical * rateHz);
  if (!(correlationAt(swing.rate, lag) > REPEATS && correlationAt(swing.rate, lag >> 1) < 0)) return;
  for (let k = 0; k + 1 < eventS.length; k++)
    if (intervals[k]! > 0.75 * typical && intervals[k]! < 1.5 * typical)
      added.push((eventS[k]! + eventS[k + 1]!) / 2);
}

/** Angular rate about the axis that the phone turns about most, and its size. */
function mainRotation(
  rates: readonly [Float64Array, Float64Array, Float64Array],
  from: number,
  to: number,
): { rate: Float64Array; rms: number } {
  const axes = rates.map((axis) => {
    // Inside gaps nothing is known.
    const part = axis.subarray(from, to).map((x) => (Number.isNaN(x) ? 0 : x));
    let sum = 0;
    for (const x of part) sum += x;
    return part.map((x) => x - sum / part.length);
  });
  let axis = [1, 1, 1];
  const along = (i: number) => axis[0]! * axes[0]![i]! + axis[1]! * axes[1]![i]! + axis[2]! * axes[2]![i]!;
  const n = to - from;
  // Power iteration on the covariance: the gap to the next axis is wide wherever the result is used.
  for (let round = 0; round < 12; round++) {
    const next = [0, 0, 0];
    for (let i = 0; i < n; i++) {
      const p = along(i);
      for (let a = 0; a < 3; a++) next[a]! += p * axes[a]![i]!;
    }
    const length = Math.hypot(next[0]!, next[1]!, next[2]!);
    if (!(length > 0)) return { rate: new Float64Array(n), rms: 0 };
    axis = next.map((x) => x / length);
  }
  let square = 0;
  const rate = Float64Array.from({ length: n }, (_, i) => along(i));
  for (const x of rate) square += x * x;
  return { rate, rms: Math.sqrt(square / n) };
}

/** Correlation of a signal with itself `lag` samples later; 0 where it is shorter or flat. */
function correlationAt(signal: Float64Array, lag: number): number {
  let here = 0;
  let later = 0;
  let product = 0;
  for (let i = 0; i + lag < signal.length; i++) {
    here += signal[i]! ** 2;
    later += signal[i + lag]! ** 2;
    product += signal[i]! * signal[i + lag]!;
  }
  return here > 0 && later > 0 ? product / Math.sqrt(here * later) : 0;
}
