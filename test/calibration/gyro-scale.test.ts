import { expect, test } from 'vitest';
import { fitGyroScale, type PoseChange } from '../../src/calibration/gyro-scale.js';
import { randomStream } from '../../src/stats/random.js';

const TRUE_SCALE = [1.03, 0.98, 1.01];

/** A turn about a fixed axis of the device in a second, as a gyroscope of the wrong scale reads it. */
function turnAbout(
  axis: readonly number[],
  angle: number,
  before: readonly number[],
  noise: () => number,
): PoseChange {
  const length = Math.hypot(...axis);
  const u = axis.map((x) => x / length);
  const n = 200;
  const rate = [0, 1, 2].map((a) =>
    Float64Array.from({ length: n }, () => (angle * u[a]!) / TRUE_SCALE[a]! + noise()),
  );
  // Gravity turns the other way in the device.
  const [c, s] = [Math.cos(-angle), Math.sin(-angle)];
  const dot = u.reduce((sum, x, a) => sum + x * before[a]!, 0);
  const cross = [
    u[1]! * before[2]! - u[2]! * before[1]!,
    u[2]! * before[0]! - u[0]! * before[2]!,
    u[0]! * before[1]! - u[1]! * before[0]!,
  ];
  const after = before.map((x, a) => x * c + cross[a]! * s + u[a]! * dot * (1 - c));
  return {
    rate: rate as unknown as PoseChange['rate'],
    stepS: new Float64Array(n).fill(1 / n),
    before: before as unknown as PoseChange['before'],
    after: after as unknown as PoseChange['after'],
  };
}

/** Turns of 60 to 170 degrees about random axes from random poses. */
function changesOf(seed: number, count: number, noise: number): PoseChange[] {
  const random = randomStream(seed, 'gyro scale');
  const vector = () => {
    const v = [random.normal(), random.normal(), random.normal()];
    const length = Math.hypot(...v);
    return v.map((x) => x / length);
  };
  return Array.from({ length: count }, () =>
    turnAbout(vector(), 1 + 2 * random.uniform(), vector(), () => noise * random.normal()),
  );
}

test('without noise the scales come back', () => {
  const { scale, residual } = fitGyroScale(changesOf(1, 12, 0));
  for (let a = 0; a < 3; a++) expect(scale[a]).toBeCloseTo(TRUE_SCALE[a]!, 6);
  expect(residual).toBeLessThan(1e-6);
});

test('with noise: within 4 standard errors in 30 draws, the errors of the right size', () => {
  let square = 0;
  for (let seed = 1; seed <= 30; seed++) {
    const { scale, scaleSd } = fitGyroScale(changesOf(seed, 20, 0.2));
    for (let a = 0; a < 3; a++) {
      const z = (scale[a]! - TRUE_SCALE[a]!) / scaleSd[a]!;
      expect(Math.abs(z)).toBeLessThan(4);
      square += z * z;
    }
  }
  // 90 squares of mean 1: their mean scatters by 0.15.
  expect(square / 90).toBeGreaterThan(0.55);
  expect(square / 90).toBeLessThan(1.6);
});

test('an axis that was not turned about is refused', () => {
  const changes = [0.9, 1.4, 2, 2.6, 1.1, 1.8].map((angle) =>
    turnAbout([0, 0, 1], angle, [1, 0, 0], () => 0),
  );
  expect(() => fitGyroScale(changes)).toThrow(
    /scale of [xy] is known to .* only|turn the device about that axis/,
  );
  expect(() => fitGyroScale(changes.slice(0, 3))).toThrow(/needs at least 4 turns/);
});
