import { describe, expect, test } from 'vitest';
import { compareWalks, type PairedWalk } from '../../src/scores/paired-comparison.js';
import { randomStream } from '../../src/stats/random.js';

const walkOf = (i: number, a_m: number, b_m: number): PairedWalk => ({
  walk: `w${i}`,
  walker: `p${i % 8}`,
  group: i % 2 ? 'old' : 'young',
  carry: 'hand',
  passes: 5,
  a_m,
  b_m,
});

describe('compareWalks', () => {
  test('a constant gain: mean, percent, wins, and the smallest p that eight walkers allow', () => {
    const [all] = compareWalks(Array.from({ length: 16 }, (_, i) => walkOf(i, 4, 3)));
    expect(all).toMatchObject({
      walkers: 8,
      walks: 16,
      a_m: 4,
      b_m: 3,
      difference_m: -1,
      difference_pct: -25,
      wins: 16,
      losses: 0,
    });
    // Source: of 2^8 assignments of signs two are as extreme (Winkler et al. 2014, whole-block flips).
    expect(all!.p).toBeCloseTo(2 / 256, 12);
    expect([all!.low_m, all!.high_m]).toEqual([-1, -1]);
  });

  test('p values of several groups are corrected, the one of all walks is not', () => {
    const random = randomStream(4, 'pairs');
    const groups = compareWalks(
      Array.from({ length: 32 }, (_, i) => walkOf(i, 4 + random.normal(), 3.6 + random.normal())),
    );
    expect(groups.map(({ by, value }) => `${by} ${value}`)).toEqual(['all all', 'group old', 'group young']);
    expect(groups[0]!.p_adjusted).toBe(groups[0]!.p);
    const [old, young] = [groups[1]!, groups[2]!];
    // Holm (1979): the smaller of two is doubled, the larger stays or rises to that.
    const small = Math.min(old.p, young.p);
    expect(Math.min(old.p_adjusted, young.p_adjusted)).toBeCloseTo(Math.min(1, 2 * small), 12);
  });

  test('one walker gives no interval', () => {
    const [all] = compareWalks([
      { ...walkOf(0, 2, 1), walker: 'p' },
      { ...walkOf(1, 2, 1.5), walker: 'p' },
    ]);
    expect(all!.low_m).toBeNaN();
    expect(all!.p).toBe(1);
  });

  test('false alarms: of 300 comparisons of like recipes about one in twenty is below 0.05', () => {
    let alarms = 0;
    for (let seed = 0; seed < 300; seed++) {
      const random = randomStream(seed, 'no difference');
      const walks = Array.from({ length: 20 }, (_, i) => ({ ...walkOf(i, 0, 0), walker: `p${i % 10}` }));
      const own = Array.from({ length: 10 }, () => 0.5 * random.normal());
      for (const [i, walk] of walks.entries()) {
        walk.a_m = 4;
        walk.b_m = 4 + own[i % 10]! + 0.5 * random.normal();
      }
      if (compareWalks(walks)[0]!.p < 0.05) alarms++;
    }
    // 15 expected; a binomial of 300 and 0.05 scatters by 3.8, three of which are allowed.
    expect(alarms).toBeGreaterThan(3);
    expect(alarms).toBeLessThan(27);
  });
});
