import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { circularMean, wrapToPi, wrapToTurn } from '../../src/stats/circular.js';

const DEG = Math.PI / 180;

describe('wrapping', () => {
  test('the borders', () => {
    expect(wrapToPi(Math.PI)).toBe(Math.PI);
    expect(wrapToPi(-Math.PI)).toBe(Math.PI);
    expect(wrapToTurn(2 * Math.PI)).toBe(0);
    expect(wrapToTurn(-1e-20)).toBe(0);
    expect(wrapToTurn(-Math.PI)).toBe(Math.PI);
  });

  test('range and direction hold for any angle', () => {
    fc.assert(
      fc.property(fc.double({ min: -1e4, max: 1e4, noNaN: true }), (angle) => {
        const half = wrapToPi(angle);
        const whole = wrapToTurn(angle);
        expect(half > -Math.PI && half <= Math.PI && whole >= 0 && whole < 2 * Math.PI).toBe(true);
        // Tolerance: an ulp of 1e4 is 2e-12.
        expect(Math.hypot(Math.cos(half) - Math.cos(angle), Math.sin(whole) - Math.sin(angle))).toBeLessThan(
          5e-12,
        );
      }),
      { seed: 7 },
    );
  });
});

describe('circularMean', () => {
  test('across north', () => {
    const m = circularMean([350 * DEG, 10 * DEG, 30 * DEG]);
    expect(m.directionRad).toBeCloseTo(10 * DEG, 14);
    // R = (1 + 2 cos 20°)/3.
    expect(m.resultantLength).toBeCloseTo((1 + 2 * Math.cos(20 * DEG)) / 3, 14);
    expect(m.standardDeviationRad).toBeCloseTo(Math.sqrt(-2 * Math.log(m.resultantLength)), 14);
  });

  test('one direction has no spread', () => {
    expect(circularMean([1])).toEqual({ directionRad: 1, resultantLength: 1, standardDeviationRad: 0 });
  });

  test('opposite directions have no mean', () => {
    expect(circularMean([0, Math.PI]).directionRad).toBeNull();
  });

  test('weights', () => {
    expect(circularMean([0, 90 * DEG], [1, Math.sqrt(3)]).directionRad).toBeCloseTo(60 * DEG, 14);
  });

  test('refusals', () => {
    expect(() => circularMean([])).toThrow('circularMean: needs at least one angle, got none');
    expect(() => circularMean([0, Number.NaN])).toThrow('circularMean: angle 1 is NaN');
    expect(() => circularMean([0, 1], [1])).toThrow('circularMean: 2 angles need 2 weights, got 1');
    expect(() => circularMean([0], [0])).toThrow('circularMean: the weights are all 0');
    expect(() => circularMean([0], [-1])).toThrow(
      'circularMean: weights must be finite and at least 0, got -1',
    );
  });
});
