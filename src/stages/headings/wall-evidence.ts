import { wrapToPi } from '../../stats/circular.js';

/** Steps on either side that a step's straightness is told by. */
const REACH = 3;

/** A walk turns where the direction changes by this over the steps around: half a right-angled corner in six steps. */
const TURNING_RAD = (15 * Math.PI) / 180;

/** Walkers in a corridor keep to its direction within this; the rest of a step's scatter is in it. */
const ALONG_SD_RAD = (7 * Math.PI) / 180;

/** Share of straight steps that run along or across the walls; the others cut a hall or follow no wall. */
const ALONG_SHARE = 0.6;

/** A straight leg of so many steps says one thing, not many. */
const STEPS_PER_LEG = 12;

/** Legs that a walk's sights of the walls count for at most. */
const MOST_LEGS = 5;

/** Table of the likelihood modulo a right angle, quarter degrees. */
const PER_DEGREE = 4;
const TABLE = 90 * PER_DEGREE;

/**
 * How likely walking directions are beside walls: a mixture of directions along or across them and any direction.
 *
 * Where walls run every way the mixture is flat, and says nothing.
 *
 * @param wallShare - share of wall length in each degree modulo 90, shape (90), sum 1.
 * @returns function of a heading, rad, with mean 1 over all headings.
 * @see Borenstein & Ojeda (2010), J. Navigation 63(1), 41-58 (dominant directions), here as a likelihood.
 */
export function alongWalls(wallShare: readonly number[]): (headingRad: number) => number {
  const table = new Float64Array(TABLE);
  const sd = (ALONG_SD_RAD * 180) / Math.PI;
  for (let i = 0; i < TABLE; i++) {
    let density = 0;
    for (const [degree, share] of wallShare.entries()) {
      if (share === 0) continue;
      let off = i / PER_DEGREE - (degree + 0.5);
      off -= 90 * Math.round(off / 90);
      density += share * Math.exp(-0.5 * (off / sd) ** 2);
    }
    table[i] = density;
  }
  const mean = table.reduce((sum, value) => sum + value, 0) / TABLE;
  for (let i = 0; i < TABLE; i++) table[i] = 1 - ALONG_SHARE + (ALONG_SHARE * table[i]!) / mean;
  return (headingRad) => {
    const place = (headingRad / (Math.PI / 2)) * TABLE;
    return table[((Math.round(place) % TABLE) + TABLE) % TABLE]!;
  };
}

/**
 * Weight of each step as a sight of the walls: a leg counts once, and the less the more the walk turns. All legs of a
 * walk together count as no more than {@link MOST_LEGS}: a plan that lies askew does so for all of them.
 *
 * @param direction - of each step, rad, but for a constant.
 * @returns shape (steps), 0 to one over the steps of a leg.
 */
export function legWeights(direction: Float64Array): Float64Array {
  const n = direction.length;
  const straight = direction.map((_, k) => {
    const turned = wrapToPi(direction[Math.min(n - 1, k + REACH)]! - direction[Math.max(0, k - REACH)]!);
    return Math.exp(-0.5 * (turned / TURNING_RAD) ** 2);
  });
  const legs = straight.reduce((sum, value) => sum + value, 0) / STEPS_PER_LEG;
  const scale = Math.min(1, MOST_LEGS / legs) / STEPS_PER_LEG;
  return straight.map((value) => value * scale);
}
