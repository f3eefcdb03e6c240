import { inverse, Matrix } from 'ml-matrix';
import { InputError } from '../errors.js';

/** Gyroscope readings between two still poses, with the direction of gravity in the device in both. */
export interface PoseChange {
  /** Rates less their zero, rad/s, three arrays; steps between readings, s. */
  rate: readonly [Float64Array, Float64Array, Float64Array];
  stepS: Float64Array;
  /** Unit vectors in the device. */
  before: readonly [number, number, number];
  after: readonly [number, number, number];
}

export interface GyroScaleFit {
  scale: [number, number, number];
  scaleSd: [number, number, number];
  /** Root mean square of the angle between gravity as carried along by the gyroscope and as measured, rad. */
  residual: number;
  residualBefore: number;
}

const ROUNDS = 12;
const NUDGE = 1e-4;
/** Of the direction of gravity in a pose, rad. */
const LEAST_ERROR = 0.009;
/** A scale that is known no better than this is not known: parts are within five percent as they come. */
const LARGEST_SD = 0.02;

/**
 * Scale of each gyroscope axis from turns between still poses: gravity, carried along by the gyroscope, must arrive where
 * the accelerometer finds it.
 *
 * @param changes - turns in different directions; a turn about the vertical says nothing.
 * @throws InputError `too-few`, `undetermined` where some axis was hardly turned about.
 * @see Tedaldi, Pretto & Menegatti (2014), ICRA, 3042-3049 (a turn between static intervals, gravity as reference).
 */
export function fitGyroScale(changes: readonly PoseChange[]): GyroScaleFit {
  if (changes.length < 4)
    throw new InputError(
      'too-few',
      `calibrate gyro: needs at least 4 turns between still poses for the scales, got ${changes.length}`,
    );
  const scale = [1, 1, 1];
  const before = errorsOf(changes, scale);
  for (let round = 0; round < ROUNDS; round++) {
    const { normal, right } = equations(changes, scale);
    const step = inverse(normal).mmul(right);
    for (let a = 0; a < 3; a++) scale[a]! -= step.get(a, 0);
  }
  const errors = errorsOf(changes, scale);
  const freedom = Math.max(1, 2 * changes.length - 3);
  const variance = Math.max(1e-30, errors.reduce((sum, e) => sum + e * e, 0) / freedom);
  const covariance = inverse(equations(changes, scale).normal).mul(variance);
  const sd = [0, 1, 2].map((a) => Math.sqrt(Math.max(0, covariance.get(a, a))));
  // Judged as if gravity were known to half a degree at best: without noise nothing else tells an axis that was not used.
  const least = Math.max(variance, LEAST_ERROR ** 2) / Math.max(variance, 1e-30);
  const loose = sd.findIndex((s) => !(s * Math.sqrt(least) < LARGEST_SD));
  if (loose >= 0)
    throw new InputError(
      'undetermined',
      `calibrate gyro: the scale of ${'xyz'[loose]} is known to ${(100 * sd[loose]!).toFixed(1)} % only; turn the device about that axis too, from still pose to still pose`,
    );
  const rms = (e: readonly number[]) => Math.sqrt(e.reduce((sum, x) => sum + x * x, 0) / changes.length);
  return {
    scale: [scale[0]!, scale[1]!, scale[2]!],
    scaleSd: [sd[0]!, sd[1]!, sd[2]!],
    residual: rms(errors),
    residualBefore: rms(before),
  };
}

function equations(changes: readonly PoseChange[], scale: readonly number[]) {
  const errors = errorsOf(changes, scale);
  const columns = [0, 1, 2].map((a) => {
    const nudged = scale.map((s, b) => (a === b ? s + NUDGE : s));
    return errorsOf(changes, nudged).map((e, i) => (e - errors[i]!) / NUDGE);
  });
  const normal = Matrix.zeros(3, 3);
  const right = Matrix.zeros(3, 1);
  for (let a = 0; a < 3; a++) {
    right.set(a, 0, dot(columns[a]!, errors));
    for (let b = 0; b < 3; b++) normal.set(a, b, dot(columns[a]!, columns[b]!) + (a === b ? 1e-12 : 0));
  }
  return { normal, right };
}

function dot(a: readonly number[], b: readonly number[]): number {
  return a.reduce((sum, x, i) => sum + x * b[i]!, 0);
}

/** Carried less measured gravity of every change, three numbers each. */
function errorsOf(changes: readonly PoseChange[], scale: readonly number[]): number[] {
  return changes.flatMap(({ rate, stepS, before, after }) => {
    let [x, y, z] = before;
    for (let i = 0; i < stepS.length; i++) {
      const wx = scale[0]! * rate[0][i]! * stepS[i]!;
      const wy = scale[1]! * rate[1][i]! * stepS[i]!;
      const wz = scale[2]! * rate[2][i]! * stepS[i]!;
      const turn = Math.hypot(wx, wy, wz);
      if (!(turn > 0)) continue;
      // Rodrigues' formula for a turn by -w: what is fixed in space turns the other way in the device.
      const s = -Math.sin(turn) / turn;
      const c = (1 - Math.cos(turn)) / (turn * turn);
      const along = c * (wx * x + wy * y + wz * z);
      const cos = Math.cos(turn);
      [x, y, z] = [
        x * cos + s * (wy * z - wz * y) + along * wx,
        y * cos + s * (wz * x - wx * z) + along * wy,
        z * cos + s * (wx * y - wy * x) + along * wz,
      ];
    }
    return [x - after[0], y - after[1], z - after[2]];
  });
}
