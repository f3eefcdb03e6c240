import { readFileSync } from 'node:fs';
import { expect, test } from 'vitest';
import { chiSquareCdf, chiSquareQuantile } from '../../src/stats/chi-square.js';
import { normalCdf, normalQuantile } from '../../src/stats/normal.js';
import { studentTCdf, studentTQuantile } from '../../src/stats/student-t.js';

// Source: data/stats/distributions.py, mpmath 1.2.1 in 40 digits and scipy 1.10.1.
const reference: Record<string, number[][]> = JSON.parse(
  readFileSync(new URL('./data/stats/distributions.json', import.meta.url), 'utf8'),
);

// Tolerance: relative; measured agreement is 2e-14 or better, 4e-14 for the chi-square quantile of 20000
// degrees of freedom and 5e-13 for t quantiles beside the median, where 0.5 - p subtracts.
test.each<[string, (a: number, b: number) => number, number]>([
  ['normalCdf', normalCdf, 1e-13],
  ['normalQuantile', normalQuantile, 2e-15],
  ['chiSquareCdf', chiSquareCdf, 1e-13],
  ['chiSquareQuantile', chiSquareQuantile, 1e-13],
  ['studentTCdf', studentTCdf, 1e-13],
  ['studentTQuantile', studentTQuantile, 1e-12],
])('%s against 40-digit and scipy values', (name, ours, tolerance) => {
  const rows = reference[name]!;
  expect(rows.length).toBeGreaterThan(7);
  for (const row of rows) {
    const [a, b] = row as [number, number];
    const expected = row.at(-1)!;
    const got = ours(a, b);
    const miss = expected === 0 ? Math.abs(got) : Math.abs(got / expected - 1);
    expect(miss, `${name}(${row.slice(0, -1)}) is ${got}, expected ${expected}`).toBeLessThan(tolerance);
  }
});

test('printed tables: two-sided 5 % points', () => {
  // Source: from memory, the usual tables (Fisher & Yates): z 1.960, t(11) 2.201, t(30) 2.042, chi²(1) 3.841,
  // chi²(2) 5.991, chi²(10) 18.307. Tolerance: half of the last digit printed.
  expect(normalQuantile(0.975)).toBeCloseTo(1.96, 3);
  expect(studentTQuantile(0.975, 11)).toBeCloseTo(2.201, 3);
  expect(studentTQuantile(0.975, 30)).toBeCloseTo(2.042, 3);
  expect(chiSquareQuantile(0.95, 1)).toBeCloseTo(3.841, 3);
  expect(chiSquareQuantile(0.95, 2)).toBeCloseTo(5.991, 3);
  expect(chiSquareQuantile(0.95, 10)).toBeCloseTo(18.307, 3);
});
