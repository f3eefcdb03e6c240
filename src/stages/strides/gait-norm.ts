/**
 * Comfortable walking speed of adults, m/s: mean of the men's and women's figures of the decades from 20 to 69.
 *
 * @see Bohannon & Andrews (2011), Physiotherapy 97(3), 182-189 (figures by decade from memory).
 */
const ADULT_SPEED_MPS = 1.36;

/**
 * Step frequency of adults at comfortable speed, hertz: mean of men and women of the same decades.
 *
 * @see Öberg, Karsznia & Öberg (1993), J. Rehabilitation Research and Development 30(2), 210-223.
 */
const ADULT_CADENCE_HZ = 2.03;

/** Height of an adult whose height is not known, m: middle of men's and women's (common practice, no source). */
const ADULT_HEIGHT_M = 1.7;

/**
 * Step length that gait norms let expect of a walker at a cadence.
 *
 * Step length grows in proportion to cadence (a constant walk ratio) and to height.
 *
 * @param cadenceHz - steps per second.
 * @param heightM - the walker's height, m; null where unknown.
 * @returns metres.
 * @see Sekiya, Nagasaki, Ito & Furuna (1996), Human Movement Science 15(3), 453-465, on the constancy of the walk
 *   ratio (from memory).
 */
export function normStepLength(cadenceHz: number, heightM: number | null): number {
  const atComfort = ADULT_SPEED_MPS / ADULT_CADENCE_HZ;
  return ((atComfort * cadenceHz) / ADULT_CADENCE_HZ) * ((heightM ?? ADULT_HEIGHT_M) / ADULT_HEIGHT_M);
}
