import { describe, expect, test } from 'vitest';
import { holmAdjusted } from '../../src/stats/holm.js';
import { signFlipTest } from '../../src/stats/permutation.js';
import { randomStream } from '../../src/stats/random.js';

describe('signFlipTest', () => {
  test('all of one sign: the smallest p is 2^(1 - clusters)', () => {
    const result = signFlipTest([1, 2, 3, 4, 5], ['a', 'b', 'c', 'd', 'e'], { seed: 1 });
    expect(result).toEqual({ meanDifference: 3, pValue: 2 / 32, clusters: 5, exact: true });
  });

  test('a walker counts once, however many walks', () => {
    const of = [...Array(20).keys()].map((i) => (i < 10 ? 'a' : 'b'));
    expect(signFlipTest(Array(20).fill(1), of, { seed: 1 }).pValue).toBe(0.5);
  });

  test('no difference at all gives p = 1', () => {
    expect(signFlipTest([0, 0, 0], ['a', 'b', 'c'], { seed: 1 }).pValue).toBe(1);
  });

  test('sums that only rounding tells apart count as equal', () => {
    // Of the 16 assignments 14 have a sum of at least 0.2 in size, counted by hand in tenths; plain
    // comparison finds 12.
    const result = signFlipTest([-0.4, -0.2, -0.1, 0.5], ['a', 'b', 'c', 'd'], { seed: 1 });
    expect(result.pValue).toBe(14 / 16);
  });

  test('rejects as often as its level when nothing differs', () => {
    let rejected = 0;
    for (let trial = 0; trial < 400; trial++) {
      const random = randomStream(trial, 'level');
      const differences = Array.from({ length: 45 }, (_, i) => (i % 3 === 0 ? 2 : 1) * random.normal());
      const of = differences.map((_, i) => Math.floor(i / 3));
      if (signFlipTest(differences, of, { seed: trial, replicates: 500 }).pValue <= 0.1) rejected++;
    }
    // Tolerance: 40 expected, 4 standard deviations of 6.
    expect(Math.abs(rejected - 40)).toBeLessThan(24);
  });

  test('the seed decides the random assignments, and nothing else does', () => {
    const differences = Array.from({ length: 20 }, (_, i) => Math.sin(i) + 0.2);
    const of = differences.map((_, i) => i);
    const p = (seed: number) => signFlipTest(differences, of, { seed, replicates: 999 }).pValue;
    expect(p(1)).toBe(p(1));
    expect(p(1)).not.toBe(p(2));
  });

  test('refusals', () => {
    expect(() => signFlipTest([], [], { seed: 1 })).toThrow(
      'signFlipTest: needs at least one difference, got none',
    );
    expect(() => signFlipTest([1, Number.NaN], ['a', 'b'], { seed: 1 })).toThrow(
      'signFlipTest: difference 1 is NaN',
    );
    expect(() => signFlipTest([1], [], { seed: 1 })).toThrow(
      'signFlipTest: 1 differences need 1 clusters, got 0',
    );
    expect(() => signFlipTest([1], ['a'], { seed: 1, replicates: 5 })).toThrow(
      'permutation replicates must be a whole number of at least 100, got 5',
    );
  });
});

describe('holmAdjusted', () => {
  test('worked example, in the order given', () => {
    // Worked by hand: 0.005×4, 0.01×3, 0.03×2, then 0.04 carried up to 0.06.
    const adjusted = holmAdjusted([0.01, 0.04, 0.03, 0.005]);
    [0.03, 0.06, 0.06, 0.02].forEach((p, i) => {
      expect(adjusted[i]).toBeCloseTo(p, 15);
    });
  });

  test('never above 1, empty stays empty', () => {
    expect([...holmAdjusted([0.9, 0.8])]).toEqual([1, 1]);
    expect(holmAdjusted([])).toHaveLength(0);
  });

  test('refuses NaN', () => {
    expect(() => holmAdjusted([0.1, Number.NaN])).toThrow('holmAdjusted: p value 1 must be in 0..1, got NaN');
  });
});
