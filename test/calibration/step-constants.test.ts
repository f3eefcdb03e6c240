import { describe, expect, test } from 'vitest';
import { fitStepConstants, type MeasuredWalk } from '../../src/calibration/step-constants.js';
import { randomStream } from '../../src/stats/random.js';

const walk = (walker: string, group: string, constant: number): MeasuredWalk => ({
  walker,
  group,
  distance_m: 100 * constant,
  unit_m: 100,
});

describe('fitStepConstants', () => {
  test('many like walks: the walker’s own constant; few and unlike ones: drawn to the group', () => {
    const walks = [
      ...Array.from({ length: 20 }, (_, i) => walk('a', 'g', i % 2 ? 0.505 : 0.495)),
      walk('b', 'g', 0.4),
      walk('c', 'g', 0.45),
      walk('c', 'g', 0.46),
    ];
    const everyone = ['a', 'b', 'c', 'd'].map((walker) => ({ walker, group: 'g' }));
    const { walkers, groups } = fitStepConstants(walks, everyone);
    expect(walkers.get('a')!.value).toBeCloseTo(0.5, 2);
    expect(walkers.get('b')!.value).toBeGreaterThan(0.4);
    expect(walkers.get('b')!.sd).toBeGreaterThan(walkers.get('a')!.sd);
    // Never measured: the group's, with the spread between people.
    expect(walkers.get('d')).toEqual(groups.get('g'));
    expect(walkers.get('d')!.from).toBe('group');
    expect(walkers.get('d')!.sd).toBeGreaterThan(2 * walkers.get('a')!.sd);
  });

  test('standard errors: 40 drawn trials, the share of walkers inside one is that of a normal distribution', () => {
    let inside = 0;
    let count = 0;
    for (let seed = 0; seed < 40; seed++) {
      const random = randomStream(seed, 'constants');
      const truth = Array.from({ length: 10 }, (_, i) => ({
        walker: `w${i}`,
        group: i < 5 ? 'young' : 'old',
        constant: (i < 5 ? 0.47 : 0.42) * Math.exp(0.07 * random.normal()),
      }));
      const walks = truth.flatMap(({ walker, group, constant }) =>
        [0, 1, 2].map(() => walk(walker, group, constant * Math.exp(0.04 * random.normal()))),
      );
      const { walkers } = fitStepConstants(walks, truth);
      for (const { walker, constant } of truth) {
        const fit = walkers.get(walker)!;
        if (Math.abs(fit.value - constant) < fit.sd) inside++;
        count++;
      }
    }
    // 0.683 of 400; variances come from ten walkers, which adds to the sampling error of 0.023.
    expect(inside / count).toBeGreaterThan(0.6);
    expect(inside / count).toBeLessThan(0.76);
  });

  test('one walk is refused', () => {
    expect(() => fitStepConstants([walk('a', 'g', 0.5)], [])).toThrow(
      /needs at least 2 walks with a known length/,
    );
  });
});
