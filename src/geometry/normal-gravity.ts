import { InputError } from '../errors.js';
import { WGS84_A_M, WGS84_E2, WGS84_FLATTENING } from './wgs84.js';

const EQUATOR_MPS2 = 9.7803253359;
const SOMIGLIANA_K = 0.00193185265241;
/** Ratio of centrifugal to gravitational pull at the equator, omega² a² b / GM. */
const GRAVITY_RATIO_M = 0.00344978650684;

/**
 * Normal gravity of WGS84: Somigliana on the ellipsoid, carried to the height to second order.
 *
 * The second-order free-air term: at 10 km the linear one alone is off by 7e-5 m/s².
 *
 * @param latDeg - geodetic latitude, -90..90, degrees.
 * @param heightM - above the ellipsoid, metres, within -500..20000 (the series' safe range).
 * @returns m/s².
 * @throws InputError `latitude`, `height` outside those ranges or NaN.
 * @see NIMA TR8350.2 (3rd edition, 2000), equations 4-1 and 4-3, table 3.4.
 */
export function normalGravity(latDeg: number, heightM: number): number {
  if (!(latDeg >= -90 && latDeg <= 90))
    throw new InputError('latitude', `normalGravity: latDeg must be in -90..90 (degrees), got ${latDeg}`);
  if (!(heightM >= -500 && heightM <= 20000))
    throw new InputError('height', `normalGravity: heightM must be in -500..20000 (m), got ${heightM}`);
  const sinSquared = Math.sin((latDeg * Math.PI) / 180) ** 2;
  const onEllipsoid = (EQUATOR_MPS2 * (1 + SOMIGLIANA_K * sinSquared)) / Math.sqrt(1 - WGS84_E2 * sinSquared);
  const h = heightM / WGS84_A_M;
  const linear = 1 + WGS84_FLATTENING + GRAVITY_RATIO_M - 2 * WGS84_FLATTENING * sinSquared;
  return onEllipsoid * (1 - 2 * linear * h + 3 * h * h);
}
