import { Matrix, SingularValueDecomposition } from 'ml-matrix';
import { InputError } from '../errors.js';

/** What may be fitted: rotation alone (about the origin), with a shift, or with a shift and a scale. */
export type AlignmentKind = 'rotation' | 'rigid' | 'similarity';

/** target ≈ scale · rotation · source + translation. */
export interface Alignment {
  /** Row-major, dimension × dimension, proper (no mirror). */
  rotation: Float64Array;
  /** Shape (dimension), the unit of the points. */
  translation: Float64Array;
  scale: number;
  /** Root mean square distance left, the unit of the points. */
  rmse: number;
}

/**
 * Least-squares alignment of paired points in two or three dimensions.
 *
 * The correction of the last singular value keeps the result a rotation where a mirror would fit better,
 * as with noisy or flat point sets.
 *
 * @param source - shape (n × dimension), row-major; every value finite.
 * @param target - shape (n × dimension), row-major; every value finite.
 * @param dimension - 2 or 3.
 * @param kind - default `rigid`. n must be at least `dimension` (one less for `rotation`).
 * @throws InputError `shape`, `too-short`, `not-finite`; `degenerate` where the points do not fix the
 *   rotation: all in one place, or in space all on one line.
 * @see Umeyama (1991), IEEE TPAMI 13(4), 376-380, equations 34 to 43.
 */
export function alignPoints(
  source: Float64Array,
  target: Float64Array,
  dimension: 2 | 3,
  kind: AlignmentKind = 'rigid',
): Alignment {
  const n = source.length / dimension;
  if (source.length !== target.length || !Number.isInteger(n))
    throw new InputError(
      'shape',
      `alignPoints: needs two lists of points of ${dimension} coordinates, as many in each, got ${source.length} and ${target.length} numbers`,
    );
  const needed = kind === 'rotation' ? dimension - 1 : dimension;
  if (n < needed)
    throw new InputError('too-short', `alignPoints: ${kind} needs at least ${needed} points, got ${n}`);
  for (let i = 0; i < source.length; i++)
    if (!Number.isFinite(source[i]! + target[i]!))
      throw new InputError('not-finite', `alignPoints: point ${Math.floor(i / dimension)} is not finite`);

  const origin = new Float64Array(dimension);
  const sourceMean = kind === 'rotation' ? origin : centroid(source, dimension);
  const targetMean = kind === 'rotation' ? origin : centroid(target, dimension);
  const covariance = Matrix.zeros(dimension, dimension);
  let sourceSpread = 0;
  let targetSpread = 0;
  for (let i = 0; i < n; i++)
    for (let r = 0; r < dimension; r++) {
      const y = target[i * dimension + r]! - targetMean[r]!;
      const own = source[i * dimension + r]! - sourceMean[r]!;
      sourceSpread += (own * own) / n;
      targetSpread += (y * y) / n;
      for (let c = 0; c < dimension; c++) {
        const x = source[i * dimension + c]! - sourceMean[c]!;
        covariance.set(r, c, covariance.get(r, c) + (y * x) / n);
      }
    }

  const decomposition = new SingularValueDecomposition(covariance);
  const { leftSingularVectors: left, rightSingularVectors: right } = decomposition;
  const sizes = decomposition.diagonal;
  // The last direction follows from the others; the one before it must be fixed by the points.
  const fixing = sizes[dimension - 2]!;
  if (!(fixing > 1e-12 * Math.sqrt(sourceSpread * targetSpread)))
    throw new InputError(
      'degenerate',
      `alignPoints: the ${n} points do not fix a rotation; they must not all lie in one place${dimension === 3 ? ' or on one line' : ''}`,
    );
  const mirror = determinant(left) * determinant(right) < 0 ? -1 : 1;
  const rotation = new Float64Array(dimension * dimension);
  let gain = 0;
  for (let k = 0; k < dimension; k++) {
    const sign = k === dimension - 1 ? mirror : 1;
    gain += sign * sizes[k]!;
    for (let r = 0; r < dimension; r++)
      for (let c = 0; c < dimension; c++)
        rotation[r * dimension + c]! += sign * left.get(r, k) * right.get(c, k);
  }
  const scale = kind === 'similarity' ? gain / sourceSpread : 1;
  const translation = targetMean.slice();
  for (let r = 0; r < dimension; r++)
    for (let c = 0; c < dimension; c++)
      translation[r]! -= scale * rotation[r * dimension + c]! * sourceMean[c]!;
  const square = targetSpread - 2 * scale * gain + scale * scale * sourceSpread;
  return { rotation, translation, scale, rmse: Math.sqrt(Math.max(0, square)) };
}

function centroid(points: Float64Array, dimension: number): Float64Array {
  const mean = new Float64Array(dimension);
  const n = points.length / dimension;
  for (let i = 0; i < points.length; i++) mean[i % dimension]! += points[i]! / n;
  return mean;
}

/** Of a 2 × 2 or 3 × 3 orthogonal matrix. */
function determinant(m: Matrix): number {
  if (m.rows === 2) return m.get(0, 0) * m.get(1, 1) - m.get(0, 1) * m.get(1, 0);
  return (
    m.get(0, 0) * (m.get(1, 1) * m.get(2, 2) - m.get(1, 2) * m.get(2, 1)) -
    m.get(0, 1) * (m.get(1, 0) * m.get(2, 2) - m.get(1, 2) * m.get(2, 0)) +
    m.get(0, 2) * (m.get(1, 0) * m.get(2, 1) - m.get(1, 1) * m.get(2, 0))
  );
}
