import type { Attitude, Motion, Steps } from '../../tables/schemas.js';

/** Real and imaginary part of the part of a signal that repeats with a stride or a step. */
export type Phasor = readonly [re: number, im: number];

/** How the phone moves over the two steps around one step, seen along a direction that follows the device. */
export interface StrideMotion {
  /** Acceleration at the step rate, m/s2: to the right of the device's direction, along it, up. */
  right: Phasor;
  along: Phasor;
  up: Phasor;
  /** The same at the stride rate. */
  strideRight: Phasor;
  strideAlong: Phasor;
  strideUp: Phasor;
}

/**
 * The parts of the phone's acceleration that repeat with the steps and with the strides, for every step that has a
 * neighbour on both sides in its bout: from the event before to the event after, by phase and not by time, so that
 * uneven steps smear nothing.
 *
 * Trunk and phone move forward and up once a step and sideways once a stride (Menz, Lord & Fitzpatrick (2003), Gait &
 * Posture 18, 35-46), so at the step rate the horizontal motion is along the walking direction.
 *
 * @param direction - direction that the device's points over each such interval, rad; shape (steps).
 * @returns shape (steps); null where a neighbour is missing or a gap lies in the interval.
 */
export function strideMotion(
  motion: Motion,
  attitude: Attitude,
  steps: Steps,
  direction: Float64Array,
): (StrideMotion | null)[] {
  const rows = motion.t_s.length;
  const stepS = rows > 1 ? (motion.t_s[rows - 1]! - motion.t_s[0]!) / (rows - 1) : 1;
  const rowAt = (t: number) => Math.ceil((t - motion.t_s[0]!) / stepS - 1e-9);
  const out: (StrideMotion | null)[] = [];
  for (let k = 0; k < steps.t_s.length; k++) {
    const whole = k > 0 && k + 1 < steps.t_s.length && steps.bout[k - 1] === steps.bout[k + 1];
    const from = whole ? Math.max(0, rowAt(steps.t_s[k - 1]!)) : 0;
    const to = whole ? Math.min(rows, rowAt(steps.t_s[k + 1]!)) : 0;
    out.push(to - from >= LEAST_ROWS ? phasorsOf(motion, attitude, steps, k, from, to, direction[k]!) : null);
  }
  return out;
}

/** A stride of fewer samples than this tells nothing of its second harmonic. */
const LEAST_ROWS = 8;

function phasorsOf(
  motion: Motion,
  attitude: Attitude,
  steps: Steps,
  k: number,
  from: number,
  to: number,
  direction: number,
): StrideMotion | null {
  const [sin, cos] = [Math.sin(direction), Math.cos(direction)];
  const [before, at, after] = [steps.t_s[k - 1]!, steps.t_s[k]!, steps.t_s[k + 1]!];
  // Sums of right, along and up times each wave, of the values and of the waves alone.
  const sums = new Float64Array(3 * 5);
  const waves = new Float64Array(4);
  for (let i = from; i < to; i++) {
    if (motion.gap[i]) return null;
    const w = attitude.qw[i]!;
    const x = attitude.qx[i]!;
    const y = attitude.qy[i]!;
    const z = attitude.qz[i]!;
    const [a, b, c] = [motion.ax_mps2[i]!, motion.ay_mps2[i]!, motion.az_mps2[i]!];
    const east = (1 - 2 * (y * y + z * z)) * a + 2 * (x * y - w * z) * b + 2 * (x * z + w * y) * c;
    const north = 2 * (x * y + w * z) * a + (1 - 2 * (x * x + z * z)) * b + 2 * (y * z - w * x) * c;
    const up = 2 * (x * z - w * y) * a + 2 * (y * z + w * x) * b + (1 - 2 * (x * x + y * y)) * c;
    const right = east * cos - north * sin;
    const along = east * sin + north * cos;
    const t = motion.t_s[i]!;
    const phase = Math.PI * (t < at ? (t - before) / (at - before) : 1 + (t - at) / (after - at));
    const c1 = Math.cos(phase);
    const s1 = -Math.sin(phase);
    const c2 = c1 * c1 - s1 * s1;
    const s2 = 2 * c1 * s1;
    addWaves(waves, 0, 1, c1, s1, c2, s2);
    addWaves(sums, 0, right, c1, s1, c2, s2);
    addWaves(sums, 5, along, c1, s1, c2, s2);
    addWaves(sums, 10, up, c1, s1, c2, s2);
    sums[4]! += right;
    sums[9]! += along;
    sums[14]! += up;
  }
  // The mean is taken off: a window that is not a whole number of samples would let gravity into every wave.
  const rows = to - from;
  const part = (first: number, wave: number) =>
    (2 / rows) * (sums[first + wave]! - (sums[first + 4]! / rows) * waves[wave]!);
  const phasor = (first: number, rate: 0 | 2): Phasor => [part(first, rate), part(first, rate + 1)];
  return {
    right: phasor(0, 2),
    along: phasor(5, 2),
    up: phasor(10, 2),
    strideRight: phasor(0, 0),
    strideAlong: phasor(5, 0),
    strideUp: phasor(10, 0),
  };
}

/** Adds a value times the waves at the stride rate (cosine, minus sine) and at the step rate. */
function addWaves(
  sums: Float64Array,
  first: number,
  value: number,
  c1: number,
  s1: number,
  c2: number,
  s2: number,
): void {
  sums[first]! += value * c1;
  sums[first + 1]! += value * s1;
  sums[first + 2]! += value * c2;
  sums[first + 3]! += value * s2;
}
