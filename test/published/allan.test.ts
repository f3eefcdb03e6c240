import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import { type AllanKind, allanDeviation } from '../../src/stats/allan.js';

const NINE = Float64Array.from([892, 809, 823, 798, 671, 644, 883, 903, 677]);

function thousand(): Float64Array {
  let n = 1234567890n;
  return Float64Array.from({ length: 1000 }, () => {
    const y = Number(n) / 2147483647;
    n = (16807n * n) % 2147483647n;
    return y;
  });
}

const rows = readFileSync(new URL('./data/allan/expected_nbs14.csv', import.meta.url), 'utf8')
  .trim()
  .split('\n')
  .map((line) => line.split(','));

const KINDS: [string, AllanKind][] = [
  ['OADEV', 'overlapping-allan'],
  ['MDEV', 'modified-allan'],
  ['OHDEV', 'overlapping-hadamard'],
  ['TDEV', 'time'],
];

function expectPrinted(set: string, label: string, rate: Float64Array, kind: AllanKind, taus: number[]) {
  const row = rows.find((r) => r[0] === set && r[1]?.split('(')[0] === label)!;
  const { deviation, low, high } = allanDeviation(rate, 1, kind, taus);
  taus.forEach((_, k) => {
    const printed = row[2 + k]!;
    // Printed to 7 digits. The 9-point OHDEV and TDEV are printed rounded down or up by one in the last
    // place (70.80607 of 70.8060732; 86.35831): the unit of the last place is the tolerance.
    const unit = 10 ** (Math.floor(Math.log10(Number(printed))) - 6);
    expect(Math.abs(deviation[k]! - Number(printed)), `${label} at ${taus[k]}`).toBeLessThanOrEqual(
      0.51 * unit,
    );
    expect(low[k]).toBeLessThan(deviation[k]!);
    expect(high[k]).toBeGreaterThan(deviation[k]!);
  });
}

describe('published stability deviations (data/allan/SOURCE.md), every printed digit', () => {
  test.each(KINDS)('9 points, %s', (label, kind) =>
    expectPrinted('9-point-frequency', label, NINE, kind, [1, 2]),
  );
  test.each(KINDS)('1000 points, %s', (label, kind) =>
    expectPrinted('1000-point-frequency', label, thousand(), kind, [1, 10, 100]),
  );

  test('the 1000-point set is the published one', () => {
    // Source: Riley: max 0.9957453, min 0.0013717599, mean 0.4897745.
    const y = thousand();
    expect(Math.max(...y)).toBeCloseTo(0.9957453, 7);
    expect(Math.min(...y)).toBeCloseTo(0.0013717599, 10);
    expect(y.reduce((sum, value) => sum + value / 1000, 0)).toBeCloseTo(0.4897745, 7);
  });
});
