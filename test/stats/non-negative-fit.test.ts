import { describe, expect, test } from 'vitest';
import { solveNonNegative } from '../../src/stats/non-negative-fit.js';

const identity = (n: number) =>
  Array.from({ length: n }, (_, i) => Array.from({ length: n }, (_, j) => (i === j ? 1 : 0)));

describe('solveNonNegative', () => {
  test('a feasible solution is that of plain least squares', () => {
    // Line through (0,1) (1,3) (2,4): worked by hand, intercept 7/6, slope 3/2, residual 1/6.
    const fit = solveNonNegative(
      [
        [1, 0],
        [1, 1],
        [1, 2],
      ],
      [1, 3, 4],
      identity(3),
    );
    // Tolerance: the hair of 1e-6 on the covariance's diagonal.
    expect(fit.values[0]).toBeCloseTo(7 / 6, 9);
    expect(fit.values[1]).toBeCloseTo(1.5, 9);
    expect(fit.chiSquare).toBeCloseTo(1 / 6, 5);
    expect(fit.standardErrors[1]).toBeCloseTo(Math.sqrt(1 / 2), 5);
  });

  test('a coefficient that would be negative is 0 and the rest adjusts', () => {
    const fit = solveNonNegative(
      [
        [1, 0],
        [1, 1],
        [1, 2],
      ],
      [3, 2, 1],
      identity(3),
    );
    expect(fit.values[0]).toBeCloseTo(2, 9);
    expect(fit.values[1]).toBe(0);
  });

  test('a covariance weighs and correlates', () => {
    // Two readings of one number, variances 1 and 3, covariance 1: all weight on the first. Worked by hand.
    const fit = solveNonNegative(
      [[1], [1]],
      [5, 9],
      [
        [1, 1],
        [1, 3],
      ],
    );
    // Tolerance: the hair of 1e-6.
    expect(fit.values[0]).toBeCloseTo(5, 4);
    expect(fit.standardErrors[0]).toBeCloseTo(1, 5);
  });
});
