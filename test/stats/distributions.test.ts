import { expect, test } from 'vitest';
import { chiSquareCdf, chiSquareQuantile } from '../../src/stats/chi-square.js';
import { incompleteBeta, incompleteGamma, logGamma } from '../../src/stats/incomplete-functions.js';
import { normalCdf, normalQuantile } from '../../src/stats/normal.js';
import { studentTCdf, studentTQuantile } from '../../src/stats/student-t.js';

test('quantile and cdf undo each other', () => {
  for (const p of [1e-6, 0.01, 0.3, 0.5, 0.77, 0.999]) {
    // Tolerance: the cdf's own error of 1e-14 and one rounding of the argument.
    expect(Math.abs(normalCdf(normalQuantile(p)) / p - 1)).toBeLessThan(1e-13);
    for (const degrees of [0.5, 1, 2.5, 20, 3000]) {
      expect(Math.abs(chiSquareCdf(chiSquareQuantile(p, degrees), degrees) / p - 1)).toBeLessThan(1e-11);
      expect(Math.abs(studentTCdf(studentTQuantile(p, degrees), degrees) / p - 1)).toBeLessThan(1e-11);
    }
  }
});

test('closed forms', () => {
  // Chi-square of 2 degrees is exponential; t of 1 degree is Cauchy; Gamma(1/2) = sqrt(pi).
  expect(chiSquareQuantile(0.95, 2)).toBeCloseTo(-2 * Math.log(0.05), 12);
  expect(studentTQuantile(0.975, 1)).toBeCloseTo(Math.tan(0.475 * Math.PI), 11);
  expect(logGamma(0.5)).toBeCloseTo(0.5 * Math.log(Math.PI), 13);
  expect(logGamma(11)).toBeCloseTo(Math.log(3628800), 13);
  expect(incompleteBeta(0.3, 1, 1)).toBeCloseTo(0.3, 14);
  expect(incompleteGamma(1, 2.5).upper).toBeCloseTo(Math.exp(-2.5), 14);
});

test('the ends', () => {
  expect(normalQuantile(0)).toBe(Number.NEGATIVE_INFINITY);
  expect(normalQuantile(1)).toBe(Number.POSITIVE_INFINITY);
  expect(normalQuantile(0.5)).toBe(0);
  expect(chiSquareQuantile(0, 3)).toBe(0);
  expect(chiSquareQuantile(1, 3)).toBe(Number.POSITIVE_INFINITY);
  expect(chiSquareCdf(Number.POSITIVE_INFINITY, 3)).toBe(1);
  expect(studentTQuantile(0, 3)).toBe(Number.NEGATIVE_INFINITY);
  expect(studentTCdf(Number.POSITIVE_INFINITY, 3)).toBe(1);
  expect(incompleteBeta(0, 2, 3)).toBe(0);
  expect(incompleteBeta(1, 2, 3)).toBe(1);
});

test('refusals', () => {
  expect(() => normalCdf(Number.NaN)).toThrow('normalCdf: x is NaN');
  expect(() => normalQuantile(1.1)).toThrow('normalQuantile: probability must be in 0..1, got 1.1');
  expect(() => chiSquareCdf(-1, 2)).toThrow('chiSquareCdf: x must be at least 0, got -1');
  expect(() => chiSquareQuantile(0.5, 0)).toThrow(
    'chiSquareQuantile: degrees of freedom must be above 0, got 0',
  );
  expect(() => chiSquareQuantile(Number.NaN, 2)).toThrow(
    'chiSquareQuantile: probability must be in 0..1, got NaN',
  );
  expect(() => studentTQuantile(-0.1, 2)).toThrow('studentTQuantile: probability must be in 0..1, got -0.1');
  expect(() => studentTCdf(1, Number.NaN)).toThrow(
    'studentTCdf: degrees of freedom must be above 0, got NaN',
  );
});
