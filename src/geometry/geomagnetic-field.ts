import { InputError } from '../errors.js';
import { WGS84_A_M, WGS84_E2 } from './wgs84.js';
import { GEOMAGNETIC_MODELS, type GeomagneticModel } from './wmm-coefficients.js';

export interface GeomagneticField {
  north_nT: number;
  east_nT: number;
  down_nT: number;
  horizontal_nT: number;
  total_nT: number;
  /** From true north, east positive, in (-pi, pi]. */
  declinationRad: number;
  /** Below the horizontal, down positive. */
  inclinationRad: number;
  /** The edition of the World Magnetic Model used. */
  model: string;
}

const DEGREE = 12;
const REFERENCE_RADIUS_M = 6371200;
const FIRST_YEAR = GEOMAGNETIC_MODELS[0]!.epoch;
const END_YEAR = GEOMAGNETIC_MODELS.at(-1)!.epoch + 5;

/**
 * The Earth's main magnetic field by the World Magnetic Model, 2015.0 to 2030.0.
 *
 * The edition is the latest whose epoch is not after the date. Legendre functions and their quotients
 * by the sine of the colatitude come from recursions of their own, so the poles need no special case.
 * The model leaves out crust, buildings and the day's variation; its stated declination error for
 * 2025 is sqrt(0.26² + (5417/H)²) degrees with H in nT.
 *
 * @param position.latDeg - geodetic latitude on WGS84, -90..90, degrees.
 * @param position.lonDeg - longitude, east positive, degrees.
 * @param position.heightM - above the ellipsoid, -1000..850000, metres (the model's own range).
 * @param position.decimalYear - 2015 <= year <= 2030, see {@link decimalYear}.
 * @returns nT and radians.
 * @throws InputError `latitude`, `not-finite`, `height`, `date-range`.
 * @see Chulliat et al. (2025), The US/UK World Magnetic Model for 2025-2030, NOAA technical report;
 *   the equations are unchanged from Chulliat et al. (2020), section 1.2.
 */
export function geomagneticField(position: {
  latDeg: number;
  lonDeg: number;
  heightM: number;
  decimalYear: number;
}): GeomagneticField {
  const { latDeg, lonDeg, heightM, decimalYear: year } = position;
  if (!(latDeg >= -90 && latDeg <= 90))
    throw new InputError('latitude', `geomagneticField: latDeg must be in -90..90 (degrees), got ${latDeg}`);
  if (!Number.isFinite(lonDeg))
    throw new InputError('not-finite', `geomagneticField: lonDeg must be finite (degrees), got ${lonDeg}`);
  if (!(heightM >= -1000 && heightM <= 850000))
    throw new InputError('height', `geomagneticField: heightM must be in -1000..850000 (m), got ${heightM}`);
  const model = modelFor(year);

  // Geodetic to geocentric: radius, and the angle psi between the two verticals.
  const lat = (latDeg * Math.PI) / 180;
  const lon = (lonDeg * Math.PI) / 180;
  const primeVertical = WGS84_A_M / Math.sqrt(1 - WGS84_E2 * Math.sin(lat) ** 2);
  // The cosine of exactly ±90 degrees is 6e-17, harmless here: no step divides by it.
  const fromAxis = (primeVertical + heightM) * Math.cos(lat);
  const alongAxis = (primeVertical * (1 - WGS84_E2) + heightM) * Math.sin(lat);
  const radius = Math.hypot(fromAxis, alongAxis);
  const psi = Math.atan2(alongAxis, fromAxis) - lat;
  const spherical = sphericalField(
    model,
    year - model.epoch,
    radius,
    alongAxis / radius,
    fromAxis / radius,
    lon,
  );

  const north_nT = spherical.north * Math.cos(psi) - spherical.down * Math.sin(psi);
  const down_nT = spherical.north * Math.sin(psi) + spherical.down * Math.cos(psi);
  const east_nT = spherical.east;
  const horizontal_nT = Math.hypot(north_nT, east_nT);
  return {
    north_nT,
    east_nT,
    down_nT,
    horizontal_nT,
    total_nT: Math.hypot(horizontal_nT, down_nT),
    declinationRad: Math.atan2(east_nT, north_nT),
    inclinationRad: Math.atan2(down_nT, horizontal_nT),
    model: model.name,
  };
}

/**
 * The year and the part of it gone by, of a date in the Gregorian calendar (UTC).
 *
 * @param isoDate - `2026-03-14` (its midnight) or `2026-03-14T09:30:00Z`.
 * @returns 2025.5 for 2025-07-02T12:00:00Z: the part is of 365 or 366 days.
 * @throws InputError `date` on anything else, also 30 February.
 */
export function decimalYear(isoDate: string): number {
  const shape = /^(\d{4})-(\d{2})-(\d{2})(T\d{2}:\d{2}(:\d{2}(\.\d{1,3})?)?Z)?$/.exec(isoDate);
  const atMs = shape ? Date.parse(isoDate) : Number.NaN;
  const year = Number(shape?.[1]);
  const midnight = new Date(Date.UTC(year, Number(shape?.[2]) - 1, Number(shape?.[3])));
  if (!shape || !Number.isFinite(atMs) || midnight.toISOString().slice(0, 10) !== isoDate.slice(0, 10))
    throw new InputError(
      'date',
      `"${isoDate}" is no date; write it as 2026-03-14, or with a time in UTC as 2026-03-14T09:30:00Z`,
    );
  const startMs = Date.UTC(year, 0, 1);
  return year + (atMs - startMs) / (Date.UTC(year + 1, 0, 1) - startMs);
}

function modelFor(year: number): GeomagneticModel {
  if (!(year >= FIRST_YEAR && year <= END_YEAR))
    throw new InputError(
      'date-range',
      `the geomagnetic model covers ${FIRST_YEAR}.0 to ${END_YEAR}.0, got ${year}; give a date in that range, or the declination itself`,
    );
  return GEOMAGNETIC_MODELS.findLast((model) => model.epoch <= year)!;
}

/** The field in geocentric axes, nT. `sinLat`, `cosLat` are of the geocentric latitude. */
function sphericalField(
  model: GeomagneticModel,
  years: number,
  radiusM: number,
  sinLat: number,
  cosLat: number,
  lonRad: number,
): { north: number; east: number; down: number } {
  let north = 0;
  let east = 0;
  let down = 0;
  // One column of Legendre functions per order m: p is P(n,m), dp its derivative by colatitude,
  // q is P(n,m)/sin(colatitude), used for m >= 1 only.
  let sectoral = 1;
  let sectoralSlope = 0;
  let sectoralOverSine = 0;
  for (let m = 0; m <= DEGREE; m++) {
    if (m > 0) {
      const scale = m === 1 ? 1 : Math.sqrt(1 - 1 / (2 * m));
      sectoralSlope = scale * (cosLat * sectoralSlope + sinLat * sectoral);
      sectoralOverSine = m === 1 ? 1 : scale * cosLat * sectoralOverSine;
      sectoral = scale * cosLat * sectoral;
    }
    const cosM = Math.cos(m * lonRad);
    const sinM = Math.sin(m * lonRad);
    let [p, dp, q] = [sectoral, sectoralSlope, sectoralOverSine];
    let [pBefore, dpBefore, qBefore] = [0, 0, 0];
    for (let n = m; n <= DEGREE; n++) {
      if (n > m) {
        const below = Math.sqrt((n - 1) ** 2 - m * m);
        const norm = 1 / Math.sqrt(n * n - m * m);
        const odd = 2 * n - 1;
        const pNext = (odd * sinLat * p - below * pBefore) * norm;
        const dpNext = (odd * (sinLat * dp - cosLat * p) - below * dpBefore) * norm;
        const qNext = (odd * sinLat * q - below * qBefore) * norm;
        [pBefore, dpBefore, qBefore] = [p, dp, q];
        [p, dp, q] = [pNext, dpNext, qNext];
      }
      if (n === 0) continue;
      const at = 4 * ((n * (n + 1)) / 2 + m - 1);
      const g = model.terms[at]! + years * model.terms[at + 2]!;
      const h = model.terms[at + 1]! + years * model.terms[at + 3]!;
      const fall = (REFERENCE_RADIUS_M / radiusM) ** (n + 2);
      north += fall * (g * cosM + h * sinM) * dp;
      east += fall * m * (g * sinM - h * cosM) * q;
      down -= fall * (n + 1) * (g * cosM + h * sinM) * p;
    }
  }
  return { north, east, down };
}
