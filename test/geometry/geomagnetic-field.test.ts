import { describe, expect, test } from 'vitest';
import { decimalYear, geomagneticField } from '../../src/geometry/geomagnetic-field.js';

const place = { latDeg: 48.85, lonDeg: 2.35, heightM: 60 };

describe('geomagneticField', () => {
  test('the edition is the latest whose epoch is not after the date', () => {
    const at = (year: number) => geomagneticField({ ...place, decimalYear: year }).model;
    expect([2015, 2019.9, 2020, 2024.999, 2025, 2030].map(at)).toEqual([
      ...['WMM2015v2', 'WMM2015v2', 'WMM2020', 'WMM2020', 'WMM2025', 'WMM2025'],
    ]);
  });

  test('total, horizontal and the angles belong to one vector', () => {
    const f = geomagneticField({ ...place, decimalYear: 2026 });
    // Tolerance: a few roundings of 5e4 nT.
    expect(f.total_nT * Math.cos(f.inclinationRad)).toBeCloseTo(f.horizontal_nT, 8);
    expect(f.horizontal_nT * Math.cos(f.declinationRad)).toBeCloseTo(f.north_nT, 8);
    expect(f.horizontal_nT * Math.sin(f.declinationRad)).toBeCloseTo(f.east_nT, 8);
  });

  test('longitudes a full turn apart are one place', () => {
    const here = geomagneticField({ ...place, decimalYear: 2026 });
    const again = geomagneticField({ ...place, lonDeg: 362.35, decimalYear: 2026 });
    // Tolerance: the sine of 12 full turns more loses 4 ulp of 30 rad, times 5e4 nT.
    expect(again.east_nT).toBeCloseTo(here.east_nT, 6);
  });

  test('on the pole the total field does not depend on the longitude', () => {
    const totals = [0, 77, -140].map((lonDeg) => {
      const f = geomagneticField({ latDeg: 90, lonDeg, heightM: 0, decimalYear: 2026 });
      return f.total_nT;
    });
    expect(totals[1]).toBeCloseTo(totals[0]!, 7);
    expect(totals[2]).toBeCloseTo(totals[0]!, 7);
  });

  test('refuses dates the model does not cover, naming the range', () => {
    for (const year of [2014.99, 2030.01, Number.NaN])
      expect(() => geomagneticField({ ...place, decimalYear: year })).toThrow(
        `the geomagnetic model covers 2015.0 to 2030.0, got ${year}; give a date in that range, or the declination itself`,
      );
  });

  test('refuses positions that are none', () => {
    expect(() => geomagneticField({ ...place, latDeg: 91, decimalYear: 2026 })).toThrow(
      'geomagneticField: latDeg must be in -90..90 (degrees), got 91',
    );
    expect(() => geomagneticField({ ...place, lonDeg: Number.NaN, decimalYear: 2026 })).toThrow(
      'geomagneticField: lonDeg must be finite (degrees), got NaN',
    );
    expect(() => geomagneticField({ ...place, heightM: Number.NaN, decimalYear: 2026 })).toThrow(
      'geomagneticField: heightM must be in -1000..850000 (m), got NaN',
    );
  });
});

describe('decimalYear', () => {
  test('counts the days of the year it is in', () => {
    // Half of 365 days is 2 July noon; half of 366 days is 2 July midnight: exact in binary.
    expect(decimalYear('2025-07-02T12:00:00Z')).toBe(2025.5);
    expect(decimalYear('2028-07-02')).toBe(2028.5);
    expect(decimalYear('2026-01-01')).toBe(2026);
    // 24 November is day 328 of a common year.
    expect(decimalYear('2019-11-24')).toBe(2019 + 327 / 365);
  });

  test.each(['2025-02-30', '24.11.2019', '2025-7-2', '2025-07-02T12:00:00', '', '2025-13-01'])(
    'refuses %j',
    (text) => {
      expect(() => decimalYear(text)).toThrow(
        `"${text}" is no date; write it as 2026-03-14, or with a time in UTC as 2026-03-14T09:30:00Z`,
      );
    },
  );
});
