import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import { clusterBootstrap } from '../../src/stats/bootstrap.js';
import { signFlipTest } from '../../src/stats/permutation.js';
import { robustLine } from '../../src/stats/robust-line.js';
import { mean } from '../../src/stats/summary.js';

// Source: data/stats/resampling.py, scipy 1.10.1.
const reference = JSON.parse(
  readFileSync(new URL('./data/stats/resampling.json', import.meta.url), 'utf8'),
) as {
  skewed: number[];
  bootstrap: Record<'mean' | 'deviation', Record<'percentile' | 'BCa', [number, number, number]>>;
  differences: number[];
  many: number[];
  signFlip: Record<'differences' | 'many', Record<'two-sided' | 'less' | 'greater', number>>;
  line: { x: number[]; y: number[]; slope: number; intercept: number; low: number; high: number };
};

const each = (values: ArrayLike<number>) => Array.from(values, (_, i) => i);

describe('clusterBootstrap with a cluster an item is the ordinary bootstrap', () => {
  const { skewed } = reference;
  test.each(['percentile', 'BCa'] as const)('%s intervals of scipy.stats.bootstrap', (method) => {
    const results = clusterBootstrap(
      each(skewed),
      2,
      (indices, out) => {
        let sum = 0;
        let squares = 0;
        for (const i of indices) {
          sum += skewed[i]!;
          squares += skewed[i]! ** 2;
        }
        out[0] = sum / indices.length;
        out[1] = Math.sqrt(squares / indices.length - out[0] ** 2);
      },
      { seed: 5, replicates: 200_000, confidence: 0.9, interval: method === 'BCa' ? 'bca' : 'percentile' },
    );
    (['mean', 'deviation'] as const).forEach((name, s) => {
      const [low, high, standardError] = reference.bootstrap[name][method];
      // Tolerance: a percentile of 2e5 replicates has a standard error of 0.005 of theirs; 4 of them.
      const tolerance = 0.02 * standardError;
      expect(Math.abs(results[s]!.low - low), `${name} low`).toBeLessThan(tolerance);
      expect(Math.abs(results[s]!.high - high), `${name} high`).toBeLessThan(tolerance);
      expect(Math.abs(results[s]!.standardError / standardError - 1)).toBeLessThan(0.01);
    });
    expect(results[0]!.estimate).toBeCloseTo(mean(skewed), 12);
  });
});

describe('signFlipTest against scipy.stats.permutation_test (permutation_type samples)', () => {
  test.each(['two-sided', 'less', 'greater'] as const)('%s, exact and by chance', (alternative) => {
    const few = signFlipTest(reference.differences, each(reference.differences), { seed: 1, alternative });
    expect(few.exact).toBe(true);
    // Both count all 1024 assignments: equal to the last bit.
    expect(few.pValue).toBe(reference.signFlip.differences[alternative]);

    const replicates = 200_000;
    const many = signFlipTest(reference.many, each(reference.many), { seed: 1, alternative, replicates });
    expect(many.exact).toBe(false);
    const p = reference.signFlip.many[alternative];
    // Tolerance: 4 binomial standard errors.
    expect(Math.abs(many.pValue - p)).toBeLessThan(4 * Math.sqrt((p * (1 - p)) / replicates));
  });
});

test('robustLine against scipy.stats.theilslopes, with ties in x and y', () => {
  const { x, y, slope, intercept, low, high } = reference.line;
  const line = robustLine(x, y);
  // Tolerance: the same divisions in another order.
  expect(line.slope).toBeCloseTo(slope, 13);
  expect(line.intercept).toBeCloseTo(intercept, 12);
  expect(line.slopeLow).toBeCloseTo(low, 13);
  expect(line.slopeHigh).toBeCloseTo(high, 13);
});
