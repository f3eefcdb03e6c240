import { describe, expect, test } from 'vitest';
import { robustLine } from '../../src/stats/robust-line.js';

describe('robustLine', () => {
  test('wild points do not move it', () => {
    const x = Array.from({ length: 21 }, (_, i) => i);
    const y = x.map((v, i) => (i % 5 === 2 ? 1e6 : 3 - 0.5 * v));
    const line = robustLine(x, y);
    expect(line.slope).toBe(-0.5);
    // The exact line, but the medians of x and y are taken apart: y's is among the wild points' neighbours.
    expect(line.slopeLow).toBeLessThanOrEqual(-0.5);
    expect(line.slopeHigh).toBeGreaterThanOrEqual(-0.5);
  });

  test('two points give their line', () => {
    const line = robustLine([1, 3], [5, 9]);
    expect([line.slope, line.intercept]).toEqual([2, 3]);
  });

  test('refusals', () => {
    expect(() => robustLine([1], [1])).toThrow('robustLine: needs at least 2 points, got 1');
    expect(() => robustLine([1, 2], [1])).toThrow('robustLine: x has 2 values, y has 1');
    expect(() => robustLine([1, 2], [1, Number.NaN])).toThrow('robustLine: point 1 is (2, NaN)');
    expect(() => robustLine([4, 4, 4], [1, 2, 3])).toThrow(
      'robustLine: all 3 values of x are 4; a slope needs two',
    );
    expect(() => robustLine([1, 2], [1, 2], 1)).toThrow(
      'robustLine: confidence must be between 0 and 1, got 1',
    );
  });
});
