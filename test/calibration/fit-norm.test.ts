import { describe, expect, test } from 'vitest';
import { fitNorm } from '../../src/calibration/fit-norm.js';
import { drawnReadings, TRUE_BIAS, TRUE_MATRIX } from './draws.js';

const G = 9.81;

describe('fitNorm', () => {
  test('readings without noise give the parameters back', () => {
    const fit = fitNorm(drawnReadings(1, 40, G, 0), G, 'full');
    for (let a = 0; a < 3; a++) expect(fit.bias[a]).toBeCloseTo(TRUE_BIAS[a]!, 7);
    for (let k = 0; k < 9; k++) expect(fit.matrix[k]).toBeCloseTo(TRUE_MATRIX[k]!, 7);
    expect(fit.residual).toBeLessThan(1e-8);
  });

  test('with noise: nine parameters within 4 standard errors in each of 20 draws, the errors of the right size', () => {
    let square = 0;
    let count = 0;
    for (let seed = 1; seed <= 20; seed++) {
      const fit = fitNorm(drawnReadings(seed, 60, G, 0.02), G, 'full');
      const check = (value: number, truth: number, sd: number) => {
        // Beyond four of 180 draws from a normal distribution lies one in ninety such tests.
        expect(Math.abs(value - truth)).toBeLessThan(4 * sd);
        square += ((value - truth) / sd) ** 2;
        count++;
      };
      for (let a = 0; a < 3; a++) check(fit.bias[a]!, TRUE_BIAS[a]!, fit.biasSd[a]!);
      for (const k of [0, 4, 8, 1, 2, 5]) check(fit.matrix[k]!, TRUE_MATRIX[k]!, fit.matrixSd[k]!);
    }
    // 180 squares of mean 1: their mean scatters by 0.105.
    expect(square / count).toBeGreaterThan(0.7);
    expect(square / count).toBeLessThan(1.35);
  });

  test('six poses along the axes determine zero and scales, and not the angles', () => {
    const along = [1, -1, 0, 0, 0, 0];
    const poses = [0, 2, 4].map((shift) =>
      Float64Array.from(along, (_, i) => G * along[(i + 6 - shift) % 6]!),
    );
    const raw = poses.map((axis, a) => axis.map((x) => x / TRUE_MATRIX[4 * a]! + TRUE_BIAS[a]!)) as [
      Float64Array,
      Float64Array,
      Float64Array,
    ];
    const fit = fitNorm(raw, G, 'scales');
    for (let a = 0; a < 3; a++) {
      expect(fit.bias[a]).toBeCloseTo(TRUE_BIAS[a]!, 9);
      expect(fit.matrix[4 * a]).toBeCloseTo(TRUE_MATRIX[4 * a]!, 9);
    }
    expect(() => fitNorm(raw, G, 'full')).toThrow(/needs at least 9 directions/);
  });

  test('a device turned about one axis only is refused: its zero along that axis shows nowhere', () => {
    const [x, y] = drawnReadings(2, 80, G, 0.01);
    const flat: [Float64Array, Float64Array, Float64Array] = [x, y, new Float64Array(80)];
    for (let i = 0; i < 80; i++) {
      const length = Math.hypot(x[i]!, y[i]!);
      x[i]! *= G / length;
      y[i]! *= G / length;
    }
    expect(() => fitNorm(flat, G, 'scales')).toThrow(/do not tell all parameters apart/);
  });

  test('readings near steel count less where asked', () => {
    const raw = drawnReadings(4, 200, 50, 0.3);
    for (let i = 0; i < 20; i++) raw[0][i]! += 15;
    const error = (robust: boolean) => {
      const { bias } = fitNorm(raw, 50, 'full', robust);
      return Math.hypot(...bias.map((b, a) => b - TRUE_BIAS[a]!));
    };
    expect(error(true)).toBeLessThan(0.5 * error(false));
  });
});
