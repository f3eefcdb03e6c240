import { describe, expect, test } from 'vitest';
import { median, quantile } from '../../src/stats/quantile.js';
import {
  mean,
  medianAbsoluteDeviation,
  rootMeanSquare,
  standardDeviation,
  weightedMedian,
} from '../../src/stats/summary.js';

describe('quantile', () => {
  test('type 7 on a sample where the conventions differ', () => {
    // Source: numpy 1.24.2, numpy.quantile([1, 2, 3, 4, 10], p) (method "linear"); exact in decimals.
    const sample = [10, 1, 3, 2, 4];
    expect([0, 0.25, 0.5, 0.75, 1].map((p) => quantile(sample, p))).toEqual([1, 2, 3, 4, 10]);
    expect(quantile(sample, 0.9)).toBeCloseTo(7.6, 14);
    expect(sample).toEqual([10, 1, 3, 2, 4]);
  });

  test('one value is every quantile; a constant stays itself', () => {
    expect(quantile([7], 0.95)).toBe(7);
    expect(quantile([0.1, 0.1, 0.1], 0.37)).toBe(0.1);
  });

  test('median of an even number is the mean of the two in the middle', () => {
    expect(median([4, 1, 3, 2])).toBe(2.5);
  });

  test('sorts by value, not by text', () => {
    expect(median([100, 9, 20])).toBe(20);
  });

  test('refusals', () => {
    expect(() => quantile([], 0.5)).toThrow('quantile: needs at least one value, got none');
    expect(() => quantile([1, Number.NaN], 0.5)).toThrow('every value must be finite, value 1 is NaN');
    expect(() => quantile([1, 2], 1.5)).toThrow('quantile: probability must be in 0..1, got 1.5');
    expect(() => quantile([1, 2], Number.NaN)).toThrow('quantile: probability must be in 0..1, got NaN');
  });
});

describe('mean, standardDeviation', () => {
  test('NIST StRD NumAcc4', () => {
    // Source: NIST Statistical Reference Datasets, univariate, NumAcc4 ("higher" difficulty).
    // Data as published: 10000000.2, then 500 × (10000000.1, 10000000.3). Certified: 10000000.2 and 0.1.
    const samples = Float64Array.from({ length: 1001 }, (_, i) =>
      i === 0 ? 10000000.2 : i % 2 === 1 ? 10000000.1 : 10000000.3,
    );
    expect(mean(samples)).toBeCloseTo(10000000.2, 8);
    // Tolerance: one ulp at 1e7 is 1.9e-9, so storing the inputs alone costs about 1e-8 relative.
    expect(Math.abs(standardDeviation(samples) / 0.1 - 1)).toBeLessThan(2e-8);
  });

  test('refusals', () => {
    expect(() => mean([])).toThrow('mean: needs at least one value, got none');
    expect(() => mean([1, Number.NaN])).toThrow('mean: value 1 is NaN');
    expect(() => standardDeviation([1])).toThrow('standardDeviation: needs at least 2 values, got 1');
  });
});

describe('rootMeanSquare', () => {
  test('bias counts', () => {
    expect(rootMeanSquare([3, -4])).toBe(Math.sqrt(12.5));
    expect(rootMeanSquare([2, 2, 2])).toBe(2);
  });
  test('refusals', () => {
    expect(() => rootMeanSquare([])).toThrow('rootMeanSquare: needs at least one value, got none');
    expect(() => rootMeanSquare([Number.NaN])).toThrow('rootMeanSquare: value 0 is NaN');
  });
});

describe('medianAbsoluteDeviation', () => {
  test('a wild value leaves it alone', () => {
    // Worked by hand: median 2, deviations 1 1 0 0 2 4 7, their median 1.
    expect(medianAbsoluteDeviation([1, 1, 2, 2, 4, 6, 9])).toBe(1);
    expect(medianAbsoluteDeviation([1, 1, 2, 2, 4, 6, 9e9])).toBe(1);
  });
});

describe('weightedMedian', () => {
  test('equal weights give the median', () => {
    expect(weightedMedian([4, 1, 3], [2, 2, 2])).toBe(3);
    expect(weightedMedian([4, 1, 3, 2], [1, 1, 1, 1])).toBe(2.5);
  });
  test('a weight counts like copies', () => {
    expect(weightedMedian([1, 2, 10], [1, 1, 3])).toBe(10);
    expect(weightedMedian([1, 2, 10], [1, 2, 3])).toBe(6);
    expect(weightedMedian([1, 5, 10], [1, 0, 1])).toBe(5.5);
  });
  test('refusals', () => {
    expect(() => weightedMedian([], [])).toThrow('weightedMedian: needs at least one value, got none');
    expect(() => weightedMedian([1], [0])).toThrow('weightedMedian: the weights are all 0');
    expect(() => weightedMedian([1, 2], [1])).toThrow('weightedMedian: 2 values need 2 weights, got 1');
    expect(() => weightedMedian([1, 2], [1, Number.NaN])).toThrow(
      'weightedMedian: weights must be finite and at least 0, weight 1 is NaN',
    );
  });
});
