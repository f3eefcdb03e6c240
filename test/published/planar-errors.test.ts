import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import { alignPlanar } from '../../src/geometry/alignment-2d.js';
import { alignPoints } from '../../src/geometry/umeyama.js';
import { radialErrorCdf, radialErrorQuantile } from '../../src/stats/rayleigh.js';

// Source: data/stats/planar_errors.py, scipy 1.10.1.
const reference: Record<'biased' | 'unequal', [number, number, number][]> = JSON.parse(
  readFileSync(new URL('./data/stats/planar_errors.json', import.meta.url), 'utf8'),
);

// Tolerance: relative; ours and theirs integrate to about 1e-12, and a small slope of the share spreads that.
test.each(reference.biased)('share %d of circular errors about a bias of %d sigma', (p, bias, radius) => {
  const error = { sdX: 1, sdY: 1, biasX: 0.6 * bias, biasY: -0.8 * bias };
  expect(Math.abs(radialErrorQuantile(p, error) / radius - 1)).toBeLessThan(1e-9);
  expect(Math.abs(radialErrorCdf(radius, error) - p)).toBeLessThan(1e-9);
});

test.each(reference.unequal)('share %d of errors of standard deviations 1 and %d', (p, sd, radius) => {
  expect(Math.abs(radialErrorQuantile(p, { sdX: 1, sdY: sd }) / radius - 1)).toBeLessThan(1e-9);
  expect(Math.abs(radialErrorQuantile(p, { sdX: sd, sdY: 1 }) / radius - 1)).toBeLessThan(1e-9);
});

describe("Umeyama's example", () => {
  // Source: Umeyama (1991), IEEE TPAMI 13(4), 376-380, section V (rotation, scale and shift from memory,
  // and in closed form: R = [3 2; -2 3]/√13, c = √13/5, t = (-0.8, 0.4), residual 8/15).
  const root = Math.sqrt(13);

  test('alignPoints', () => {
    const a = alignPoints(
      Float64Array.of(0, 0, 1, 0, 0, 2),
      Float64Array.of(0, 0, -1, 0, 0, 2),
      2,
      'similarity',
    );
    [3 / root, 2 / root, -2 / root, 3 / root].forEach((r, k) => {
      expect(a.rotation[k]).toBeCloseTo(r, 14);
    });
    expect(a.scale).toBeCloseTo(root / 5, 14);
    expect(a.translation[0]).toBeCloseTo(-0.8, 14);
    expect(a.translation[1]).toBeCloseTo(0.4, 14);
    expect(a.rmse ** 2).toBeCloseTo(8 / 15, 14);
  });

  test('alignPlanar', () => {
    const a = alignPlanar([0, 1, 0], [0, 0, 2], [0, -1, 0], [0, 0, 2], 'similarity');
    expect(a.turnRad).toBeCloseTo(Math.atan2(2, 3), 14);
    expect(a.scale).toBeCloseTo(root / 5, 14);
    expect(a.eastM).toBeCloseTo(-0.8, 14);
    expect(a.northM).toBeCloseTo(0.4, 14);
    expect(a.rmseM ** 2).toBeCloseTo(8 / 15, 14);
  });
});
