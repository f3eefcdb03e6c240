import { describe, expect, test } from 'vitest';
import { motionStage } from '../../../src/stages/motion/index.js';
import type { ReadingsAccel, ReadingsGyro, ReadingsMag } from '../../../src/tables/schemas.js';
import { walkContext } from '../walk-context.js';

const method = motionStage.methods['uniform-grid']!;

function accel(times: number[], z: (t: number) => number): ReadingsAccel {
  const t_s = Float64Array.from(times);
  return { t_s, x_mps2: t_s.map(() => 0.1), y_mps2: t_s.map((t) => t), z_mps2: t_s.map(z) };
}
function gyro(times: number[]): ReadingsGyro {
  const t_s = Float64Array.from(times);
  return { t_s, x_radps: t_s.map(() => 0.01), y_radps: t_s.map(() => 0.02), z_radps: t_s.map(() => 0.03) };
}
const every = (hz: number, seconds: number, from = 0) =>
  Array.from({ length: Math.round(hz * seconds) + 1 }, (_, i) => from + i / hz);

describe('uniform-grid', () => {
  test("the log's own rate in whole hertz, from where both sensors report to where one stops", () => {
    const motion = method.run(
      { 'readings-accel': accel(every(49.8, 10), () => 9.8), 'readings-gyro': gyro(every(100, 9, 0.5)) },
      method.settings.parse({}),
      walkContext(),
    );
    expect(motion.t_s[0]).toBeCloseTo(0.5, 9);
    expect(motion.t_s[1]! - motion.t_s[0]!).toBeCloseTo(0.02, 12);
    expect(motion.t_s.at(-1)).toBeCloseTo(9.5, 9);
    expect(motion.gap.every((g) => g === 0)).toBe(true);
    // A straight line stays one.
    for (let i = 0; i < motion.t_s.length; i++) expect(motion.ay_mps2[i]).toBeCloseTo(motion.t_s[i]!, 9);
    expect(motion.mx_uT).toBeUndefined();
  });

  test('a 400 Hz log becomes 200 Hz; a 286 Hz log half of its own', () => {
    for (const [own, grid] of [
      [400, 200],
      [286, 143],
    ] as const) {
      const motion = method.run(
        { 'readings-accel': accel(every(own, 5), () => 9.8) },
        method.settings.parse({}),
        walkContext(),
      );
      expect(1 / (motion.t_s[1]! - motion.t_s[0]!)).toBeCloseTo(grid, 6);
    }
  });

  test('what is above half of the new rate does not fold into the signal', () => {
    const hum = (t: number) => 9.8 + 3 * Math.sin(2 * Math.PI * 45 * t);
    const motion = method.run(
      { 'readings-accel': accel(every(200, 20), hum) },
      method.settings.parse({ rate_hz: 50 }),
      walkContext(),
    );
    // 45 Hz would appear as 5 Hz with amplitude 3; the filter's stop band is -74 dB. The ends are left out.
    for (const z of motion.az_mps2.subarray(50, 950)) expect(Math.abs(z - 9.8)).toBeLessThan(3e-3);
  });

  test('a gap longer than the bridge is flagged and holds no values; a shorter one is bridged', () => {
    const times = every(50, 10).filter((t) => !(t > 3 && t < 4) && !(t > 6 && t < 6.15));
    const motion = method.run(
      { 'readings-accel': accel(times, () => 9.8) },
      method.settings.parse({}),
      walkContext(),
    );
    for (let i = 0; i < motion.t_s.length; i++) {
      const t = motion.t_s[i]!;
      const inside = t > 3.0001 && t < 3.9999;
      expect(motion.gap[i]).toBe(inside ? 1 : 0);
      expect(Number.isNaN(motion.az_mps2[i]!)).toBe(inside);
    }
  });

  test('a silent magnetometer leaves NaN in its own columns only', () => {
    const t_s = Float64Array.from(every(20, 10).filter((t) => t < 2 || t > 5));
    const mag: ReadingsMag = {
      t_s,
      x_uT: t_s.map(() => 20),
      y_uT: t_s.map(() => 0),
      z_uT: t_s.map(() => -40),
    };
    const motion = method.run(
      { 'readings-accel': accel(every(50, 10), () => 9.8), 'readings-mag': mag },
      method.settings.parse({}),
      walkContext(),
    );
    expect(motion.mx_uT![175]).toBeNaN();
    expect(motion.mx_uT![450]).toBeCloseTo(20, 9);
    expect(motion.gap.every((g) => g === 0)).toBe(true);
  });

  test("a device's calibration is applied: matrix times (raw minus bias); delays shift times", () => {
    const device = {
      accel: { bias: [0.1, 0, 0.8], matrix: [2, 0, 0, 0, 1, 0, 0, 0, 0.5] },
      gyro: null,
      mag: null,
      delay_s: { accel: 1 },
    } as const;
    const motion = method.run(
      { 'readings-accel': accel(every(50, 4), () => 9.8) },
      method.settings.parse({}),
      walkContext({ device }),
    );
    expect(motion.t_s[0]).toBeCloseTo(1, 9);
    expect(motion.ax_mps2[10]).toBeCloseTo(0, 12);
    expect(motion.az_mps2[10]).toBeCloseTo(4.5, 12);
  });

  test('duplicated times do no harm; a single reading is refused', () => {
    const times = every(50, 4).flatMap((t) => [t, t]);
    const motion = method.run(
      { 'readings-accel': accel(times, (t) => t) },
      method.settings.parse({}),
      walkContext(),
    );
    expect(motion.t_s).toHaveLength(201);
    for (let i = 0; i < 201; i++) expect(motion.az_mps2[i]).toBeCloseTo(motion.t_s[i]!, 9);
    expect(() =>
      method.run({ 'readings-accel': accel([1], () => 0) }, method.settings.parse({}), walkContext()),
    ).toThrow('accel: needs at least 2 readings at different times, got 1');
  });
});
