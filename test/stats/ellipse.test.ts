import { describe, expect, test } from 'vitest';
import { consistency, errorEllipse, normalizedErrorSquared } from '../../src/stats/ellipse.js';
import { randomStream } from '../../src/stats/random.js';
import { circularErrorFactor, radialErrorCdf, radialErrorQuantile } from '../../src/stats/rayleigh.js';

describe('circularErrorFactor', () => {
  test.each([
    // Source: the Rayleigh distribution in closed form, radius sqrt(-2 ln(1 - p)), 8 decimals.
    [0, 0],
    [0.5, 1.17741002],
    [0.6321205588285577, Math.SQRT2],
    [0.75, 1.66510922],
    [0.9, 2.14596603],
    [0.95, 2.44774683],
    [0.99, 3.03485426],
  ])('%d', (p, factor) => {
    expect(circularErrorFactor(p)).toBeCloseTo(factor, 8);
  });

  test('NSSDA: horizontal accuracy is 1.7308 times the radial RMSE', () => {
    // Source: FGDC-STD-007.3-1998, from memory; 4 decimals.
    expect(circularErrorFactor(0.95) / Math.SQRT2).toBeCloseTo(1.7308, 4);
  });

  test('refuses', () => {
    expect(() => circularErrorFactor(95)).toThrow('circularErrorFactor: probability must be in 0..1, got 95');
  });
});

describe('radialErrorCdf', () => {
  test('equal axes give the Rayleigh distribution', () => {
    for (const r of [0.1, 1, 3, 8])
      expect(radialErrorCdf(2 * r, { sdX: 2, sdY: 2 })).toBeCloseTo(1 - Math.exp((-r * r) / 2), 13);
  });

  test('the ends', () => {
    expect(radialErrorCdf(0, { sdX: 1, sdY: 2 })).toBe(0);
    expect(radialErrorCdf(Number.POSITIVE_INFINITY, { sdX: 1, sdY: 2 })).toBe(1);
    expect(radialErrorCdf(1, { sdX: 1, sdY: 1, biasX: 100 })).toBe(0);
    expect(radialErrorQuantile(0, { sdX: 1, sdY: 2 })).toBe(0);
  });

  test('refusals', () => {
    expect(() => radialErrorCdf(-1, { sdX: 1, sdY: 1 })).toThrow(
      'radialErrorCdf: radius must be at least 0, got -1',
    );
    expect(() => radialErrorQuantile(0.5, { sdX: 0, sdY: 1 })).toThrow(
      'radialErrorCdf: standard deviations must be finite and above 0 and biases finite, got 0, 1, 0, 0',
    );
    expect(() => radialErrorQuantile(1, { sdX: 1, sdY: 1 })).toThrow(
      'radialErrorQuantile: probability must be at least 0 and below 1, got 1',
    );
  });
});

describe('errorEllipse', () => {
  test('a circle has the circular factor', () => {
    const e = errorEllipse({ ee: 4, en: 0, nn: 4 }, 0.95);
    expect(e.semiMajorM).toBeCloseTo(2 * circularErrorFactor(0.95), 12);
    expect(e.semiMinorM).toBeCloseTo(2 * circularErrorFactor(0.95), 12);
  });

  test('the azimuth counts clockwise from north', () => {
    const azimuth = (ee: number, en: number, nn: number) => errorEllipse({ ee, en, nn }, 0.5).azimuthRad;
    expect(azimuth(1, 0, 9)).toBe(0);
    expect(azimuth(9, 0, 1)).toBeCloseTo(Math.PI / 2, 14);
    expect(azimuth(5, 4, 5)).toBeCloseTo(Math.PI / 4, 14);
    expect(azimuth(5, -4, 5)).toBeCloseTo((3 * Math.PI) / 4, 14);
  });

  test('its axes end where the normalised error reaches the edge', () => {
    const covariance = { ee: 3, en: 1.2, nn: 0.8 };
    const e = errorEllipse(covariance, 0.9);
    const edge = circularErrorFactor(0.9) ** 2;
    const [s, c] = [Math.sin(e.azimuthRad), Math.cos(e.azimuthRad)];
    expect(normalizedErrorSquared(e.semiMajorM * s, e.semiMajorM * c, covariance)).toBeCloseTo(edge, 12);
    expect(normalizedErrorSquared(e.semiMinorM * c, -e.semiMinorM * s, covariance)).toBeCloseTo(edge, 12);
  });

  test('refuses what is no covariance', () => {
    expect(() => errorEllipse({ ee: 1, en: 2, nn: 1 }, 0.5)).toThrow(
      'errorEllipse: the covariance must be positive definite, got ee 1, en 2, nn 1 (m²)',
    );
    expect(() => errorEllipse({ ee: 1, en: 0, nn: 1 }, 1)).toThrow(
      'errorEllipse: probability must be between 0 and 1, got 1',
    );
    expect(() => normalizedErrorSquared(Number.NaN, 0, { ee: 1, en: 0, nn: 1 })).toThrow(
      'normalizedErrorSquared: the error is (NaN, 0)',
    );
  });
});

describe('consistency', () => {
  test('honest covariances: mean 2 inside its interval, coverage as asked', () => {
    const random = randomStream(9, 'nees');
    const n = 20_000;
    const nees = Float64Array.from({ length: n }, () => {
      const [a, b] = [random.normal(), random.normal()];
      // Covariance [5 2; 2 1] from the factor [√5 0; 2/√5 1/√5].
      return normalizedErrorSquared(Math.sqrt(5) * a, (2 * a + b) / Math.sqrt(5), { ee: 5, en: 2, nn: 1 });
    });
    const c = consistency(nees);
    expect(c.neesLow).toBeLessThan(c.meanNees);
    expect(c.neesHigh).toBeGreaterThan(c.meanNees);
    // Tolerance: 4 binomial standard errors.
    expect(Math.abs(c.coverage - 0.95)).toBeLessThan(4 * Math.sqrt((0.95 * 0.05) / n));
  });

  test('the interval of the mean', () => {
    // Source: chi-square of 100 degrees, 2.5 and 97.5 %: 74.222 and 129.561 (printed tables), over 50.
    const c = consistency(new Float64Array(50).fill(2));
    expect(c.neesLow).toBeCloseTo(74.222 / 50, 4);
    expect(c.neesHigh).toBeCloseTo(129.561 / 50, 4);
    expect(c.coverage).toBe(1);
  });

  test('refusals', () => {
    expect(() => consistency([])).toThrow('consistency: needs at least one error, got none');
    expect(() => consistency([1, Number.NaN])).toThrow(
      'consistency: normalised error 1 must be finite and at least 0, got NaN',
    );
    expect(() => consistency([1], 95)).toThrow(
      'consistency: probability and confidence must be between 0 and 1, got 95 and 0.95',
    );
  });
});
