import { describe, expect, test } from 'vitest';
import { type DeviceMotion, motionAt, specificForce } from '../../src/simulate/device-motion.js';
import type { SimulatedWalk } from '../../src/simulate/simulate-walk.js';
import { planNamed, walksOf } from './plan-file.js';

const GRAVITY_MPS2 = 9.80665;

/** Largest differences at the end: of attitude (rad), velocity (m/s) and position (m). */
interface Miss {
  attitudeRad: number;
  velocityMps: number;
  positionM: number;
}

/** Over the whole walk. */
function integrateAll(walk: SimulatedWalk, stepS: number): Miss {
  const { durationS, bouts } = walk.model.timeline;
  // Where walking begins and ends the acceleration has a bend, which a step across it would blur.
  const bends = [0, ...bouts.flatMap(({ startS, endS }) => [startS, endS]), durationS];
  let state = stateAt(motionAt(walk.model, Float64Array.of(0)), 0);
  for (let i = 1; i < bends.length; i++) state = integrate(walk, state, bends[i - 1]!, bends[i]!, stepS);
  const truth = stateAt(motionAt(walk.model, Float64Array.of(durationS)), 0);
  const dot = state.slice(0, 4).reduce((sum, value, i) => sum + value * truth[i]!, 0);
  const sign = dot < 0 ? -1 : 1;
  const off = (from: number, to: number, k = 1) =>
    Math.hypot(...state.slice(from, to).map((value, i) => k * value - truth[from + i]!));
  return { attitudeRad: 2 * off(0, 4, sign), velocityMps: off(4, 7), positionM: off(7, 10) };
}

/**
 * Integrates what perfect sensors read, specific force and angular rate, by the classical Runge-Kutta
 * method of order four: attitude, velocity and position at `toS` from those at `fromS`.
 */
function integrate(walk: SimulatedWalk, from: number[], fromS: number, toS: number, stepS: number): number[] {
  if (!(toS > fromS)) return from;
  const nSteps = Math.ceil((toS - fromS) / stepS);
  const h = (toS - fromS) / nSteps;
  // The method needs each step's middle too.
  const times = Float64Array.from({ length: 2 * nSteps + 1 }, (_, i) => fromS + (i * h) / 2);
  const motion = motionAt(walk.model, times);
  const force = specificForce(motion, GRAVITY_MPS2);
  const slope = (at: number, x: number[]): number[] => {
    const [w, a, b, c] = x as [number, number, number, number];
    const [p, q, r] = [motion.rate[0][at]!, motion.rate[1][at]!, motion.rate[2][at]!];
    const [fx, fy, fz] = [force[0][at]!, force[1][at]!, force[2][at]!];
    const norm = w * w + a * a + b * b + c * c;
    const [tx, ty, tz] = [2 * (b * fz - c * fy), 2 * (c * fx - a * fz), 2 * (a * fy - b * fx)];
    return [
      -0.5 * (a * p + b * q + c * r),
      0.5 * (w * p + b * r - c * q),
      0.5 * (w * q + c * p - a * r),
      0.5 * (w * r + a * q - b * p),
      fx + (w * tx + b * tz - c * ty) / norm,
      fy + (w * ty + c * tx - a * tz) / norm,
      fz + (w * tz + a * ty - b * tx) / norm - GRAVITY_MPS2,
      x[4]!,
      x[5]!,
      x[6]!,
    ];
  };
  let x = from;
  for (let step = 0; step < nSteps; step++) {
    const add = (k: number[], by: number) => x.map((value, i) => value + by * k[i]!);
    const k1 = slope(2 * step, x);
    const k2 = slope(2 * step + 1, add(k1, h / 2));
    const k3 = slope(2 * step + 1, add(k2, h / 2));
    const k4 = slope(2 * step + 2, add(k3, h));
    x = x.map((value, i) => value + (h / 6) * (k1[i]! + 2 * k2[i]! + 2 * k3[i]! + k4[i]!));
  }
  return x;
}

function stateAt({ attitude, velocity, position }: DeviceMotion, i: number): number[] {
  return [...attitude, ...velocity, ...position].map((column) => column[i]!);
}

const CARRIES = walksOf(planNamed('carries'));

describe('readings of perfect sensors integrate back to the true motion', () => {
  for (const walk of CARRIES) {
    test(`${walk.plan.walk}, ${walk.plan.carry}`, () => {
      const coarse = integrateAll(walk, 1 / 500);
      const fine = integrateAll(walk, 1 / 1000);
      // What is left at 1 ms is the method's own error: measured 1e-13 to 1e-11 rad, 2e-11 to 1.5e-8 m/s and
      // 1e-9 to 3e-7 m after 35 to 60 s; the bounds give about ten times that. A term left out of the
      // physics (the arm's pull, a sign) makes metres.
      expect(fine.attitudeRad).toBeLessThan(1e-10);
      expect(fine.velocityMps).toBeLessThan(1e-7);
      expect(fine.positionM).toBeLessThan(3e-6);
      // Order four: half the step, a sixteenth of the error. An inconsistency would not shrink at all.
      expect(coarse.attitudeRad / fine.attitudeRad).toBeGreaterThan(12);
    });
  }
});

test('velocity and acceleration are the derivatives of position, through handling too', () => {
  for (const walk of CARRIES) {
    const h = 1e-4;
    const { durationS } = walk.model.timeline;
    const n = Math.floor(durationS * 50);
    for (const axis of [0, 1, 2] as const) {
      const at = (shift: number) =>
        motionAt(
          walk.model,
          Float64Array.from({ length: n }, (_, i) => (i + 0.5) / 50 + shift),
        );
      const [before, here, after] = [at(-h), at(0), at(h)];
      for (let i = 0; i < n; i++) {
        const velocity = (after.position[axis][i]! - before.position[axis][i]!) / (2 * h);
        const acceleration = (after.velocity[axis][i]! - before.velocity[axis][i]!) / (2 * h);
        // Central differences err by h²/6 of the third derivative: 1e-8/6 times 1e3 m/s³ and 1e6 m/s⁴; where
        // pieces join the fourth derivative jumps, which costs h/2 of that.
        expect(Math.abs(velocity - here.velocity[axis][i]!)).toBeLessThan(5e-6);
        expect(Math.abs(acceleration - here.acceleration[axis][i]!)).toBeLessThan(5e-3);
      }
    }
  }
});
