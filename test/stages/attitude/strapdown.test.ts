import { describe, expect, test } from 'vitest';
import {
  conjugate,
  fromRotationVector,
  multiply,
  type Quaternion,
} from '../../../src/geometry/quaternion.js';
import { turnInPlace, turnsBetween } from '../../../src/stages/attitude/strapdown.js';

/** Samples on either side, so that no end effect enters. */
const SPARE = 2;

/** Integrates a rate given in closed form over `seconds` at `rateHz`. */
function integrate(
  rate: (t: number) => [number, number, number],
  seconds: number,
  rateHz: number,
  start: Quaternion,
) {
  const n = Math.round(seconds * rateHz);
  const gyro = [0, 1, 2].map((axis) =>
    Float64Array.from({ length: n + 1 + 2 * SPARE }, (_, i) => rate((i - SPARE) / rateHz)[axis]!),
  ) as [Float64Array, Float64Array, Float64Array];
  const turns = new Float64Array(3 * n);
  turnsBetween(gyro, SPARE, SPARE + n, new Float64Array(3), 0, [1, 1, 1], 1 / rateHz, turns);
  const q = Float64Array.from(start);
  for (let i = 0; i < n; i++) turnInPlace(q, 0, turns, 3 * i);
  return [...q] as Quaternion;
}

function angleBetween(a: Quaternion, b: Quaternion): number {
  const d = multiply(conjugate(a), b);
  return 2 * Math.asin(Math.min(1, Math.hypot(d[1], d[2], d[3])));
}

describe('strapdown integration', () => {
  test('a constant rate: closed form to 1e-9 rad after 100 s', () => {
    const rate: [number, number, number] = [0.3, -1.1, 2.2];
    const end = integrate(() => rate, 100, 100, [1, 0, 0, 0]);
    const expected = fromRotationVector([30, -110, 220]);
    // 10,000 products in doubles: rounding grows to some 1e-12.
    expect(angleBetween(end, expected)).toBeLessThan(1e-9);
  });

  test('coning: closed form to 1e-9 rad, where the plain trapezoid drifts', () => {
    // Source: Bortz (1971): an axis that moves on a cone of half angle a at frequency w turns at
    // (w sin a (-sin wt), w sin a cos wt, ...); here built from the attitude itself, so no formula is trusted.
    const a = 0.02;
    const w = 2 * Math.PI * 2;
    const attitude = (t: number): Quaternion =>
      fromRotationVector([a * Math.cos(w * t), a * Math.sin(w * t), 0]);
    const rate = (t: number): [number, number, number] => {
      // Closed-form body rate of that attitude: w = 2 q* dq/dt.
      const s = Math.sin(a / 2);
      const q = attitude(t);
      const dq: Quaternion = [0, -s * w * Math.sin(w * t), s * w * Math.cos(w * t), 0];
      const product = multiply(conjugate(q), dq);
      return [2 * product[1], 2 * product[2], 2 * product[3]];
    };
    const seconds = 10;
    const end = integrate(rate, seconds, 1000, attitude(0));
    expect(angleBetween(end, attitude(seconds))).toBeLessThan(1e-9);

    // The test bites: without the coning term the attitude drifts by more than a hundred times as much.
    const q = Float64Array.from(attitude(0));
    for (let i = 0; i < seconds * 1000; i++) {
      const [x0, y0, z0] = rate(i / 1000);
      const [x1, y1, z1] = rate((i + 1) / 1000);
      turnInPlace(q, 0, Float64Array.of((x0 + x1) / 2000, (y0 + y1) / 2000, (z0 + z1) / 2000), 0);
    }
    expect(angleBetween([...q] as Quaternion, attitude(seconds))).toBeGreaterThan(1e-7);
  });
});
