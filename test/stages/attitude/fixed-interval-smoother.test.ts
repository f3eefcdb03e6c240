import { describe, expect, test } from 'vitest';
import {
  conjugate,
  fromRotationVector,
  multiply,
  type Quaternion,
  rotate,
} from '../../../src/geometry/quaternion.js';
import { attitudeStage } from '../../../src/stages/attitude/index.js';
import { LeftOut } from '../../../src/stages/left-out.js';
import { randomStream } from '../../../src/stats/random.js';
import type { Attitude, Motion } from '../../../src/tables/schemas.js';
import { walkContext } from '../walk-context.js';

const GRAVITY = 9.80665;
const FIELD: [number, number, number] = [0, 22, -42];

interface Errors {
  biasRadps?: [number, number, number];
  noise?: number;
  /** Share of the recording in which the field is turned by 40 degrees and stronger by a third. */
  disturbedShare?: number;
  magnetometer?: boolean;
  gapS?: [number, number];
}

/** A device turned about all axes by sums of sines, in place, with truth. */
function recording(seconds: number, rateHz: number, errors: Errors): { motion: Motion; truth: Quaternion[] } {
  const n = seconds * rateHz;
  const random = randomStream(3, 'recording', rateHz);
  const noise = errors.noise ?? 0;
  const bias = errors.biasRadps ?? [0, 0, 0];
  const attitude = (t: number): Quaternion =>
    multiply(
      fromRotationVector([0, 0, 1.3 * Math.sin(0.31 * t) + 0.4 * Math.sin(1.7 * t)]),
      fromRotationVector([0.6 * Math.sin(0.53 * t + 1), 0.5 * Math.sin(0.77 * t), 0]),
    );
  const columns: Record<string, Float64Array> = {};
  for (const name of ['t_s', 'ax', 'ay', 'az', 'gx', 'gy', 'gz', 'mx', 'my', 'mz'])
    columns[name] = new Float64Array(n);
  const truth: Quaternion[] = [];
  const h = 1e-4;
  const gap = new Uint8Array(n);
  for (let i = 0; i < n; i++) {
    const t = i / rateHz;
    const q = attitude(t);
    truth.push(q);
    const step = multiply(conjugate(attitude(t - h)), attitude(t + h));
    const rate = [step[1] / h, step[2] / h, step[3] / h];
    const force = rotate(conjugate(q), [0, 0, GRAVITY]);
    const disturbed = t > seconds * 0.4 && t < seconds * (0.4 + (errors.disturbedShare ?? 0));
    const field = rotate(
      conjugate(q),
      disturbed ? [1.33 * 22 * Math.sin(0.7), 1.33 * 22 * Math.cos(0.7), 1.33 * -42] : FIELD,
    );
    columns.t_s![i] = t;
    for (const [a, axis] of ['x', 'y', 'z'].entries()) {
      columns[`a${axis}`]![i] = force[a]! + noise * 0.1 * random.normal();
      columns[`g${axis}`]![i] = rate[a]! + bias[a]! + noise * 0.01 * random.normal();
      columns[`m${axis}`]![i] = field[a]! + noise * 0.5 * random.normal();
    }
    if (errors.gapS && t >= errors.gapS[0] && t < errors.gapS[1]) {
      gap[i] = 1;
      for (const axis of ['x', 'y', 'z']) {
        columns[`a${axis}`]![i] = Number.NaN;
        columns[`g${axis}`]![i] = Number.NaN;
      }
    }
  }
  const motion: Motion = {
    t_s: columns.t_s!,
    ax_mps2: columns.ax!,
    ay_mps2: columns.ay!,
    az_mps2: columns.az!,
    gx_radps: columns.gx!,
    gy_radps: columns.gy!,
    gz_radps: columns.gz!,
    gap,
  };
  if (errors.magnetometer !== false) {
    motion.mx_uT = columns.mx!;
    motion.my_uT = columns.my!;
    motion.mz_uT = columns.mz!;
  }
  return { motion, truth };
}

function run(motion: Motion, settings: object = {}): Attitude {
  const method = attitudeStage.methods['fixed-interval-smoother']!;
  return method.run({ motion }, method.settings.parse(settings), walkContext());
}

/** Root mean square of the tilt and yaw error, degrees; yaw relative to its mean where asked. */
function errorsOf(
  attitude: Attitude,
  truth: Quaternion[],
  relativeYaw = false,
): { tilt: number; yaw: number } {
  let tilt = 0;
  const yaws: number[] = [];
  for (const [i, q] of truth.entries()) {
    const e = multiply([attitude.qw[i]!, attitude.qx[i]!, attitude.qy[i]!, attitude.qz[i]!], conjugate(q));
    tilt += (2 * Math.asin(Math.min(1, Math.hypot(e[1], e[2])))) ** 2;
    yaws.push(2 * Math.atan2(e[0] < 0 ? -e[3] : e[3], Math.abs(e[0])));
  }
  const mean = relativeYaw ? yaws.reduce((a, b) => a + b, 0) / yaws.length : 0;
  const yaw = yaws.reduce((sum, y) => sum + (y - mean) ** 2, 0) / yaws.length;
  return { tilt: (Math.sqrt(tilt / truth.length) * 180) / Math.PI, yaw: (Math.sqrt(yaw) * 180) / Math.PI };
}

describe('fixed-interval smoother', () => {
  for (const rateHz of [50, 100, 200])
    test(`perfect sensors at ${rateHz} Hz: attitude to 0.05 degrees`, () => {
      const { motion, truth } = recording(60, rateHz, {});
      const { tilt, yaw } = errorsOf(run(motion), truth);
      // What is left is the integration at the lowest rate: (0.02 s)^3 times rates of 1 to 2 rad/s, over a minute.
      expect(tilt).toBeLessThan(0.05);
      expect(yaw).toBeLessThan(0.05);
    });

  test('finds a gyroscope bias of a degree per second to 2 percent', () => {
    const bias: [number, number, number] = [0.0175, -0.0175, 0.0175];
    const { motion, truth } = recording(90, 100, { biasRadps: bias, noise: 1 });
    const attitude = run(motion);
    // Noise 0.01 rad/s per sample integrates to 1e-3 rad/sqrt(s), over 90 s about 1e-2 rad / 90 s = 1e-4 rad/s.
    for (const [a, column] of [attitude.bgx_radps, attitude.bgy_radps, attitude.bgz_radps].entries())
      expect(Math.abs(column[4500]! - bias[a]!)).toBeLessThan(3.5e-4);
    expect(errorsOf(attitude, truth).tilt).toBeLessThan(0.5);
  });

  test('a magnetic disturbance over a fifth of the time is recognised and does not turn the heading', () => {
    const { motion, truth } = recording(90, 50, { disturbedShare: 0.2, noise: 1 });
    const attitude = run(motion);
    expect(attitude.mag_trust[Math.round(0.5 * 4500)]).toBeLessThan(0.2);
    expect(attitude.mag_trust[Math.round(0.8 * 4500)]).toBeGreaterThan(0.8);
    // 40 degrees over a fifth of the time would pull a plain mean by 8; the noise alone gives tenths.
    expect(errorsOf(attitude, truth).yaw).toBeLessThan(1);
  });

  test('without a magnetometer the yaw is relative and says so', () => {
    const { motion, truth } = recording(60, 50, { magnetometer: false, noise: 1 });
    const attitude = run(motion);
    expect(errorsOf(attitude, truth, true).yaw).toBeLessThan(1);
    // Nothing is known of it: the standard deviation of a uniform angle, pi over the root of 3.
    expect(attitude.yaw_sd_rad[0]).toBeCloseTo(Math.PI / Math.sqrt(3), 1);
    expect(Math.max(...attitude.mag_trust)).toBe(0);
  });

  test('a gap widens the uncertainty inside it and heals after', () => {
    const { motion, truth } = recording(60, 50, { gapS: [30, 31], noise: 1 });
    const attitude = run(motion);
    expect(attitude.tilt_sd_rad[1525]).toBeGreaterThan(5 * attitude.tilt_sd_rad[1000]!);
    const after = {
      ...attitude,
      qw: attitude.qw.subarray(1800),
      qx: attitude.qx.subarray(1800),
      qy: attitude.qy.subarray(1800),
      qz: attitude.qz.subarray(1800),
    };
    expect(errorsOf(after, truth.slice(1800)).tilt).toBeLessThan(1);
  });

  test('no gyroscope: left out, with the reason; same input, same bytes', () => {
    const { motion } = recording(20, 50, {});
    const { gx_radps: _, ...without } = motion;
    expect(() => run(without)).toThrow(LeftOut);
    expect(run(motion)).toEqual(run(motion));
  });

  test('the quaternions are unit and qw is never negative', () => {
    const attitude = run(recording(30, 50, { noise: 1 }).motion);
    for (let i = 0; i < attitude.qw.length; i++) {
      expect(attitude.qw[i]).toBeGreaterThanOrEqual(0);
      const norm = Math.hypot(attitude.qw[i]!, attitude.qx[i]!, attitude.qy[i]!, attitude.qz[i]!);
      expect(Math.abs(norm - 1)).toBeLessThan(1e-12);
    }
  });
});
