import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import {
  ecefFromGeodetic,
  type GeodeticGrid,
  geodeticFromGrid,
  gridFromGeodetic,
} from '../../src/geometry/enu.js';

const grid = (latDeg: number, lonDeg: number, heightM: number, rotationDeg = 0): GeodeticGrid => ({
  origin: { latDeg, lonDeg, heightM },
  rotationDeg,
});

describe('gridFromGeodetic', () => {
  test('published example: 33.3N 44.4E 6000 m seen from 33N 44E 20 m', () => {
    // Source: C. Karney, GeographicLib, manual page CartConvert, EXAMPLES: 37288.97 33374.29 5783.64.
    const p = gridFromGeodetic(33.3, 44.4, 6000, grid(33, 44, 20));
    // Tolerance: printed to 2 decimals, the last (5783.6466) cut off, not rounded.
    expect(Math.abs(p.eastM - 37288.97)).toBeLessThan(0.01);
    expect(Math.abs(p.northM - 33374.29)).toBeLessThan(0.01);
    expect(Math.abs(p.upM - 5783.64)).toBeLessThan(0.01);
  });

  test('published example: earth-centred coordinates', () => {
    // Source: pymap3d, tests/test_geodetic.py: 42N 82W 200 m; printed to 7 and 5 decimals.
    const [x, y, z] = ecefFromGeodetic(42, -82, 200);
    expect(Math.abs(x - 660675.2518247)).toBeLessThan(1e-6);
    expect(Math.abs(y - -4700948.68316)).toBeLessThan(1e-5);
    expect(Math.abs(z - 4245737.66222)).toBeLessThan(1e-5);
  });

  test('the origin is 0, 0, 0 and a point above it only up', () => {
    const g = grid(48.8583, 2.2944, 35, 30);
    expect(gridFromGeodetic(48.8583, 2.2944, 35, g)).toEqual({ eastM: 0, northM: 0, upM: 0 });
    const above = gridFromGeodetic(48.8583, 2.2944, 45, g);
    // Tolerance: earth-centred coordinates of 6e6 m are stored to 1e-9 m.
    expect(Math.hypot(above.eastM, above.northM, above.upM - 10)).toBeLessThan(3e-9);
  });

  test('a grid turned 90 degrees clockwise has its north in the true east', () => {
    const straight = gridFromGeodetic(48.8593, 2.2964, 0, grid(48.8583, 2.2944, 0));
    const turned = gridFromGeodetic(48.8593, 2.2964, 0, grid(48.8583, 2.2944, 0, 90));
    expect(turned.northM).toBeCloseTo(straight.eastM, 9);
    expect(turned.eastM).toBeCloseTo(-straight.northM, 9);
    expect(turned.upM).toBe(straight.upM);
  });

  test('refuses what is no position or no grid', () => {
    expect(() => gridFromGeodetic(90.1, 0, 0, grid(0, 0, 0))).toThrow(
      'latitude must be in -90..90 degrees, got 90.1',
    );
    expect(() => gridFromGeodetic(0, Number.NaN, 0, grid(0, 0, 0))).toThrow(
      'longitude (degrees) and height (m) must be finite, got NaN and 0',
    );
    expect(() => gridFromGeodetic(0, 0, 0, grid(0, 0, 0, Number.NaN))).toThrow(
      "the grid's rotation_deg must be a finite number (degrees), got NaN",
    );
  });
});

describe('geodeticFromGrid', () => {
  test('takes gridFromGeodetic back, everywhere on Earth', () => {
    const degrees = (from: number, to: number) => fc.double({ min: from, max: to, noNaN: true });
    fc.assert(
      fc.property(
        degrees(-90, 90),
        degrees(-180, 180),
        degrees(-400, 9000),
        degrees(-180, 180),
        fc.tuple(degrees(-5000, 5000), degrees(-5000, 5000), degrees(-50, 50)),
        (latDeg, lonDeg, heightM, rotationDeg, [eastM, northM, upM]) => {
          const g = grid(latDeg, lonDeg, heightM, rotationDeg);
          const p = geodeticFromGrid({ eastM, northM, upM }, g);
          const back = gridFromGeodetic(p.latDeg, p.lonDeg, p.heightM, g);
          // Tolerance: an ulp of 6e6 m is 1e-9 m, a few of them on the way there and back.
          expect(Math.hypot(back.eastM - eastM, back.northM - northM, back.upM - upM)).toBeLessThan(1e-8);
        },
      ),
      { seed: 41, numRuns: 500 },
    );
  });

  test('refuses NaN', () => {
    expect(() => geodeticFromGrid({ eastM: Number.NaN, northM: 0, upM: 0 }, grid(0, 0, 0))).toThrow(
      /earth-centred coordinates must be finite/,
    );
  });
});
