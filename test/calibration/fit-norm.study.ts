import { expect, test } from 'vitest';
import { fitNorm } from '../../src/calibration/fit-norm.js';
import { drawnReadings, TRUE_BIAS, TRUE_MATRIX } from './draws.js';

test.each([
  ['accelerometer, 24 poses', 24, 9.81, 0.01],
  ['magnetometer, 600 readings', 600, 49, 0.5],
])(
  '%s: 100 devices, parameters within 3 standard errors, standard errors of the observed size',
  (_what, count, radius, noise) => {
    const ratios: number[][] = Array.from({ length: 9 }, () => []);
    let within = 0;
    for (let seed = 1; seed <= 100; seed++) {
      const fit = fitNorm(drawnReadings(seed, count, radius, noise), radius, 'full');
      const z = [
        ...fit.bias.map((b, a) => (b - TRUE_BIAS[a]!) / fit.biasSd[a]!),
        ...[0, 4, 8, 1, 2, 5].map((k) => (fit.matrix[k]! - TRUE_MATRIX[k]!) / fit.matrixSd[k]!),
      ];
      for (const [p, value] of z.entries()) ratios[p]!.push(value);
      within += z.filter((value) => Math.abs(value) < 3).length;
    }
    const spread = ratios.map((z) => Math.sqrt(z.reduce((sum, x) => sum + x * x, 0) / z.length));
    console.log(
      `within 3 standard errors: ${within} of 900; spread over standard error: ${spread.map((s) => s.toFixed(2)).join(' ')}`,
    );
    expect(within).toBeGreaterThanOrEqual(891);
    for (const s of spread) expect(Math.abs(s - 1)).toBeLessThan(0.2);
  },
);
