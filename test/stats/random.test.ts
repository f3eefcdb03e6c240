import { describe, expect, test } from 'vitest';
import { normalCdf } from '../../src/stats/normal.js';
import { randomStream } from '../../src/stats/random.js';

describe('randomStream', () => {
  test('regression: the first numbers of a stream', () => {
    // Our own output, frozen: simulated campaigns and bootstrap intervals depend on every digit.
    const stream = randomStream(1, 'walk-01', 'gyro');
    const first = [stream.uniform(), stream.normal(), stream.normal(), stream.integer(0, 1000)];
    expect(first).toEqual([0.35039901999745426, 1.7220897762472793, -1.1053820133869505, 508]);
  });

  test('seed, labels, their order and their kind make the stream', () => {
    const first = (seed: number, ...labels: (string | number)[]) => randomStream(seed, ...labels).uniform();
    const all = [
      first(1),
      first(2),
      first(1, 'a'),
      first(1, 'a', 'b'),
      first(1, 'b', 'a'),
      first(1, 'ab'),
      first(1, 1),
      first(1, '1'),
      first(-1),
    ];
    expect(new Set(all).size).toBe(all.length);
    expect(first(1, 'a', 2)).toBe(first(1, 'a', 2));
  });

  test('normal: Kolmogorov-Smirnov distance and moments of a million', () => {
    const stream = randomStream(20, 'normal');
    const n = 1_000_000;
    const draws = Float64Array.from({ length: n }, () => stream.normal()).sort();
    let distance = 0;
    let squares = 0;
    let fourths = 0;
    for (let i = 0; i < n; i++) {
      if (i % 50 === 0) distance = Math.max(distance, Math.abs(normalCdf(draws[i]!) - (i + 0.5) / n));
      squares += draws[i]! ** 2;
      fourths += draws[i]! ** 4;
    }
    // Tolerance: the 1 % point of the distance is 1.63/sqrt(n) (from memory), moments at 4 standard errors
    // sqrt(2/n) and sqrt(96/n). The seed is fixed, so this passes always or never.
    expect(distance).toBeLessThan(1.63 / Math.sqrt(n));
    expect(Math.abs(squares / n - 1)).toBeLessThan(4 * Math.sqrt(2 / n));
    expect(Math.abs(fourths / n - 3)).toBeLessThan(4 * Math.sqrt(96 / n));
    // The tail beyond the outermost layer: 5.8e-4 of all lie outside ±3.4426, ±4 standard errors.
    const outside = draws.filter((x) => Math.abs(x) > 3.442619855899).length;
    const expected = 2 * n * normalCdf(-3.442619855899);
    expect(Math.abs(outside - expected)).toBeLessThan(4 * Math.sqrt(expected));
  });

  test('normal: the far tail falls as it should', () => {
    const stream = randomStream(21, 'tail');
    const n = 8_000_000;
    let beyond = 0;
    for (let i = 0; i < n; i++) if (Math.abs(stream.normal()) > 4) beyond++;
    // Tolerance: 4 standard errors; a tail that only fell exponentially would be 7 away.
    const expected = 2 * n * normalCdf(-4);
    expect(Math.abs(beyond - expected)).toBeLessThan(4 * Math.sqrt(expected));
  });

  test('uniform: in [0, 1), equal shares, all bits in use', () => {
    const stream = randomStream(3, 'uniform');
    const counts = new Float64Array(64);
    let odd = 0;
    const n = 640_000;
    for (let i = 0; i < n; i++) {
      const u = stream.uniform();
      counts[Math.floor(u * 64)]!++;
      odd += (u * 2 ** 53) % 2;
    }
    const chiSquare = counts.reduce((sum, count) => sum + (count - n / 64) ** 2 / (n / 64), 0);
    // Tolerance: chi-square of 63 degrees exceeds 103.4 once in a thousand (from memory).
    expect(chiSquare).toBeLessThan(103.4);
    expect(Math.abs(odd / n - 0.5)).toBeLessThan(2 / Math.sqrt(n));
  });

  test('integer: every value of the range, none outside, negative bounds too', () => {
    const stream = randomStream(4, 'integer');
    const counts = new Map<number, number>();
    for (let i = 0; i < 70_000; i++) {
      const value = stream.integer(-3, 4);
      counts.set(value, (counts.get(value) ?? 0) + 1);
    }
    expect([...counts.keys()].sort((a, b) => a - b)).toEqual([-3, -2, -1, 0, 1, 2, 3]);
    // Tolerance: 10000 each, 4 standard deviations of 93.
    for (const count of counts.values()) expect(Math.abs(count - 10_000)).toBeLessThan(4 * 93);
    expect(stream.integer(5, 6)).toBe(5);
  });

  test('shuffle: the six orders of three equally often, in place', () => {
    const stream = randomStream(5, 'shuffle');
    const counts = new Map<string, number>();
    for (let i = 0; i < 60_000; i++) {
      const order = stream.shuffle(['a', 'b', 'c']).join('');
      counts.set(order, (counts.get(order) ?? 0) + 1);
    }
    expect(counts.size).toBe(6);
    // Tolerance: 10000 each, 4 standard deviations of 91.
    for (const count of counts.values()) expect(Math.abs(count - 10_000)).toBeLessThan(4 * 91);
    const items = new Float64Array([1, 2, 3, 4, 5]);
    expect(stream.shuffle(items)).toBe(items);
    expect([...items].sort()).toEqual([1, 2, 3, 4, 5]);
    expect(stream.shuffle([])).toEqual([]);
  });

  test('refusals', () => {
    expect(() => randomStream(0.5)).toThrow('seed must be a whole number within ±2^53, got 0.5');
    expect(() => randomStream(Number.NaN)).toThrow('seed must be a whole number within ±2^53, got NaN');
    expect(() => randomStream(1, Number.NaN)).toThrow(
      'randomStream: a label must be a word or a finite number, got NaN',
    );
    expect(() => randomStream(1).integer(3, 3)).toThrow(
      'integer: needs whole numbers lo < hiExclusive, at most 2^32 apart, got 3 and 3',
    );
  });
});
