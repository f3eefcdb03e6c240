import { InputError } from '../errors.js';
import { WGS84_A_M, WGS84_E2, WGS84_FLATTENING } from './wgs84.js';

/** A campaign's plane grid: its origin, and how far its north is turned clockwise from true north. */
export interface GeodeticGrid {
  origin: { latDeg: number; lonDeg: number; heightM: number };
  rotationDeg: number;
}

export interface GridPoint {
  eastM: number;
  northM: number;
  upM: number;
}

export interface GeodeticPoint {
  latDeg: number;
  lonDeg: number;
  heightM: number;
}

const RAD = Math.PI / 180;

/**
 * Grid coordinates of a geodetic position.
 *
 * Through earth-centred coordinates, not the flat-earth shortcut: that is wrong by millimetres per
 * 100 m and leaves out the drop of the ellipsoid below the tangent plane.
 *
 * @param latDeg - geodetic latitude on WGS84, -90..90, degrees.
 * @param lonDeg - longitude, east positive, degrees.
 * @param heightM - above the ellipsoid, metres.
 * @returns metres in the tangent plane at the origin, turned to grid north, and metres above it.
 * @throws InputError `latitude` outside -90..90; `not-finite` on NaN or ±Infinity.
 * @see Hofmann-Wellenhof, Lichtenegger & Wasle (2008), GNSS, Springer, ch. 8 (from memory).
 */
export function gridFromGeodetic(
  latDeg: number,
  lonDeg: number,
  heightM: number,
  grid: GeodeticGrid,
): GridPoint {
  const { latDeg: lat0, lonDeg: lon0, heightM: h0 } = grid.origin;
  const p = ecefFromGeodetic(latDeg, lonDeg, heightM);
  const o = ecefFromGeodetic(lat0, lon0, h0);
  const dx = p[0] - o[0];
  const dy = p[1] - o[1];
  const dz = p[2] - o[2];
  const [sinLat, cosLat] = [Math.sin(lat0 * RAD), Math.cos(lat0 * RAD)];
  const [sinLon, cosLon] = [Math.sin(lon0 * RAD), Math.cos(lon0 * RAD)];
  const outward = cosLon * dx + sinLon * dy;
  const east = cosLon * dy - sinLon * dx;
  const north = cosLat * dz - sinLat * outward;
  const [sinTurn, cosTurn] = turn(grid);
  return {
    eastM: cosTurn * east - sinTurn * north,
    northM: sinTurn * east + cosTurn * north,
    upM: cosLat * outward + sinLat * dz,
  };
}

/**
 * Geodetic position of grid coordinates; the inverse of {@link gridFromGeodetic} to a nanometre.
 *
 * @param point - metres.
 * @returns degrees on WGS84 (longitude in (-180, 180]) and metres above the ellipsoid.
 * @throws InputError `latitude`, `not-finite` as above.
 */
export function geodeticFromGrid(point: GridPoint, grid: GeodeticGrid): GeodeticPoint {
  const { latDeg: lat0, lonDeg: lon0, heightM: h0 } = grid.origin;
  const o = ecefFromGeodetic(lat0, lon0, h0);
  const [sinTurn, cosTurn] = turn(grid);
  const east = cosTurn * point.eastM + sinTurn * point.northM;
  const north = cosTurn * point.northM - sinTurn * point.eastM;
  const [sinLat, cosLat] = [Math.sin(lat0 * RAD), Math.cos(lat0 * RAD)];
  const [sinLon, cosLon] = [Math.sin(lon0 * RAD), Math.cos(lon0 * RAD)];
  const outward = cosLat * point.upM - sinLat * north;
  return geodeticFromEcef(
    o[0] + cosLon * outward - sinLon * east,
    o[1] + sinLon * outward + cosLon * east,
    o[2] + sinLat * point.upM + cosLat * north,
  );
}

/**
 * Earth-centred, earth-fixed coordinates (x to 0N 0E, z to the north pole), metres.
 *
 * @throws InputError `latitude`, `not-finite` as {@link gridFromGeodetic}.
 */
export function ecefFromGeodetic(latDeg: number, lonDeg: number, heightM: number): [number, number, number] {
  if (!(latDeg >= -90 && latDeg <= 90))
    throw new InputError('latitude', `latitude must be in -90..90 degrees, got ${latDeg}`);
  if (!Number.isFinite(lonDeg) || !Number.isFinite(heightM))
    throw new InputError(
      'not-finite',
      `longitude (degrees) and height (m) must be finite, got ${lonDeg} and ${heightM}`,
    );
  const sinLat = Math.sin(latDeg * RAD);
  const cosLat = Math.cos(latDeg * RAD);
  const primeVertical = WGS84_A_M / Math.sqrt(1 - WGS84_E2 * sinLat * sinLat);
  const fromAxis = (primeVertical + heightM) * cosLat;
  return [
    fromAxis * Math.cos(lonDeg * RAD),
    fromAxis * Math.sin(lonDeg * RAD),
    (primeVertical * (1 - WGS84_E2) + heightM) * sinLat,
  ];
}

/**
 * The inverse of {@link ecefFromGeodetic}, to a nanometre for heights within 1000 km of the ellipsoid.
 *
 * @throws InputError `not-finite`.
 * @see Bowring (1976), Survey Review 23(181), 323-327, repeated until it stands (two or three rounds).
 */
export function geodeticFromEcef(x: number, y: number, z: number): GeodeticPoint {
  if (!Number.isFinite(x + y + z))
    throw new InputError('not-finite', `earth-centred coordinates must be finite, got ${x}, ${y}, ${z}`);
  const fromAxis = Math.hypot(x, y);
  const b = WGS84_A_M * (1 - WGS84_FLATTENING);
  const secondE2 = WGS84_E2 / (1 - WGS84_E2);
  let reduced = Math.atan2(z, fromAxis * (1 - WGS84_FLATTENING));
  let lat = 0;
  for (let round = 0; round < 6; round++) {
    lat = Math.atan2(
      z + secondE2 * b * Math.sin(reduced) ** 3,
      fromAxis - WGS84_E2 * WGS84_A_M * Math.cos(reduced) ** 3,
    );
    reduced = Math.atan2((1 - WGS84_FLATTENING) * Math.sin(lat), Math.cos(lat));
  }
  const sinLat = Math.sin(lat);
  return {
    latDeg: lat / RAD,
    lonDeg: Math.atan2(y, x) / RAD,
    heightM: fromAxis * Math.cos(lat) + z * sinLat - WGS84_A_M * Math.sqrt(1 - WGS84_E2 * sinLat * sinLat),
  };
}

function turn(grid: GeodeticGrid): [sin: number, cos: number] {
  if (!Number.isFinite(grid.rotationDeg))
    throw new InputError(
      'not-finite',
      `the grid's rotation_deg must be a finite number (degrees), got ${grid.rotationDeg}`,
    );
  return [Math.sin(grid.rotationDeg * RAD), Math.cos(grid.rotationDeg * RAD)];
}
