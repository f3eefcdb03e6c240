import { describe, expect, test } from 'vitest';
import { stepAgreement } from '../../../src/scores/step-agreement.js';
import { stepsStage } from '../../../src/stages/steps/index.js';
import { randomStream } from '../../../src/stats/random.js';
import type { Motion } from '../../../src/tables/schemas.js';
import { walkContext } from '../walk-context.js';
import { drawnWalk } from './drawn-walk.js';

const method = stepsStage.methods['peak-chain']!;
const find = (motion: Motion, settings: object = {}) =>
  method.run({ motion }, method.settings.parse(settings), walkContext());

describe('regular steps are all found and nothing else', () => {
  test.each([
    ['at half a second', 0.5, 2],
    ['shuffling at 1 a second, weak', 1, 0.5],
    ['shuffling at 0.5 a second, weak', 2, 0.4],
  ])('%s', (_what, periodS, strength) => {
    const { motion, crests } = drawnWalk([
      { seconds: 5 },
      { seconds: 40, periodS, strength },
      { seconds: 5 },
    ]);
    const { t_s, bout } = find(motion);
    expect(t_s).toHaveLength(crests.length);
    expect(new Set(bout).size).toBe(1);
  });

  test('running at 3.3 a second, all but the first and the last', () => {
    const { motion, crests } = drawnWalk([
      { seconds: 5 },
      { seconds: 40, periodS: 0.3, strength: 8 },
      { seconds: 5 },
    ]);
    const { t_s } = find(motion);
    expect(t_s.length).toBeGreaterThanOrEqual(crests.length - 2);
    expect(t_s.length).toBeLessThanOrEqual(crests.length);
  });

  test('five steps between two bouts, as from shelf to shelf', () => {
    const walking = { seconds: 10, periodS: 0.5 };
    const { motion, crests } = drawnWalk([
      walking,
      { seconds: 5 },
      { seconds: 2.5, periodS: 0.5 },
      { seconds: 5 },
      walking,
    ]);
    expect(find(motion).t_s).toHaveLength(crests.length);
  });

  test.each([25, 50, 100, 200, 400])('at %i Hz', (rateHz) => {
    const { motion, crests } = drawnWalk(
      [{ seconds: 3 }, { seconds: 20, periodS: 0.55 }, { seconds: 3 }],
      rateHz,
    );
    expect(find(motion).t_s).toHaveLength(crests.length);
  });

  test('every second step at a quarter of the strength, as in a trouser pocket', () => {
    const { motion, crests } = drawnWalk([
      { seconds: 3 },
      { seconds: 30, periodS: 0.55, strength: 3, otherLeg: 0.25 },
      { seconds: 3 },
    ]);
    expect(find(motion).t_s).toHaveLength(crests.length);
  });

  test('a stop parts two bouts', () => {
    const walking = { seconds: 10, periodS: 0.5 };
    const { motion, crests } = drawnWalk([{ seconds: 3 }, walking, { seconds: 6 }, walking, { seconds: 3 }]);
    const { t_s, bout } = find(motion);
    expect(t_s).toHaveLength(crests.length);
    expect([bout[0], bout.at(-1)]).toEqual([1, 2]);
  });
});

test('the event comes before the crest by a tenth of the step’s time', () => {
  const { motion, crests } = drawnWalk([{ seconds: 3 }, { seconds: 30, periodS: 0.5 }, { seconds: 3 }]);
  const { t_s } = find(motion);
  // 0.05 m/s2 of noise on a crest of 2 m/s2 moves its top by some milliseconds; 20 ms is a sample of 50 Hz.
  for (const [k, t] of t_s.entries()) expect(Math.abs(t - (crests[k]! - 0.05))).toBeLessThan(0.02);
});

describe('what is no walking makes no steps', () => {
  test('a phone at rest for ten minutes', () => {
    expect(find(drawnWalk([{ seconds: 600 }]).motion).t_s).toHaveLength(0);
  });

  test('single taps', () => {
    const { motion } = drawnWalk([{ seconds: 60 }]);
    for (let s = 5; s < 60; s += 7) for (let i = 0; i < 5; i++) motion.az_mps2[s * 100 + i]! += 15;
    expect(find(motion).t_s).toHaveLength(0);
  });

  test('ten minutes of handling: irregular pushes of 0.3 to 6 m/s2', () => {
    const { motion } = drawnWalk([{ seconds: 600 }]);
    const random = randomStream(3, 'handling');
    for (let s = 1; s < 598; s += 0.3 + 1.7 * random.uniform()) {
      const [height, width] = [0.3 * Math.exp(3 * random.uniform()), 0.1 + 0.4 * random.uniform()];
      for (let i = Math.round(s * 100); i < (s + 2 * width) * 100; i++)
        motion.az_mps2[i]! += height * Math.sin((Math.PI * (i / 100 - s)) / width);
    }
    // Four of some 520 pushes: a few in a row may keep a beat by chance.
    expect(find(motion).t_s.length).toBeLessThanOrEqual(4);
  });

  test('inside a gap there are no steps', () => {
    const { motion } = drawnWalk([{ seconds: 3 }, { seconds: 30, periodS: 0.5 }, { seconds: 3 }]);
    motion.gap.fill(1, 1200, 1700);
    for (const axis of [motion.ax_mps2, motion.ay_mps2, motion.az_mps2]) axis.fill(Number.NaN, 1200, 1700);
    const { t_s } = find(motion);
    expect([...t_s].filter((t) => t > 12 && t < 17)).toEqual([]);
    expect(t_s.length).toBeGreaterThan(45);
  });
});

test('confidence: sure of regular steps, less of those at the edge of what can be heard', () => {
  const strong = find(drawnWalk([{ seconds: 3 }, { seconds: 30, periodS: 0.5 }, { seconds: 3 }]).motion);
  expect(Math.min(...strong.confidence.slice(2, -2))).toBeGreaterThan(0.95);
  const weak = find(
    drawnWalk([{ seconds: 3 }, { seconds: 4, periodS: 0.5, strength: 0.1 }, { seconds: 3 }]).motion,
  );
  for (const confidence of weak.confidence) {
    expect(confidence).toBeLessThan(0.95);
    expect(confidence).toBeGreaterThanOrEqual(0);
  }
});

test('irregular steps: 5 % in time, 20 % in strength, one in ten at a quarter', () => {
  const random = randomStream(8, 'irregular');
  const { motion } = drawnWalk([{ seconds: 130 }]);
  const crests: number[] = [];
  for (let t = 5; t < 125; t += 0.55 * (1 + 0.05 * random.normal())) {
    crests.push(t);
    const height = 2 * (1 + 0.2 * random.normal()) * (random.uniform() < 0.1 ? 0.25 : 1);
    for (let i = Math.round((t - 0.27) * 100); i <= (t + 0.27) * 100; i++)
      motion.az_mps2[i]! += height * (1 + Math.cos((2 * Math.PI * (i / 100 - t)) / 0.55));
  }
  const { precision, recall } = stepAgreement(find(motion).t_s, Float64Array.from(crests));
  expect(precision).toBeGreaterThan(0.99);
  expect(recall).toBeGreaterThan(0.95);
});

test('empty and short inputs make no steps', () => {
  for (const seconds of [0, 0.01, 0.5]) expect(find(drawnWalk([{ seconds }]).motion).t_s).toHaveLength(0);
});
