import type { InertialSamples } from './inertial-samples.js';

export interface RestLimits {
  rest_window_s: number;
  rest_gyro_radps: number;
  rest_accel_mps2: number;
}

/** No phone's gyroscope is this far off at rest after its own correction; a steady turn can be. */
const LARGEST_BIAS_RADPS = 0.2;

/**
 * Marks the node intervals in which the phone lies still: over the window around the interval both the
 * angular rate and the specific force scatter less than the limits (root of the summed variances of the axes).
 *
 * @returns shape (nodes - 1), 1 where at rest.
 * @see Skog, Händel, Nilsson & Rantakokko (2010), IEEE Trans. Biomedical Engineering 57(11), 2657-2666:
 *   the moving-variance detector.
 */
export function restIntervals(
  samples: InertialSamples,
  perNode: number,
  nodes: number,
  limits: RestLimits,
): Uint8Array {
  const { count, stepS } = samples;
  const half = Math.max(1, Math.round(limits.rest_window_s / 2 / stepS));
  const gyro = samples.gyro.map(runningSums);
  const accel = samples.accel.map(runningSums);
  const out = new Uint8Array(nodes - 1);
  for (let j = 0; j < nodes - 1; j++) {
    const middle = Math.min(count - 1, j * perNode + (perNode >> 1));
    const from = Math.max(0, middle - half);
    const to = Math.min(count, middle + half + 1);
    let rate2 = 0;
    let gyroVariance = 0;
    for (const s of gyro) {
      gyroVariance += varianceOf(s, from, to);
      rate2 += meanOf(s, from, to) ** 2;
    }
    let accelVariance = 0;
    for (const s of accel) accelVariance += varianceOf(s, from, to);
    if (
      gyroVariance < limits.rest_gyro_radps ** 2 &&
      accelVariance < limits.rest_accel_mps2 ** 2 &&
      rate2 < LARGEST_BIAS_RADPS ** 2
    )
      out[j] = 1;
  }
  return out;
}

interface Sums {
  centre: number;
  first: Float64Array;
  second: Float64Array;
}

function runningSums(values: Float64Array): Sums {
  let centre = 0;
  for (let i = 0; i < values.length; i++) centre += values[i]!;
  centre /= values.length;
  const first = new Float64Array(values.length + 1);
  const second = new Float64Array(values.length + 1);
  for (let i = 0; i < values.length; i++) {
    const d = values[i]! - centre;
    first[i + 1] = first[i]! + d;
    second[i + 1] = second[i]! + d * d;
  }
  return { centre, first, second };
}

function meanOf(s: Sums, from: number, to: number): number {
  return s.centre + (s.first[to]! - s.first[from]!) / (to - from);
}

function varianceOf(s: Sums, from: number, to: number): number {
  const mean = (s.first[to]! - s.first[from]!) / (to - from);
  return Math.max(0, (s.second[to]! - s.second[from]!) / (to - from) - mean * mean);
}
