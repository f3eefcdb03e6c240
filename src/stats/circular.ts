import { InputError } from '../errors.js';

const TURN = 2 * Math.PI;

/** The same direction in (-pi, pi]. */
export function wrapToPi(angleRad: number): number {
  if (angleRad > -Math.PI && angleRad <= Math.PI) return angleRad;
  const wrapped = angleRad - TURN * Math.round(angleRad / TURN);
  // Rounding may leave the angle an ulp outside.
  if (wrapped > Math.PI) return wrapped - TURN;
  return wrapped <= -Math.PI ? wrapped + TURN : wrapped;
}

/** The same direction in [0, 2 pi). */
export function wrapToTurn(angleRad: number): number {
  if (angleRad >= 0 && angleRad < TURN) return angleRad;
  const wrapped = angleRad - TURN * Math.floor(angleRad / TURN);
  // Rounding may leave a hair below 0, or reach the whole turn.
  return wrapped >= 0 && wrapped < TURN ? wrapped : 0;
}

export interface CircularMean {
  /** In (-pi, pi]; null where the directions cancel out. */
  directionRad: number | null;
  /** Length of the mean of the unit vectors: 1 all alike, 0 no common direction. */
  resultantLength: number;
  /** Circular standard deviation sqrt(-2 ln R); Infinity where R is 0. */
  standardDeviationRad: number;
}

/**
 * Mean direction: the direction of the sum of unit vectors.
 *
 * @param anglesRad - shape (n), n >= 1, radians, any turn; every value finite.
 * @param weights - shape (n), each finite and >= 0, not all 0; default all 1.
 * @throws InputError `empty`, `not-finite`, `weights`.
 * @see Mardia & Jupp (2000), Directional Statistics, Wiley, sections 2.2.1 and 2.3.
 */
export function circularMean(anglesRad: ArrayLike<number>, weights?: ArrayLike<number>): CircularMean {
  const n = anglesRad.length;
  if (n === 0) throw new InputError('empty', 'circularMean: needs at least one angle, got none');
  if (weights && weights.length !== n)
    throw new InputError('weights', `circularMean: ${n} angles need ${n} weights, got ${weights.length}`);
  let sine = 0;
  let cosine = 0;
  let total = 0;
  for (let i = 0; i < n; i++) {
    const angle = anglesRad[i]!;
    if (!Number.isFinite(angle)) throw new InputError('not-finite', `circularMean: angle ${i} is ${angle}`);
    const weight = weights ? weights[i]! : 1;
    if (!(weight >= 0 && weight < Number.POSITIVE_INFINITY))
      throw new InputError('weights', `circularMean: weights must be finite and at least 0, got ${weight}`);
    sine += weight * Math.sin(angle);
    cosine += weight * Math.cos(angle);
    total += weight;
  }
  if (!(total > 0)) throw new InputError('weights', 'circularMean: the weights are all 0');
  const resultantLength = Math.min(1, Math.hypot(sine, cosine) / total);
  // Below the rounding of n unit vectors the direction is an accident.
  const cancelled = resultantLength <= 1e-15 * Math.sqrt(n);
  return {
    directionRad: cancelled ? null : wrapToPi(Math.atan2(sine, cosine)),
    resultantLength,
    // + 0 turns the -0 of R = 1 into 0.
    standardDeviationRad: Math.sqrt(-2 * Math.log(resultantLength) + 0),
  };
}
