/**
 * The WGS84 ellipsoid, metres.
 *
 * @see NIMA TR8350.2 (3rd edition, 2000), table 3.1: a and 1/f define the ellipsoid, the rest follows.
 */
export const WGS84_A_M = 6378137;
export const WGS84_FLATTENING = 1 / 298.257223563;
export const WGS84_E2 = WGS84_FLATTENING * (2 - WGS84_FLATTENING);
