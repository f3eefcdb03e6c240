import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import { butterworthHighPass, butterworthLowPass } from '../../src/signal/butterworth.js';
import { localMaxima, parabolicTop, peakProminences } from '../../src/signal/local-maxima.js';
import { zeroPhase } from '../../src/signal/zero-phase.js';

interface Reference {
  samples: number[];
  cases: {
    order: number;
    kind: 'low' | 'high';
    cutoffHz: number;
    sampleRateHz: number;
    expected: number[];
  }[];
  peaks: number[];
  prominences: number[];
}
// Source: scipy 1.10.1, see data/SOURCE.md.
const reference = JSON.parse(
  readFileSync(new URL('data/scipy-filters.json', import.meta.url), 'utf8'),
) as Reference;
const samples = Float64Array.from(reference.samples);

describe('zeroPhase', () => {
  for (const c of reference.cases)
    test(`agrees with scipy's sosfiltfilt: order ${c.order} ${c.kind}-pass at ${c.cutoffHz} of ${c.sampleRateHz} Hz`, () => {
      const design = c.kind === 'low' ? butterworthLowPass : butterworthHighPass;
      const filtered = zeroPhase(design(c.order, c.cutoffHz, c.sampleRateHz), samples);
      // Tolerance: both sum some hundred terms of order 1 in doubles; 1e-11 leaves four digits for their order.
      for (const [i, expected] of c.expected.entries())
        expect(Math.abs(filtered[i]! - expected), `sample ${i}`).toBeLessThan(1e-11);
    });

  test('leaves a constant alone, also a short one', () => {
    const sections = butterworthLowPass(4, 3, 50);
    for (const n of [1, 2, 5, 200])
      for (const y of zeroPhase(sections, new Float64Array(n).fill(9.81))) expect(y).toBeCloseTo(9.81, 12);
    expect(zeroPhase(sections, new Float64Array(0))).toHaveLength(0);
  });

  test('refuses a cut-off beyond half the sampling rate, and NaN', () => {
    expect(() => butterworthLowPass(4, 30, 50)).toThrow(
      'butterworth: cut-off must lie between 0 and 25 Hz (half the sampling rate), got 30',
    );
    expect(() => butterworthLowPass(4, Number.NaN, 50)).toThrow('got NaN');
  });
});

describe('local maxima', () => {
  test("are scipy's find_peaks, with its prominences", () => {
    const peaks = localMaxima(samples);
    expect([...peaks]).toEqual(reference.peaks);
    const prominences = peakProminences(samples, peaks);
    // The same differences of the same doubles: no rounding of its own.
    for (const [i, expected] of reference.prominences.entries()) expect(prominences[i]).toBe(expected);
  });

  test('the middle of a flat top; none at the ends; none in a constant', () => {
    expect([...localMaxima(Float64Array.of(0, 2, 2, 2, 0, 3))]).toEqual([2]);
    expect([...localMaxima(new Float64Array(9).fill(1))]).toEqual([]);
    expect([...localMaxima(Float64Array.of(1))]).toEqual([]);
  });

  test('parabolicTop finds the top of a parabola exactly', () => {
    const top = 4.3;
    const parabola = Float64Array.from({ length: 9 }, (_, i) => 5 - (i - top) ** 2);
    expect(parabolicTop(parabola, 4)).toBeCloseTo(top, 12);
    expect(parabolicTop(parabola, 0)).toBe(0);
  });
});
