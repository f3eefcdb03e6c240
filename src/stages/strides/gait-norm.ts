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
 * How people's pace differs from comfortable walking, as spreads of the logarithm of cadence: of those who walk at
 * the pace of their choice, and of those who cannot or do not (impaired, shuffling, hurrying), one in five.
 *
 * Common practice, no source; the first is the between-person spread of Öberg et al. (1993), 0.14 Hz in 2.03.
 */
const CHOSEN_SPREAD = 0.07;
const OTHER_SPREAD = 0.3;
const OTHER_SHARE = 0.2;

/**
 * Step length that gait norms let expect of a walker at a cadence.
 *
 * Among people at a pace of their choice cadence tells nothing of step length: a faster pace makes both larger, but a
 * shorter leg swings faster, and the two about cancel. Far from a comfortable cadence it is the pace that differs, and
 * step length goes with cadence (a constant walk ratio). Between the two by how probable each is at that cadence.
 * Proportional to height.
 *
 * @param cadenceHz - steps per second, of the walk as a whole.
 * @param heightM - the walker's height, m; null where unknown.
 * @returns metres.
 * @see Sekiya, Nagasaki, Ito & Furuna (1996), Human Movement Science 15(3), 453-465, on the constancy of the walk
 *   ratio (from memory); Grieve & Gear (1966), Ergonomics 9(5), 379-399, on leg length and cadence (from memory).
 */
export function normStepLength(cadenceHz: number, heightM: number | null): number {
  const atComfort = ADULT_SPEED_MPS / ADULT_CADENCE_HZ;
  const away = Math.log(cadenceHz / ADULT_CADENCE_HZ);
  const density = (spread: number) => Math.exp(-0.5 * (away / spread) ** 2) / spread;
  const other = OTHER_SHARE * density(OTHER_SPREAD);
  const byPace = other / (other + (1 - OTHER_SHARE) * density(CHOSEN_SPREAD));
  return atComfort * Math.exp(byPace * away) * ((heightM ?? ADULT_HEIGHT_M) / ADULT_HEIGHT_M);
}
