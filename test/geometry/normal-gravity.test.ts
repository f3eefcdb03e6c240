import { describe, expect, test } from 'vitest';
import { normalGravity } from '../../src/geometry/normal-gravity.js';

describe('normalGravity', () => {
  test.each([
    // Source: NIMA TR8350.2, table 3.4: gravity at the equator and the poles.
    [0, 9.7803253359],
    [90, 9.8321849378],
    // Source: the closed formula of Somigliana worked out independently to 10 decimals.
    [45, 9.8061977694],
    [-45, 9.8061977694],
    [20, 9.7863681034],
    [70, 9.8260947644],
  ])('on the ellipsoid at %d degrees', (latDeg, gravity) => {
    // Tolerance: 10 decimals printed; the polar constant is rounded against the formula by 1e-10.
    expect(Math.abs(normalGravity(latDeg, 0) - gravity)).toBeLessThan(1.1e-10);
  });

  test.each([
    // Source: test/published/data/stats/normal_gravity.py, the gradient of the normal potential, 12 digits.
    [0, 2000, 9.77415264539],
    [45, 2000, 9.80002947454],
    [45, 10000, 9.77541418823],
    [80, 10000, 9.79985153547],
  ])('above the ellipsoid at %d degrees, %d m', (latDeg, heightM, gravity) => {
    // Tolerance: the series leaves out terms of the flattening times h²; 4e-7 at 10 km. The linear term alone is
    // off by 7e-5.
    expect(Math.abs(normalGravity(latDeg, heightM) - gravity)).toBeLessThan(5e-7);
  });

  test('falls by 0.3086 mGal per metre', () => {
    // From memory: the usual free-air gradient, 3.086e-6 s^-2, good to its last digit near 45 degrees.
    const gradient = (normalGravity(45, 50) - normalGravity(45, -50)) / 100;
    expect(Math.abs(gradient + 3.086e-6)).toBeLessThan(0.002e-6);
  });

  test('refuses what is no place', () => {
    expect(() => normalGravity(Number.NaN, 0)).toThrow(
      'normalGravity: latDeg must be in -90..90 (degrees), got NaN',
    );
    expect(() => normalGravity(45, 30000)).toThrow(
      'normalGravity: heightM must be in -500..20000 (m), got 30000',
    );
  });
});
