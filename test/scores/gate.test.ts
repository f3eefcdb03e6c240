import { describe, expect, test } from 'vitest';
import { gateHolds, parseGate } from '../../src/scores/gate.js';

describe('gates', () => {
  test.each([
    ['p75 <= 3.0 m', 0, 3, true],
    ['p75 <= 3.0 m', 0, 3.01, false],
    ['p75 < 3 m', 0, 3, false],
    ['mean >= 1 m', 0, 1, true],
    ['max > 2 m', 0, 2, false],
    ['end <= 2 %', 0, 1.9, true],
    ['median not worse by 0.1 m', 2, 2.09, true],
    ['median not worse by 0.1 m', 2, 2.11, false],
    ['  rmse not worse by 0 m ', 2, 1.5, true],
  ])('%s with %f before and %f now: %s', (text, before, now, holds) => {
    expect(gateHolds(parseGate(text), before, now)).toBe(holds);
  });

  test('a number that is not known fails', () => {
    expect(gateHolds(parseGate('p75 <= 3 m'), 1, Number.NaN)).toBe(false);
    expect(gateHolds(parseGate('p75 not worse by 3 m'), Number.NaN, 1)).toBe(false);
  });

  test.each(['p80 <= 3 m', 'p75 <= 3', 'p75 <= 3 %', 'p75 = 3 m', 'median not worse by m', ''])(
    '%j is refused',
    (text) => {
      expect(() => parseGate(text)).toThrow(/must be like 'p75 <= 3\.0 m' or 'median not worse by 0\.1 m'/);
    },
  );
});
