import { describe, expect, test } from 'vitest';
import { allanDeviation } from '../../src/stats/allan.js';
import { fitNoise, fittedAllanDeviation, type NoiseFit } from '../../src/stats/noise-fit.js';
import { randomStream } from '../../src/stats/random.js';

/** White noise N, a random walk K and flicker noise B, at a sample rate. */
function noisyRate(
  n: number,
  fs: number,
  { N = 0, B = 0, K = 0 }: { N?: number; B?: number; K?: number },
  seed: number,
) {
  const random = randomStream(seed, 'noise-fit');
  let walk = 0;
  const rate = Float64Array.from({ length: n }, () => {
    walk += (K / Math.sqrt(fs)) * random.normal();
    return N * Math.sqrt(fs) * random.normal() + walk;
  });
  if (B === 0) return rate;
  // Flicker by fractional integration: Kasdin & Walter (1992), IEEE Frequency Control Symposium, 274-283.
  // Unit white input has the one-sided spectrum 1/(pi f), which IEEE Std 952 writes B²/(pi f) for B = 1.
  const response = new Float64Array(n);
  response[0] = 1;
  for (let k = 1; k < n; k++) response[k] = (response[k - 1]! * (k - 0.5)) / k;
  const input = Float64Array.from({ length: n }, () => B * random.normal());
  for (let i = 0; i < n; i++) for (let k = 0; k <= i; k++) rate[i]! += response[k]! * input[i - k]!;
  return rate;
}

const PARAMETERS = ['angleRandomWalk', 'biasInstability', 'rateRandomWalk'] as const;

function scatter(fits: NoiseFit[], name: (typeof PARAMETERS)[number]) {
  const values = fits.map((fit) => fit[name].value);
  const mean = values.reduce((sum, v) => sum + v, 0) / fits.length;
  const deviation = Math.sqrt(values.reduce((sum, v) => sum + (v - mean) ** 2, 0) / (fits.length - 1));
  const stated = fits.reduce((sum, fit) => sum + fit[name].standardError, 0) / fits.length;
  return { mean, deviation, stated };
}

describe('fitNoise', () => {
  test('white noise and random walk: right on average, scattering as stated', () => {
    const truth = { N: 0.01, K: 0.004 };
    const fits = Array.from({ length: 60 }, (_, seed) =>
      fitNoise(allanDeviation(noisyRate(10_000, 50, truth, seed), 50)),
    );
    const n = scatter(fits, 'angleRandomWalk');
    // Tolerance: 4 standard errors of the mean of 60; the scatter itself is known to 9 %, 3 of them.
    expect(Math.abs(n.mean - truth.N)).toBeLessThan((4 * n.deviation) / Math.sqrt(60));
    expect(Math.abs(n.stated / n.deviation - 1)).toBeLessThan(0.27);
    const k = scatter(fits, 'rateRandomWalk');
    // Bias instability, held at or above 0, takes a little of the random walk away.
    expect(Math.abs(k.mean - truth.K)).toBeLessThan(0.15 * truth.K);
    expect(Math.abs(k.stated / k.deviation - 1)).toBeLessThan(0.35);
    const misfit = fits.reduce((sum, fit) => sum + fit.chiSquare / fit.degreesOfFreedom, 0) / 60;
    // Tolerance: a chi-square of 18 over its degrees scatters by 1/3, the mean of 60 by 0.04.
    expect(Math.abs(misfit - 1)).toBeLessThan(0.2);
  });

  test('flicker noise: the bias instability of IEEE Std 952', () => {
    const truth = { N: 0.02, B: 0.02 };
    const fits = Array.from({ length: 30 }, (_, seed) =>
      fitNoise(allanDeviation(noisyRate(3000, 10, truth, seed), 10)),
    );
    const b = scatter(fits, 'biasInstability');
    // Tolerance: 4 standard errors of the mean of 30; the scatter itself is known to 13 %, 3 of them.
    expect(Math.abs(b.mean - truth.B)).toBeLessThan((4 * b.deviation) / Math.sqrt(30));
    expect(Math.abs(b.stated / b.deviation - 1)).toBeLessThan(0.4);
  });

  test('readings off the fitted curve are those of the standard', () => {
    const one = (value: number) => ({ value, standardError: 0 });
    const curve = (n: number, b: number, k: number): NoiseFit => ({
      angleRandomWalk: one(n),
      biasInstability: one(b),
      rateRandomWalk: one(k),
      ...{ chiSquare: 0, degreesOfFreedom: 1, tauS: [] },
    });
    // Source: IEEE Std 952-1997, annex C: N at 1 s, K at 3 s, 0.664 B anywhere.
    expect(fittedAllanDeviation(curve(0.3, 0, 0), 1)).toBeCloseTo(0.3, 14);
    expect(fittedAllanDeviation(curve(0, 0, 0.3), 3)).toBeCloseTo(0.3, 14);
    expect(fittedAllanDeviation(curve(0, 1, 0), 70)).toBeCloseTo(0.664282, 5);
  });

  test('a range of averaging times leaves the rest out', () => {
    const allan = allanDeviation(noisyRate(10_000, 50, { N: 0.01 }, 1), 50);
    const fit = fitNoise(allan, { fromS: 0.1, toS: 10 });
    expect(fit.tauS[0]).toBeGreaterThanOrEqual(0.1);
    expect(fit.tauS.at(-1)).toBeLessThanOrEqual(10);
    // Tolerance: 4 stated standard errors.
    expect(Math.abs(fit.angleRandomWalk.value - 0.01)).toBeLessThan(4 * fit.angleRandomWalk.standardError);
  });

  test('refusals', () => {
    const noise = noisyRate(1000, 10, { N: 1 }, 1);
    expect(() => fitNoise(allanDeviation(noise, 10, 'modified-allan'))).toThrow(
      'fitNoise: needs overlapping-allan deviations, got modified-allan',
    );
    expect(() => fitNoise(allanDeviation(noise, 10, 'overlapping-allan', [1, 2]))).toThrow(
      'fitNoise: needs at least 4 averaging times a factor 1.4 apart up to a fifth of the record, got 2; record for longer or widen the range',
    );
    expect(() => fitNoise(allanDeviation(new Float64Array(1000), 10))).toThrow(
      'fitNoise: an Allan deviation is 0; the sensor repeats one value',
    );
  });
});
