import { InputError } from '../errors.js';
import { chiSquareQuantile } from './chi-square.js';

/** A 2 × 2 covariance in metres squared: east-east, east-north, north-north. */
export interface PlanarCovariance {
  ee: number;
  en: number;
  nn: number;
}

export interface ErrorEllipse {
  semiMajorM: number;
  semiMinorM: number;
  /** Direction of the major axis, clockwise from north, in [0, pi). */
  azimuthRad: number;
}

/**
 * Normalised error squared (NEES): chi-square with 2 degrees of freedom where the covariance is honest.
 *
 * @param eastM, northM - the error, metres.
 * @throws InputError `not-finite`; `covariance` where it is not positive definite.
 * @see Bar-Shalom, Li & Kirubarajan (2001), Estimation with Applications to Tracking and Navigation,
 *   Wiley, section 5.4.2.
 */
export function normalizedErrorSquared(eastM: number, northM: number, covariance: PlanarCovariance): number {
  if (!Number.isFinite(eastM + northM))
    throw new InputError('not-finite', `normalizedErrorSquared: the error is (${eastM}, ${northM})`);
  const { ee, en, nn } = covariance;
  const determinant = requirePositive('normalizedErrorSquared', covariance);
  return (nn * eastM * eastM - 2 * en * eastM * northM + ee * northM * northM) / determinant;
}

/**
 * The ellipse that holds a share of Gaussian errors.
 *
 * @param probability - above 0, below 1.
 * @throws InputError `covariance` where it is not positive definite; `probability`.
 */
export function errorEllipse(covariance: PlanarCovariance, probability: number): ErrorEllipse {
  if (!(probability > 0 && probability < 1))
    throw new InputError(
      'probability',
      `errorEllipse: probability must be between 0 and 1, got ${probability}`,
    );
  const determinant = requirePositive('errorEllipse', covariance);
  const { ee, en, nn } = covariance;
  const larger = (ee + nn) / 2 + Math.hypot((ee - nn) / 2, en);
  const factor = -2 * Math.log1p(-probability); // chi-square quantile of 2 degrees of freedom
  // From north (the second axis) towards east: half the angle of (nn - ee, 2 en).
  const azimuth = 0.5 * Math.atan2(2 * en, nn - ee);
  return {
    semiMajorM: Math.sqrt(factor * larger),
    // The determinant over the larger value: the difference would lose the digits of a thin ellipse.
    semiMinorM: Math.sqrt((factor * determinant) / larger),
    azimuthRad: azimuth < 0 ? azimuth + Math.PI : azimuth,
  };
}

export interface Consistency {
  /** Mean normalised error squared; 2 where covariances are honest, more where they promise too much. */
  meanNees: number;
  /** Where the mean falls with the given confidence if the covariances are honest and the errors independent. */
  neesLow: number;
  neesHigh: number;
  /** Share of errors inside their own ellipse of `probability`. */
  coverage: number;
}

/**
 * Whether errors are as large as their covariances say.
 *
 * Errors of one walk grow out of each other, so for a walk's checkpoints the interval is too narrow: judge
 * over walks.
 *
 * @param nees - shape (n), n >= 1, of {@link normalizedErrorSquared}; finite, >= 0.
 * @param probability - of the ellipse, default 0.95.
 * @param confidence - of the interval of the mean, default 0.95.
 * @throws InputError `empty`, `not-finite`, `probability`.
 * @see Bar-Shalom, Li & Kirubarajan (2001), section 5.4.2: n times the mean is chi-square of 2 n.
 */
export function consistency(nees: ArrayLike<number>, probability = 0.95, confidence = 0.95): Consistency {
  const n = nees.length;
  if (n === 0) throw new InputError('empty', 'consistency: needs at least one error, got none');
  if (!(probability > 0 && probability < 1 && confidence > 0 && confidence < 1))
    throw new InputError(
      'probability',
      `consistency: probability and confidence must be between 0 and 1, got ${probability} and ${confidence}`,
    );
  const edge = -2 * Math.log1p(-probability);
  let sum = 0;
  let inside = 0;
  for (let i = 0; i < n; i++) {
    if (!(nees[i]! >= 0 && nees[i]! < Number.POSITIVE_INFINITY))
      throw new InputError(
        'not-finite',
        `consistency: normalised error ${i} must be finite and at least 0, got ${nees[i]}`,
      );
    sum += nees[i]!;
    if (nees[i]! <= edge) inside++;
  }
  return {
    meanNees: sum / n,
    neesLow: chiSquareQuantile((1 - confidence) / 2, 2 * n) / n,
    neesHigh: chiSquareQuantile((1 + confidence) / 2, 2 * n) / n,
    coverage: inside / n,
  };
}

function requirePositive(caller: string, { ee, en, nn }: PlanarCovariance): number {
  const determinant = ee * nn - en * en;
  if (!(ee > 0 && nn > 0 && determinant > 0 && Number.isFinite(determinant)))
    throw new InputError(
      'covariance',
      `${caller}: the covariance must be positive definite, got ee ${ee}, en ${en}, nn ${nn} (m²)`,
    );
  return determinant;
}
