import { describe, expect, test } from 'vitest';
import { RouteCurve } from '../../src/simulate/route-curve.js';

const STEP_M = 0.001;

/** Ten metres north, then ten metres after a turn, clockwise positive. */
function bent(turnDeg: number): RouteCurve {
  const turn = (turnDeg * Math.PI) / 180;
  return new RouteCurve([
    { eastM: 0, northM: 0 },
    { eastM: 0, northM: 10 },
    { eastM: 10 * Math.sin(turn), northM: 10 + 10 * Math.cos(turn) },
  ]);
}

function at(curve: RouteCurve, s: number): number[] {
  const out = new Float64Array(5);
  curve.at(s, out);
  return [...out];
}

describe('a corner', () => {
  for (const turnDeg of [-180, -135, -90, -30, -1, 0, 1, 10, 45, 60, 90, 120, 150, 170, 179.9, 180]) {
    test(`of ${turnDeg} degrees passes through its vertex and ends at the last point`, () => {
      const curve = bent(turnDeg);
      // Identity. Quadrature of 8 points in each of 16 panels is exact to rounding: 1e-14 of 10 m.
      const [east, north] = at(curve, curve.vertexM[1]!);
      expect(Math.abs(east!)).toBeLessThan(1e-12);
      expect(Math.abs(north! - 10)).toBeLessThan(1e-12);
      const [endEast, endNorth, heading] = at(curve, curve.lengthM);
      const turn = (turnDeg * Math.PI) / 180;
      expect(Math.abs(endEast! - 10 * Math.sin(turn))).toBeLessThan(1e-12);
      expect(Math.abs(endNorth! - 10 - 10 * Math.cos(turn))).toBeLessThan(1e-12);
      // A turn about may go either way round.
      expect(Math.abs(Math.abs(heading!) - Math.abs(turn))).toBeLessThan(1e-12);
    });
  }

  test('is smooth: heading is the direction of travel, curvature its slope, without a jump', () => {
    for (const turnDeg of [40, 90, -170]) {
      const curve = bent(turnDeg);
      for (let s = STEP_M; s < curve.lengthM - STEP_M; s += 0.0137) {
        const [before, here, after] = [at(curve, s - STEP_M), at(curve, s), at(curve, s + STEP_M)];
        // Central differences over 1 mm err by h²/6 of the third derivative, 1e-7 times at most some 100.
        const east = (after[0]! - before[0]!) / (2 * STEP_M);
        const north = (after[1]! - before[1]!) / (2 * STEP_M);
        expect(Math.abs(east - Math.sin(here[2]!))).toBeLessThan(1e-5);
        expect(Math.abs(north - Math.cos(here[2]!))).toBeLessThan(1e-5);
        expect(Math.abs((after[2]! - before[2]!) / (2 * STEP_M) - here[3]!)).toBeLessThan(1e-4);
        expect(Math.abs((after[3]! - before[3]!) / (2 * STEP_M) - here[4]!)).toBeLessThan(1e-3);
      }
    }
  });

  test('swings out by less than a body width, and a person can walk it', () => {
    for (const turnDeg of [30, 60, 90, 120]) {
      const curve = bent(turnDeg);
      let swing = 0;
      let bend = 0;
      for (let s = 0; s < curve.lengthM; s += 0.01) {
        const [east, , , curvature] = at(curve, s);
        if (s < curve.vertexM[1]!) swing = Math.max(swing, Math.abs(east!));
        bend = Math.max(bend, Math.abs(curvature!));
      }
      // Common practice, no source: half a shoulder's breadth aside, and a radius of 0.4 m, a turn within two steps.
      expect(swing).toBeLessThan(0.35);
      expect(bend).toBeLessThan(2.5);
    }
  });
});

test('short legs shrink their corners', () => {
  const curve = new RouteCurve([
    { eastM: 0, northM: 0 },
    { eastM: 0, northM: 1 },
    { eastM: 1, northM: 1 },
    { eastM: 1, northM: 0 },
  ]);
  const [east, north] = at(curve, curve.vertexM[2]!);
  // Identity, to rounding.
  expect(Math.abs(east! - 1) + Math.abs(north! - 1)).toBeLessThan(1e-12);
});
