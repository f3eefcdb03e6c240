import { describe, expect, test } from 'vitest';
import { clusterBootstrap, type IndexStatistics } from '../../src/stats/bootstrap.js';
import { groupByCluster } from '../../src/stats/cluster-resampling.js';
import { randomStream } from '../../src/stats/random.js';

const meanOf =
  (values: ArrayLike<number>): IndexStatistics =>
  (indices, out) => {
    let sum = 0;
    for (const i of indices) sum += values[i]!;
    out[0] = sum / indices.length;
  };

describe('groupByCluster', () => {
  test('clusters in the order of their first item, items ascending', () => {
    const g = groupByCluster(['b', 'a', 'b', 'c', 'a']);
    expect(g.nClusters).toBe(3);
    expect([...g.items]).toEqual([0, 2, 1, 4, 3]);
    expect([...g.starts]).toEqual([0, 2, 4, 5]);
  });
});

describe('clusterBootstrap', () => {
  const values = [1, 2, 3, 10, 11, 12, 5, 6];
  const walkers = ['a', 'a', 'a', 'b', 'b', 'b', 'c', 'c'];

  test('same seed, same interval; another seed, another', () => {
    const run = (seed: number) => clusterBootstrap(walkers, 1, meanOf(values), { seed });
    expect(run(3)).toEqual(run(3));
    expect(run(3)).not.toEqual(run(4));
    expect(run(3)[0]!.estimate).toBe(6.25);
  });

  test('standard error of a mean of clusters, whole and drawn again inside', () => {
    // Two clusters of two: mean of the data 3; whole clusters draw means 1, 3, 3, 5 with equal chance,
    // variance 2; drawing inside adds the mean of within variances: each item deviates by 1, four drawn
    // independently: 1/4. Worked by hand.
    const paired = [0, 2, 4, 6];
    const of = ['a', 'a', 'b', 'b'];
    const options = { seed: 1, replicates: 100_000, interval: 'percentile' } as const;
    const whole = clusterBootstrap(of, 1, meanOf(paired), { ...options, inner: 'all' })[0]!;
    const both = clusterBootstrap(of, 1, meanOf(paired), options)[0]!;
    // Tolerance: 4 standard errors of a standard deviation of 1e5 draws, 0.9 %.
    expect(Math.abs(whole.standardError / Math.SQRT2 - 1)).toBeLessThan(0.009);
    expect(Math.abs(both.standardError / 1.5 - 1)).toBeLessThan(0.009);
  });

  test('covers the truth as often as it says, where drawing walks alone does not', () => {
    // 16 walkers of 6 walks, spread between walkers twice that inside.
    const [nWalkers, nWalks, trials] = [16, 6, 300];
    const of = Array.from({ length: nWalkers * nWalks }, (_, i) => Math.floor(i / nWalks));
    const hits = { walkers: 0, walks: 0 };
    for (let trial = 0; trial < trials; trial++) {
      const random = randomStream(trial, 'coverage');
      const sample = new Float64Array(of.length);
      for (let w = 0; w < nWalkers; w++) {
        const own = 2 * random.normal();
        for (let k = 0; k < nWalks; k++) sample[w * nWalks + k] = own + random.normal();
      }
      const options = { seed: trial, replicates: 400 };
      const clustered = clusterBootstrap(of, 1, meanOf(sample), options)[0]!;
      const naive = clusterBootstrap(
        of.map((_, i) => i),
        1,
        meanOf(sample),
        options,
      )[0]!;
      if (clustered.low <= 0 && clustered.high >= 0) hits.walkers++;
      if (naive.low <= 0 && naive.high >= 0) hits.walks++;
    }
    // Tolerance: 95 % less the known shortfall of about 3 % with 16 clusters, ±2 standard errors of 1.3 %.
    expect(hits.walkers / trials).toBeGreaterThan(0.89);
    expect(hits.walkers / trials).toBeLessThan(0.98);
    // The design effect 1 + 5 × 0.8 = 5 makes the naive interval less than half as wide as it should be.
    expect(hits.walks / trials).toBeLessThan(0.75);
  });

  test('a constant has an interval of no width', () => {
    const [result] = clusterBootstrap(['a', 'b', 'c'], 1, meanOf([4, 4, 4]), { seed: 1 });
    expect(result).toEqual({ estimate: 4, low: 4, high: 4, standardError: 0 });
  });

  test('refusals', () => {
    const run = (of: string[], statistic: IndexStatistics, more = {}) =>
      clusterBootstrap(of, 1, statistic, { seed: 1, ...more });
    expect(() => run([], meanOf([]))).toThrow('groupByCluster: needs at least one item, got none');
    expect(() => run(['a', 'a'], meanOf([1, 2]))).toThrow(
      'a cluster bootstrap needs at least 2 clusters, got 1',
    );
    expect(() => run(['a', 'b'], meanOf([1, Number.NaN]))).toThrow(
      'bootstrap: statistic 0 of the data is NaN',
    );
    expect(() => run(['a', 'b'], meanOf([1, 2]), { replicates: 10 })).toThrow(
      'bootstrap replicates must be a whole number of at least 100, got 10',
    );
    expect(() => run(['a', 'b'], meanOf([1, 2]), { confidence: 95 })).toThrow(
      'bootstrap confidence must be between 0 and 1, got 95',
    );
  });
});
