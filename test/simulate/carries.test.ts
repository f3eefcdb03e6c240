import { describe, expect, test } from 'vitest';
import { motionAt, specificForce } from '../../src/simulate/device-motion.js';
import { FORWARD_HARMONICS, VERTICAL_HARMONICS } from '../../src/simulate/gait-motion.js';
import type { SimulatedWalk } from '../../src/simulate/simulate-walk.js';
import { planNamed, planOf, walksOf } from './plan-file.js';

/** Amplitude and phase (rad, of a cosine, 0 at foot contact) of a signal at a multiple of the step frequency. */
function harmonic(
  phase: Float64Array,
  values: Float64Array,
  times: number,
): { amplitude: number; phaseRad: number } {
  let [cos, sin] = [0, 0];
  for (let i = 0; i < values.length; i++) {
    cos += values[i]! * Math.cos(2 * Math.PI * times * phase[i]!);
    sin += values[i]! * Math.sin(2 * Math.PI * times * phase[i]!);
  }
  return { amplitude: (2 * Math.hypot(cos, sin)) / values.length, phaseRad: Math.atan2(sin, cos) };
}

/** Whole steps in the middle of the first bout: vertical and forward acceleration of the phone against the step's phase. */
function middle(walk: SimulatedWalk) {
  const { contacts, phase } = walk.model.timeline.bouts[0]!;
  const [from, to] = [contacts[8]!.tS, contacts[8 + 32]!.tS];
  const n = 6400;
  const times = Float64Array.from({ length: n }, (_, i) => from + ((i + 0.5) * (to - from)) / n);
  const motion = motionAt(walk.model, times);
  const phases = times.map((t) => phase.at(t));
  return { times, motion, phases };
}

const WALKS = walksOf(planNamed('carries'));

describe('every carry', () => {
  for (const walk of WALKS)
    test(`${walk.plan.walk}: ${walk.plan.carry} moves as a phone does`, () => {
      const { motion, phases } = middle(walk);
      const force = specificForce(motion, 9.80665);
      for (const column of [...motion.position, ...motion.rate, ...force, ...motion.attitude])
        expect(column.every(Number.isFinite)).toBe(true);
      // Between a slow turn and what a sensor's range of 8 g and 2000 degrees a second takes, with ample room.
      const largest = (columns: readonly Float64Array[]) =>
        Math.max(...columns[0]!.map((_, i) => Math.hypot(columns[0]![i]!, columns[1]![i]!, columns[2]![i]!)));
      expect(largest(motion.rate)).toBeGreaterThan(0.1);
      expect(largest(motion.rate)).toBeLessThan(10);
      expect(largest(force)).toBeGreaterThan(11);
      expect(largest(force)).toBeLessThan(40);
      // On average over whole steps the phone neither rises nor sinks: gravity remains. Half a second's change
      // of speed of 5 cm/s over 16 s leaves 0.02 m/s².
      const mean = motion.acceleration[2].reduce((sum, value) => sum + value, 0) / phases.length;
      expect(Math.abs(mean)).toBeLessThan(0.02);
    });
});

describe('phone held by the trunk at a comfortable pace', () => {
  const plan = planOf(`
name: comfortable
seed: 1
grid: local
groups: { g: { age: [30, 39], time_variability: 0, length_variability: 0, asymmetry: 0, heel_strike_mps2: 0 } }
walkers: [{ walker: a, group: g, sex: male, height_m: 1.78, cadence_hz: 1.9, step_length_m: 0.71 }]
devices: { phone: { class: ideal } }
routes: { hall: { points: [[0, 0], [50, 0]] } }
walks: [{ walker: a, route: hall, carry: chest }]
`);
  const { motion, phases } = middle(walksOf(plan)[0]!);

  test('vertical: 2 to 3.5 m/s², second harmonic 0.15 to 0.35 and third 0.05 to 0.15 of the first', () => {
    const [first, second, third] = [1, 2, 3].map((times) => harmonic(phases, motion.acceleration[2], times));
    // From memory: about 2 to 3 m/s² at the preferred speed; ranges of the harmonics as of gait-motion.ts.
    expect(first!.amplitude).toBeGreaterThan(2);
    expect(first!.amplitude).toBeLessThan(3.5);
    expect(second!.amplitude / first!.amplitude).toBeGreaterThan(0.15);
    expect(second!.amplitude / first!.amplitude).toBeLessThan(0.35);
    expect(third!.amplitude / first!.amplitude).toBeGreaterThan(0.05);
    expect(third!.amplitude / first!.amplitude).toBeLessThan(0.15);
    // The greatest upward acceleration comes in double support, 5 to 20 % of the step after contact.
    expect(first!.phaseRad / (2 * Math.PI)).toBeGreaterThan(0.05);
    expect(first!.phaseRad / (2 * Math.PI)).toBeLessThan(0.2);
  });

  test('the body rises and falls by 3 to 5 cm', () => {
    const up = motion.position[2];
    const range = Math.max(...up) - Math.min(...up);
    // From memory: 3 to 5 cm at 1.3 m/s, Gard et al. (2004).
    expect(range).toBeGreaterThan(0.03);
    expect(range).toBeLessThan(0.05);
  });

  test('forward: slows from contact to mid-stance, a quarter of a step ahead of the vertical', () => {
    // The walk is to the east.
    const forward = harmonic(phases, motion.acceleration[0], 1);
    const vertical = harmonic(phases, motion.acceleration[2], 1);
    const ahead = ((((vertical.phaseRad - forward.phaseRad) / (2 * Math.PI)) % 1) + 1) % 1;
    // Zijlstra & Hof (1997): about a quarter of the step.
    expect(ahead).toBeGreaterThan(0.2);
    expect(ahead).toBeLessThan(0.35);
    expect(forward.amplitude / vertical.amplitude).toBeCloseTo(FORWARD_HARMONICS[0].share, 1);
    expect(VERTICAL_HARMONICS[0].share).toBe(1);
  });

  test('sideways: half the step frequency, to the left over the left foot', () => {
    const sway = harmonic(phases, motion.position[1], 0.5);
    // Left of east is north; even phases are the left foot's contacts, so the sway peaks half a step later.
    expect(sway.phaseRad / (2 * Math.PI * 0.5)).toBeCloseTo(0.5, 1);
    expect(sway.amplitude).toBeGreaterThan(0.01);
    expect(sway.amplitude).toBeLessThan(0.035);
  });
});

test("changes of carry turn the phone at a hand's pace", () => {
  const walk = WALKS.at(-1)!;
  const { durationS } = walk.model.timeline;
  const times = Float64Array.from({ length: Math.floor(durationS * 200) }, (_, i) => i / 200);
  const { rate, acceleration } = motionAt(walk.model, times);
  // Handling takes 1.6 s; a half turn in it is 2 rad/s on average and some four times that at its quickest.
  for (let i = 0; i < times.length; i++) {
    expect(Math.hypot(rate[0][i]!, rate[1][i]!, rate[2][i]!)).toBeLessThan(14);
    expect(Math.hypot(acceleration[0][i]!, acceleration[1][i]!, acceleration[2][i]!)).toBeLessThan(30);
  }
});
