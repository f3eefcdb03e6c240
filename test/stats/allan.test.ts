import { describe, expect, test } from 'vitest';
import { type AllanKind, allanDeviation } from '../../src/stats/allan.js';
import { equivalentDegreesOfFreedom } from '../../src/stats/allan-degrees.js';
import { randomStream } from '../../src/stats/random.js';

function whiteNoise(n: number, seed: number): Float64Array {
  const random = randomStream(seed, 'white');
  return Float64Array.from({ length: n }, () => random.normal());
}

function summed(samples: Float64Array): Float64Array {
  let sum = 0;
  return samples.map((x) => (sum += x));
}

const differenced = (x: Float64Array) => x.map((v, i) => v - (x[i - 1] ?? 0));

describe('allanDeviation', () => {
  test('white noise: sigma at one sample, falling with the root of tau', () => {
    const fs = 50;
    const a = allanDeviation(whiteNoise(200_000, 1), fs, 'overlapping-allan', [0.02, 0.2, 2, 20]);
    [1, Math.sqrt(0.1), 0.1, Math.sqrt(0.001)].forEach((expected, k) => {
      // Tolerance: 4 standard errors of a deviation with the stated degrees of freedom.
      expect(Math.abs(a.deviation[k]! / expected - 1)).toBeLessThan(
        4 / Math.sqrt(2 * a.degreesOfFreedom[k]!),
      );
    });
    expect(a.noiseExponent).toEqual([0, 0, 0, 0]);
  });

  test('a constant offset changes nothing, a steady drift nothing of Hadamard', () => {
    const noise = whiteNoise(5000, 2);
    const plain = allanDeviation(noise, 10);
    const offset = allanDeviation(
      noise.map((x) => x + 1e6),
      10,
    );
    // Tolerance: an ulp of 1e6 is 1e-10 a sample.
    plain.deviation.forEach((d, k) => {
      expect(offset.deviation[k]! / d).toBeCloseTo(1, 7);
    });
    const drift = noise.map((x, i) => x + 0.01 * i);
    const steady = allanDeviation(noise, 10, 'overlapping-hadamard');
    const drifting = allanDeviation(drift, 10, 'overlapping-hadamard');
    steady.deviation.forEach((d, k) => {
      expect(drifting.deviation[k]! / d).toBeCloseTo(1, 7);
    });
    expect(allanDeviation(drift, 10).deviation.at(-1)).toBeGreaterThan(plain.deviation.at(-1)! * 10);
  });

  test('a pure drift R has R tau/√2', () => {
    // Source: IEEE Std 952-1997, annex C (rate ramp).
    const ramp = Float64Array.from({ length: 1000 }, (_, i) => 0.03 * (i / 20));
    const a = allanDeviation(ramp, 20, 'overlapping-allan', [1, 5]);
    expect(a.deviation[0]).toBeCloseTo(0.03 / Math.SQRT2, 9);
    expect(a.deviation[1]).toBeCloseTo((5 * 0.03) / Math.SQRT2, 9);
  });

  test('tells the noises apart', () => {
    const white = whiteNoise(20_000, 3);
    const exponents = (rate: Float64Array) =>
      allanDeviation(rate, 1, 'overlapping-allan', [1, 10]).noiseExponent;
    expect(exponents(white)).toEqual([0, 0]);
    expect(exponents(summed(white))).toEqual([-2, -2]);
    expect(exponents(differenced(white))).toEqual([2, 2]);
  });

  test('the interval covers the truth as often as it says', () => {
    let hits = 0;
    const trials = 600;
    for (let seed = 0; seed < trials; seed++) {
      const a = allanDeviation(whiteNoise(400, seed), 1, 'overlapping-allan', [40], 0.9);
      if (a.low[0]! <= 1 / Math.sqrt(40) && a.high[0]! >= 1 / Math.sqrt(40)) hits++;
    }
    // Tolerance: 90 %, 4 binomial standard errors of 1.2 %; about ten averages misjudge the noise now and then.
    expect(Math.abs(hits / trials - 0.9)).toBeLessThan(0.05);
  });

  test('default averaging times rise to a fifth of the record', () => {
    const a = allanDeviation(whiteNoise(1000, 1), 10);
    expect(a.tauS[0]).toBe(0.1);
    expect(a.tauS.at(-1)).toBeLessThanOrEqual(20);
    expect([...a.tauS]).toEqual([...new Set(a.tauS)].sort((x, y) => x - y));
  });

  test('a sensor that repeats one value has none', () => {
    expect([...allanDeviation(new Float64Array(20).fill(0.3), 1).deviation]).toEqual([0, 0, 0, 0]);
  });

  test('refusals', () => {
    const three = new Float64Array(3);
    expect(() => allanDeviation(new Float64Array(0), 1)).toThrow(
      'allanDeviation: overlapping-allan needs at least 2 samples, got 0',
    );
    expect(() => allanDeviation(Float64Array.of(1, Number.NaN, 2), 1)).toThrow(
      'allanDeviation: sample 1 is NaN',
    );
    expect(() => allanDeviation(three, 0)).toThrow(
      'allanDeviation: sampleRateHz must be a finite number above 0, got 0',
    );
    expect(() => allanDeviation(three, 1, 'time', [2])).toThrow(
      'allanDeviation: tau must be within 1..1 (s) for time of 3 samples at 1 Hz, got 2',
    );
    expect(() => allanDeviation(three, 1, 'time', [1], 1)).toThrow(
      'allanDeviation: confidence must be between 0 and 1, got 1',
    );
  });
});

describe('equivalentDegreesOfFreedom', () => {
  test('white noise: the formula of Howe, Allan & Barnes', () => {
    // Source: NIST SP 1065, table 5 (from memory):
    // (3(N - 1)/(2m) - 2(N - 2)/N) · 4m²/(4m² + 5), with N phase points.
    for (const [n, m] of [
      [513, 1],
      [513, 4],
      [1001, 10],
      [1001, 100],
    ] as const) {
      const formula = ((3 * (n - 1)) / (2 * m) - (2 * (n - 2)) / n) * ((4 * m * m) / (4 * m * m + 5));
      // Tolerance: the formula is an empirical fit; it and the sum differ by up to 3 %.
      expect(equivalentDegreesOfFreedom(0, 2, m, n, false) / formula).toBeCloseTo(1, 1);
      expect(Math.abs(equivalentDegreesOfFreedom(0, 2, m, n, false) / formula - 1)).toBeLessThan(0.03);
    }
  });

  test.each<[AllanKind, string, 2 | 3, boolean, 2 | 0 | -2, number]>([
    ['overlapping-allan', 'white', 2, false, 0, 8],
    ['overlapping-allan', 'random walk', 2, false, -2, 30],
    ['overlapping-allan', 'white phase', 2, false, 2, 30],
    ['modified-allan', 'white', 2, true, 0, 30],
    ['overlapping-hadamard', 'white', 3, false, 0, 30],
  ])('%s of %s noise scatters as stated', (kind, _, order, modified, exponent, m) => {
    const n = 256;
    const trials = 1500;
    let sum = 0;
    let squares = 0;
    for (let seed = 0; seed < trials; seed++) {
      const white = whiteNoise(n, seed);
      const rate = exponent === 0 ? white : exponent === 2 ? differenced(white) : summed(white);
      const variance = allanDeviation(rate, 1, kind, [m]).deviation[0]! ** 2;
      sum += variance;
      squares += variance ** 2;
    }
    const mean = sum / trials;
    const seen = (2 * mean * mean) / (squares / trials - mean * mean);
    // Tolerance: the scatter of 1500 variances is known to √(2/1500) = 4 %, more where they are skew; 4 of them
    // less the skew.
    expect(Math.abs(equivalentDegreesOfFreedom(exponent, order, m, n + 1, modified) / seen - 1)).toBeLessThan(
      0.15,
    );
  });

  test('thinned lags change little', () => {
    // At the same ratio of record to averaging time, just below and far above the number of lags kept.
    for (const exponent of [0, -1, -2] as const) {
      const kept = equivalentDegreesOfFreedom(exponent, 2, 150, 150 * 40 + 1, false);
      const thinned = equivalentDegreesOfFreedom(exponent, 2, 15_000, 15_000 * 40 + 1, false);
      // Tolerance: the sums approach an integral; at 150 points an averaging time they are there within 1 %.
      expect(Math.abs(thinned / kept - 1)).toBeLessThan(0.01);
    }
  });
});
