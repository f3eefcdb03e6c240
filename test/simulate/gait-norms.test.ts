import { describe, expect, test } from 'vitest';
import { castOf } from '../../src/simulate/cast.js';
import { gaitNorm, type Sex } from '../../src/simulate/gait-norms.js';
import { planOf, walksOf } from './plan-file.js';

/** People drawn a group. */
const N = 400;

function crowd(age: number, sex: Sex, more = '') {
  const walkers = Array.from({ length: N }, (_, i) => `  - { walker: p${i}, group: g }`).join('\n');
  return planOf(`
name: crowd
seed: 2
grid: local
groups: { g: { age: [${age}, ${age + 9}], sex: ${sex}${more} } }
walkers:
${walkers}
devices: { phone: { class: ideal, rate_hz: 20 } }
routes: { hall: { points: [[0, 0], [30, 0]], checkpoints: none } }
walks: [{ walker: p0, route: hall }]
`);
}

function meanAndError(values: number[]): [mean: number, error: number] {
  const mean = values.reduce((sum, value) => sum + value, 0) / values.length;
  const variance = values.reduce((sum, value) => sum + (value - mean) ** 2, 0) / (values.length - 1);
  return [mean, Math.sqrt(variance / values.length)];
}

describe('groups reproduce the published means', () => {
  // Source of cadence: Öberg et al. (1993), normal gait. Of speed: Bohannon & Andrews (2011); those of men of
  // 40 and women of 80 stand in its abstract, the others are from memory.
  const PUBLISHED: [Sex, number, number, number][] = [
    ['male', 20, 1.98, 1.358],
    ['male', 40, 2.01, 1.434],
    ['male', 70, 1.91, 1.262],
    ['female', 20, 2.08, 1.341],
    ['female', 60, 2.06, 1.241],
    ['female', 80, 2.03, 0.943],
  ];
  for (const [sex, age, cadenceHz, speedMps] of PUBLISHED)
    test(`${sex}, ${age} to ${age + 9}`, () => {
      const walkers = [...castOf(crowd(age, sex)).walkers.values()];
      const [cadence, cadenceError] = meanAndError(walkers.map((walker) => walker.cadenceHz));
      const [speed, speedError] = meanAndError(walkers.map((w) => w.cadenceHz * w.stepLengthM));
      // Three standard errors of the mean of the people drawn.
      expect(Math.abs(cadence - cadenceHz)).toBeLessThan(3 * cadenceError);
      expect(Math.abs(speed - speedMps)).toBeLessThan(3 * speedError);
    });
});

test('women take shorter and quicker steps than men of their age', () => {
  // Identity of the norms: speed over cadence. Öberg et al. (1993), men of 20 to 29: 0.616 m, sd 0.035.
  for (const age of [20, 30, 40, 50, 60, 70]) {
    expect(gaitNorm('female', age).stepLengthM).toBeLessThan(gaitNorm('male', age).stepLengthM);
    expect(gaitNorm('female', age).cadenceHz).toBeGreaterThan(gaitNorm('male', age).cadenceHz);
  }
});

test('a walk keeps to its walker: cadence, step length and variability on a straight', () => {
  const plan = planOf(`
name: one
seed: 4
grid: local
groups: { g: { age: [30, 39], time_variability: 0.03, length_variability: 0.04, asymmetry: 0 } }
walkers: [{ walker: a, group: g, cadence_hz: 1.9, step_length_m: 0.7 }]
devices: { phone: { class: ideal, rate_hz: 20 } }
routes: { hall: { points: [[0, 0], [700, 0]] } }
walks: [{ walker: a, route: hall }]
`);
  const { contacts } = walksOf(plan)[0]!.model.timeline.bouts[0]!;
  const inner = contacts.slice(2, -1);
  const times = inner.slice(1).map(({ tS }, i) => tS - inner[i]!.tS);
  const [time, timeError] = meanAndError(times);
  const [length, lengthError] = meanAndError(inner.map(({ lengthM }) => lengthM));
  // Three standard errors of some thousand steps; lengths are scaled to fill the hall, half a step in a thousand.
  expect(Math.abs(time - 1 / 1.9)).toBeLessThan(3 * timeError);
  expect(Math.abs(length - 0.7)).toBeLessThan(3 * lengthError + 0.0005 * 0.7);
  // A standard deviation from n steps is good to 1/sqrt(2n), here 2.2 %; three times that.
  const n = inner.length;
  expect(Math.abs((timeError * Math.sqrt(n - 1)) / time / 0.03 - 1)).toBeLessThan(3 / Math.sqrt(2 * n));
  expect(Math.abs((lengthError * Math.sqrt(n)) / length / 0.04 - 1)).toBeLessThan(3 / Math.sqrt(2 * n));
  // The steps fill the hall but for the last sway forward, 5 % of the half step that stops.
  const total = contacts.reduce((sum, { lengthM }) => sum + lengthM, 0);
  expect(Math.abs(total - 700)).toBeLessThan(0.05);
});

test('impaired walkers step at 0.4 to 1 Hz', () => {
  const walkers = [...castOf(crowd(70, 'female', ', gait: impaired')).walkers.values()];
  // Asked of the simulator: weak gait down to 0.4 Hz. The household class of Perry (1995) is below 0.4 m/s.
  const [speed] = meanAndError(walkers.map((w) => w.cadenceHz * w.stepLengthM));
  expect(speed).toBeLessThan(0.4);
  for (const { cadenceHz } of walkers) expect(cadenceHz).toBeGreaterThan(0.4);
  for (const { cadenceHz } of walkers) expect(cadenceHz).toBeLessThan(1.1);
});
