/** What a group of people walks like at its own pace, on level ground. */
export interface GaitNorm {
  cadenceHz: number;
  /** Between people. */
  cadenceSdHz: number;
  stepLengthM: number;
  heightM: number;
  heightSdM: number;
}

export type Sex = 'male' | 'female';

/** From an age on: steps a second with the ends of the 95 % prediction interval, walking speed, body height. */
interface NormRow {
  fromAge: number;
  cadenceHz: [mean: number, low: number, high: number];
  speedMps: number;
  heightM: number;
}

/**
 * Cadence, ages 10 to 79: Öberg, Karsznia & Öberg (1993), J. Rehabil. Res. Dev. 30(2), 210-223, normal
 * gait, from a secondary copy. Speed, ages 20 on: Bohannon & Andrews (2011), Physiotherapy 97, 182-189,
 * from memory; the ends of its range, 1.434 and 0.943 m/s, as in its abstract. From 80 on the cadence of
 * the decade before. Boys of 10 to 19: step length 0.615 and 0.660 m of Öberg et al. times their
 * cadence; girls of that age: 0.413 of the body height, a common rule, times theirs. Below 10: from
 * memory, after Sutherland et al. (1980). Heights: rounded figures of European populations, from memory.
 */
const NORMS: Readonly<Record<Sex, readonly NormRow[]>> = {
  male: [
    { fromAge: 5, cadenceHz: [2.4, 2.06, 2.74], speedMps: 1.14, heightM: 1.24 },
    { fromAge: 10, cadenceHz: [2.14, 1.72, 2.56], speedMps: 0.615 * 2.14, heightM: 1.53 },
    { fromAge: 15, cadenceHz: [2.02, 1.58, 2.46], speedMps: 0.66 * 2.02, heightM: 1.75 },
    { fromAge: 20, cadenceHz: [1.98, 1.71, 2.25], speedMps: 1.358, heightM: 1.79 },
    { fromAge: 30, cadenceHz: [2.0, 1.71, 2.29], speedMps: 1.433, heightM: 1.79 },
    { fromAge: 40, cadenceHz: [2.01, 1.78, 2.24], speedMps: 1.434, heightM: 1.78 },
    { fromAge: 50, cadenceHz: [1.96, 1.58, 2.34], speedMps: 1.433, heightM: 1.77 },
    { fromAge: 60, cadenceHz: [1.95, 1.66, 2.24], speedMps: 1.339, heightM: 1.75 },
    { fromAge: 70, cadenceHz: [1.91, 1.62, 2.2], speedMps: 1.262, heightM: 1.73 },
    { fromAge: 80, cadenceHz: [1.91, 1.62, 2.2], speedMps: 0.968, heightM: 1.71 },
  ],
  female: [
    { fromAge: 5, cadenceHz: [2.4, 2.06, 2.74], speedMps: 1.14, heightM: 1.23 },
    { fromAge: 10, cadenceHz: [1.97, 1.6, 2.34], speedMps: 0.413 * 1.54 * 1.97, heightM: 1.54 },
    { fromAge: 15, cadenceHz: [2.09, 1.69, 2.49], speedMps: 0.413 * 1.65 * 2.09, heightM: 1.65 },
    { fromAge: 20, cadenceHz: [2.08, 1.77, 2.4], speedMps: 1.341, heightM: 1.66 },
    { fromAge: 30, cadenceHz: [2.13, 1.77, 2.49], speedMps: 1.337, heightM: 1.66 },
    { fromAge: 40, cadenceHz: [2.16, 1.82, 2.5], speedMps: 1.39, heightM: 1.65 },
    { fromAge: 50, cadenceHz: [2.03, 1.76, 2.3], speedMps: 1.313, heightM: 1.64 },
    { fromAge: 60, cadenceHz: [2.06, 1.68, 2.44], speedMps: 1.241, heightM: 1.62 },
    { fromAge: 70, cadenceHz: [2.03, 1.74, 2.32], speedMps: 1.132, heightM: 1.6 },
    { fromAge: 80, cadenceHz: [2.03, 1.74, 2.32], speedMps: 0.943, heightM: 1.58 },
  ],
};

/** Youngest age with a norm, years. */
export const YOUNGEST_AGE = 5;

/**
 * Published norms of comfortable walking by age and sex; the mean step length is speed over cadence.
 *
 * @param age - years, from {@link YOUNGEST_AGE} on; each decade has one row.
 */
export function gaitNorm(sex: Sex, age: number): GaitNorm {
  const row = NORMS[sex].findLast(({ fromAge }) => fromAge <= age) ?? NORMS[sex][0]!;
  const [cadenceHz, low, high] = row.cadenceHz;
  return {
    cadenceHz,
    // Half a 95 % interval is 1.96 standard deviations.
    cadenceSdHz: (high - low) / 2 / 1.96,
    stepLengthM: row.speedMps / cadenceHz,
    heightM: row.heightM,
    // About 7 cm in men and 6.5 cm in women; a tenth of a child's spread is in the norm itself. From memory.
    heightSdM: 0.038 * row.heightM,
  };
}
