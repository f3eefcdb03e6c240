import fc from 'fast-check';
import { expect, test } from 'vitest';
import { parseStamp, secondsBetween } from '../../src/campaign/exact-time.js';
import { secondsSinceStart } from '../../src/campaign/seconds-since-start.js';
import type { TimeUnit } from '../../src/campaign/types.js';

const between = (a: string, b: string, unit: TimeUnit) => {
  const [x, y] = [parseStamp(a, unit)!, parseStamp(b, unit)!];
  return secondsBetween(x.seconds, x.femtos, y.seconds, y.femtos);
};

test('parseStamp: whole seconds and femtoseconds, by hand', () => {
  expect(parseStamp('1700000000005000000', 'ns')).toEqual({ seconds: 1700000000, femtos: 5e12 });
  expect(parseStamp('1574570929727', 'ms')).toEqual({ seconds: 1574570929, femtos: 727e12 });
  expect(parseStamp('12.5', 'us')).toEqual({ seconds: 0, femtos: 12.5e9 });
  expect(parseStamp('-1.25', 's')).toEqual({ seconds: -1, femtos: -0.25e15 });
  expect(parseStamp('.5', 's')).toEqual({ seconds: 0, femtos: 0.5e15 });
  expect(parseStamp('5.', 's')).toEqual({ seconds: 5, femtos: 0 });
  expect(parseStamp('1.574570929727E12', 'ms')).toEqual({ seconds: 1574570929, femtos: 727e12 });
  expect(parseStamp('1e-20', 's')).toEqual({ seconds: 0, femtos: 0.00001 });
  expect(parseStamp('25e-61', 'ns')).toEqual({ seconds: 0, femtos: 2.5e-54 });
  expect(parseStamp('000', 'ns')).toEqual({ seconds: 0, femtos: 0 });
});

test('parseStamp: null for what is no decimal number or beyond 15 digits of seconds', () => {
  for (const text of ['', '.', '-', 'e5', '1e', '1,5', '0x10', '12:30', 'Infinity', 'NaN', '1 2', '1e99999'])
    expect(parseStamp(text, 's'), text).toBeNull();
  expect(parseStamp('999999999999999', 's')).not.toBeNull();
  expect(parseStamp('1000000000000000', 's')).toBeNull();
});

test('secondsBetween: nanosecond epochs keep what a float64 of the stamp would lose', () => {
  // By hand: the stamps differ by 10000001 ns; as float64 both are rounded to multiples of 256.
  expect(between('1700000000015000001', '1700000000005000000', 'ns')).toBe(0.010000001);
  expect(Number('1700000000015000001') - Number('1700000000005000000')).not.toBe(10000001);
});

test('secondsBetween is the exact difference rounded once, for whole nanoseconds', () => {
  const stamp = fc.bigInt({ min: -(10n ** 19n), max: 10n ** 19n });
  // Up to 90 days apart: the range in which the difference in nanoseconds is below 2^53.
  const step = fc.bigInt({ min: -7_776_000_000_000_000n, max: 7_776_000_000_000_000n });
  fc.assert(
    fc.property(stamp, step, (start, ns) => {
      // The integer quotient of two exactly held numbers is rounded once by the division.
      expect(between(String(start + ns), String(start), 'ns') + 0).toBe(Number(ns) / 1e9);
    }),
    { seed: 20251, numRuns: 2000 },
  );
});

test('a time in seconds from 0 is the float64 nearest to what is written, to one unit in the last place', () => {
  fc.assert(
    fc.property(fc.double({ min: 0, max: 1e6, noNaN: true }), (t) => {
      // Tolerance: past 15 decimals the parts are rounded once each, and their sum once more.
      expect(Math.abs(between(String(t), '0', 's') - t)).toBeLessThanOrEqual(2 ** -52 * t + 1e-30);
    }),
    { seed: 20252, numRuns: 2000 },
  );
});

test('secondsSinceStart: truth in seconds against a log in milliseconds, by hand', () => {
  expect(secondsSinceStart('1574570929.6', 'log', { value: '1574570929727', unit: 'ms' })).toBe(-0.127);
  expect(secondsSinceStart('263240.253461638', 'log', { value: '263240253461638', unit: 'ns' })).toBe(0);
  expect(secondsSinceStart('12.25', 'relative', { value: '1574570929727', unit: 'ms' })).toBe(12.25);
});

test('secondsSinceStart: refuses what is no number', () => {
  const t0 = { value: '0', unit: 's' } as const;
  expect(() => secondsSinceStart('noon', 'log', t0)).toThrow('time "noon" is not a number of seconds');
});
