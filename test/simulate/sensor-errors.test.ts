import { describe, expect, test } from 'vitest';
import { deviceSchema } from '../../src/simulate/device-schema.js';
import { deviceModel, sense } from '../../src/simulate/sensor-errors.js';
import { allanDeviation } from '../../src/stats/allan.js';

const RATE_HZ = 100;

/** Readings of a sensor at rest: truth 0. */
function still(gyro: Record<string, unknown>, seconds: number, truth = 0) {
  const device = deviceModel('d', deviceSchema.parse({ class: 'ideal', gyro }));
  const n = seconds * RATE_HZ;
  const times = Float64Array.from({ length: n }, (_, i) => i / RATE_HZ);
  const zero = () => new Float64Array(n).fill(truth);
  return sense(9, 'w', device, 'gyro', [zero(), zero(), zero()], times, RATE_HZ);
}

function deviations(values: Float64Array, taus: number[]): number[] {
  return [...allanDeviation(values, RATE_HZ, 'overlapping-allan', taus).deviation];
}

describe('noise is as asked', () => {
  test('white noise N: N / sqrt(tau)', () => {
    const [first, second] = deviations(still({ noise_density: 2e-4 }, 2000).values[0]!, [1, 4]);
    // IEEE Std 952-1997, annex C. The estimate from 2000 s is good to 1/sqrt(2 n/m) = 1.6 % and 3 %; three times that.
    expect(Math.abs(first! / 2e-4 - 1)).toBeLessThan(0.05);
    expect(Math.abs(second! / 1e-4 - 1)).toBeLessThan(0.1);
  });

  test('random walk K: K sqrt(tau / 3)', () => {
    const [first] = deviations(still({ random_walk: 1e-4 }, 2000).values[0]!, [3]);
    // The same; 3 s of 2000 s: 2.7 %, three times that.
    expect(Math.abs(first! / 1e-4 - 1)).toBeLessThan(0.085);
  });

  test('flicker B: B sqrt(2 ln 2 / pi), flat over two decades', () => {
    const taus = [1, 3, 10, 30, 100];
    const sums = taus.map(() => 0);
    const readings = still({ bias_instability: 1e-3 }, 4000);
    for (const axis of readings.values)
      for (const [i, value] of deviations(axis, taus).entries()) sums[i]! += value ** 2 / 3;
    for (const [i, tau] of taus.entries()) {
      const ratio = Math.sqrt(sums[i]!) / (1e-3 * 0.664282);
      // Three axes of 4000 s: at 100 s 1/sqrt(2 * 3 * 40) = 6.5 %, at 1 s below 1 %; three times that, and 4 %
      // for the ripple of a sum of processes.
      expect(Math.abs(ratio - 1), `${tau} s`).toBeLessThan(0.04 + 3 / Math.sqrt((2 * 3 * 4000) / tau));
    }
  });

  test('the bias that truth reports is all that is added but white noise', () => {
    const errors = { bias_sd: 0.01, turn_on_sd: 0.01, bias_instability: 1e-3, random_walk: 1e-4 };
    const { values, bias } = still(errors, 20);
    for (let i = 0; i < values[0]!.length; i++) expect(values[1]![i]).toBe(bias[1]![i]);
  });
});

test('clipping and quantisation', () => {
  const clipped = still({ range: 2 }, 1, 3).values[0]!;
  expect(new Set(clipped)).toEqual(new Set([2]));
  const coarse = still({ step: 0.25 }, 1, 1.1).values[0]!;
  // Identity: 1.1 is nearest to four and a half quarters less a bit, so to 1.0.
  expect(new Set(coarse)).toEqual(new Set([1]));
});

test('scale and misalignment are one matrix a device, the same in every walk', () => {
  const device = deviceModel(
    'd',
    deviceSchema.parse({ class: 'ideal', gyro: { scale_sd: 0.02, misalignment_sd_rad: 0.01 } }),
  );
  const read = (walk: string, truth: number[]) =>
    sense(
      9,
      walk,
      device,
      'gyro',
      truth.map((value) => Float64Array.of(value)),
      Float64Array.of(0),
      RATE_HZ,
    ).values.map((axis) => axis[0]!);
  const [x, y, both] = [read('u', [1, 0, 0]), read('v', [0, 1, 0]), read('w', [1, 1, 0])];
  // Identity: linear to the last digits.
  for (let i = 0; i < 3; i++) expect(both[i]).toBeCloseTo(x[i]! + y[i]!, 14);
  expect(x[0]).not.toBe(1);
  expect(x[1]).not.toBe(0);
});

test('a bias given in the plan is that bias', () => {
  expect(still({ bias: [0.1, -0.2, 0.3] }, 1).values.map((axis) => axis[0])).toEqual([0.1, -0.2, 0.3]);
});
