import { describe, expect, test } from 'vitest';
import { fromRotationVector, multiply, type Quaternion } from '../../../src/geometry/quaternion.js';
import { headingsStage } from '../../../src/stages/headings/index.js';
import type { Attitude, Motion, Steps } from '../../../src/tables/schemas.js';
import { walkContext } from '../walk-context.js';

const method = headingsStage.methods['device-axis']!;
const RATE_HZ = 50;

function attitudeOf(orientation: (t: number) => Quaternion, seconds: number): Attitude {
  const n = seconds * RATE_HZ + 1;
  const columns = ['qw', 'qx', 'qy', 'qz'].map(() => new Float64Array(n));
  const t_s = Float64Array.from({ length: n }, (_, i) => i / RATE_HZ);
  for (let i = 0; i < n; i++) for (const [a, v] of orientation(t_s[i]!).entries()) columns[a]![i] = v;
  const zeros = new Float64Array(n);
  return {
    t_s,
    qw: columns[0]!,
    qx: columns[1]!,
    qy: columns[2]!,
    qz: columns[3]!,
    bgx_radps: zeros,
    bgy_radps: zeros,
    bgz_radps: zeros,
    mag_trust: zeros,
    tilt_sd_rad: zeros,
    yaw_sd_rad: new Float64Array(n).fill(0.1),
  };
}
function stepsEvery(period: number, count: number): Steps {
  const t_s = Float64Array.from({ length: count }, (_, i) => period * (i + 1));
  return {
    step: Int32Array.from({ length: count }, (_, i) => i + 1),
    t_s,
    start_s: t_s.map((t) => t - period / 2),
    end_s: t_s.map((t) => t + period / 2),
    strength_mps2: new Float64Array(count).fill(5),
    confidence: new Float64Array(count).fill(1),
    bout: new Int32Array(count).fill(1),
  };
}
const NO_MOTION = { t_s: new Float64Array(0) } as unknown as Motion;
const degrees = (rad: number) => (rad * 180) / Math.PI;
/** Top of the screen to a heading (clockwise from north), raised by a pitch. */
const facing = (headingDeg: number, pitchDeg: number): Quaternion =>
  multiply(
    fromRotationVector([0, 0, (-headingDeg * Math.PI) / 180]),
    fromRotationVector([(pitchDeg * Math.PI) / 180, 0, 0]),
  );

describe('device-axis', () => {
  for (const pitch of [0, 30, 60, 70, 90])
    test(`raised by ${pitch} degrees, the direction is still the heading`, () => {
      const headings = method.run(
        { steps: stepsEvery(0.5, 8), motion: NO_MOTION, attitude: attitudeOf(() => facing(200, pitch), 6) },
        method.settings.parse({}),
        walkContext(),
      );
      for (const heading of headings.heading_rad) expect(degrees(heading)).toBeCloseTo(200, 9);
      expect(headings.source[0]).toBe('device-axis');
    });

  test('a turn inside a step is integrated: a turn of 90 degrees in the middle of it counts half', () => {
    const headings = method.run(
      {
        steps: stepsEvery(0.5, 8),
        motion: NO_MOTION,
        attitude: attitudeOf((t) => facing(t < 1.99 ? 0 : 90, 20), 6),
      },
      method.settings.parse({}),
      walkContext(),
    );
    // Step 4 spans 1.75 to 2.25 s; the turn lies within one row of its middle: 45 degrees but for a row's share.
    expect(Math.abs(degrees(headings.heading_rad[3]!) - 45)).toBeLessThan(4);
    expect(degrees(headings.heading_rad[2]!)).toBeCloseTo(0, 6);
    expect(degrees(headings.heading_rad[4]!)).toBeCloseTo(90, 6);
  });

  test('a start heading sets the offset by the first steps after the start', () => {
    const start = {
      checkpoint: 'c1',
      east_m: 0,
      north_m: 0,
      sigma_m: 0.1,
      t_s: 1.1,
      sigma_s: 0.2,
      heading_rad: (350 * Math.PI) / 180,
    };
    const headings = method.run(
      { steps: stepsEvery(0.5, 8), motion: NO_MOTION, attitude: attitudeOf(() => facing(10, 20), 6) },
      method.settings.parse({}),
      walkContext({ start }),
    );
    expect(degrees(headings.heading_rad[5]!)).toBeCloseTo(350, 9);
    expect(degrees(headings.offset_rad[5]!)).toBeCloseTo(-20, 9);
  });

  test('no steps, no headings', () => {
    const headings = method.run(
      { steps: stepsEvery(0.5, 0), motion: NO_MOTION, attitude: attitudeOf(() => facing(0, 0), 1) },
      method.settings.parse({}),
      walkContext(),
    );
    expect(headings.heading_rad).toHaveLength(0);
  });
});
