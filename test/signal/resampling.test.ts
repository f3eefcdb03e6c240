import { describe, expect, test } from 'vitest';
import { fillGaps } from '../../src/signal/fill-gaps.js';
import { interpolateLinear } from '../../src/signal/interpolate.js';
import { interpolateCubic } from '../../src/signal/interpolate-cubic.js';
import { decimate, lowPassTaps } from '../../src/signal/low-pass-fir.js';
import { medianRateHz } from '../../src/signal/sampling-rate.js';

describe('interpolateCubic', () => {
  test('keeps a quadratic exactly, at uneven times', () => {
    const t = Float64Array.of(0, 0.1, 0.25, 0.3, 0.5, 0.8, 0.9);
    const y = t.map((x) => 3 * x * x - x + 2);
    const out = interpolateCubic(t, y, 0.1, 0.05, 14);
    // Ends excluded: there the slope is one-sided, as documented.
    for (let i = 0; i < 13; i++) {
      const x = 0.1 + 0.05 * i;
      if (x <= 0.8) expect(out[i]).toBeCloseTo(3 * x * x - x + 2, 12);
    }
  });

  test('holds the ends', () => {
    const out = interpolateCubic(Float64Array.of(1, 2), Float64Array.of(5, 7), 0, 1, 4);
    expect([...out]).toEqual([5, 5, 7, 7]);
  });
});

describe('decimate', () => {
  test('passes 1 Hz and stops what would fold, from 200 to 50 Hz', () => {
    const taps = lowPassTaps(0.4 / 4, 14 * 4);
    const tone = (hz: number) =>
      Float64Array.from({ length: 4000 }, (_, i) => Math.sin((2 * Math.PI * hz * i) / 200));
    // Amplitude by the root mean square over 800 of the thinned samples: a whole number of periods of each tone.
    const amplitude = (hz: number) => {
      const kept = decimate(tone(hz), taps, 4).subarray(100, 900);
      return Math.sqrt((2 * kept.reduce((sum, y) => sum + y * y, 0)) / kept.length);
    };
    // 0.1 %: the design's ripple in the flat part; 10 Hz lies below 0.3 of the new rate.
    expect(Math.abs(amplitude(1) - 1)).toBeLessThan(1e-3);
    expect(Math.abs(amplitude(10) - 1)).toBeLessThan(1e-3);
    // Stop band of the Blackman window: -74 dB (Oppenheim & Schafer, table of window designs; from memory).
    for (const hz of [27, 40, 70]) expect(amplitude(hz)).toBeLessThan(10 ** (-74 / 20));
  });
});

describe('medianRateHz', () => {
  test('sees through millisecond stamps, gaps and duplicates', () => {
    const t = Float64Array.from(
      { length: 3000 },
      (_, i) => Math.round((1000 * i) / 66.7) / 1000 + (i > 1500 ? 7 : 0),
    );
    t[100] = t[99]!;
    // The rounding of stamps averages out over 3000 of them: below 1e-3 relative.
    expect(Math.abs(medianRateHz(t) / 66.7 - 1)).toBeLessThan(1e-3);
    expect(medianRateHz(Float64Array.of(1))).toBeNaN();
  });
});

describe('fillGaps', () => {
  test('bridges straight, holds the ends, leaves a whole signal alone', () => {
    const n = Number.NaN;
    expect([...fillGaps(Float64Array.of(n, 1, n, n, 4, n))]).toEqual([1, 1, 2, 3, 4, 4]);
    expect([...fillGaps(Float64Array.of(n, n))]).toEqual([0, 0]);
    const whole = Float64Array.of(1, 2);
    expect(fillGaps(whole)).toBe(whole);
  });
});

describe('interpolateLinear', () => {
  test('a later reading at the same time counts from there on', () => {
    const out = interpolateLinear(
      Float64Array.of(0, 1, 1, 2),
      Float64Array.of(0, 1, 5, 6),
      Float64Array.of(0.5, 1, 1.5, 9),
    );
    expect([...out]).toEqual([0.5, 5, 5.5, 6]);
  });
});
