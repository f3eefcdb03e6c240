import { InputError } from '../errors.js';

/** How a path may be moved onto another: turned about the origin, shifted too, scaled too. */
export interface PlanarAlignment {
  /** Clockwise seen from above, as headings count; in (-pi, pi]. */
  turnRad: number;
  scale: number;
  eastM: number;
  northM: number;
  /** Root mean square distance left. */
  rmseM: number;
}

/**
 * Least-squares alignment of a plane path onto its truth, in closed form, optionally weighted.
 *
 * A point p goes to scale · turn(p) + (eastM, northM).
 *
 * @param east, north - shape (n), metres; every value finite.
 * @param trueEast, trueNorth - shape (n), metres; every value finite.
 * @param kind - `rotation` about (0, 0), `rigid` or `similarity`. n >= 2, for `rotation` n >= 1.
 * @param weights - shape (n), each finite, >= 0, not all 0; default all 1.
 * @throws InputError `shape`, `too-short`, `not-finite`, `weights`; `degenerate` where the points fix no
 *   direction (all in one place).
 * @see Umeyama (1991), IEEE TPAMI 13(4), 376-380; in the plane the rotation is the angle of the sum of
 *   the products of the points as complex numbers.
 */
export function alignPlanar(
  east: ArrayLike<number>,
  north: ArrayLike<number>,
  trueEast: ArrayLike<number>,
  trueNorth: ArrayLike<number>,
  kind: 'rotation' | 'rigid' | 'similarity' = 'rigid',
  weights?: ArrayLike<number>,
): PlanarAlignment {
  const n = east.length;
  for (const other of [north, trueEast, trueNorth, weights])
    if (other && other.length !== n)
      throw new InputError('shape', `alignPlanar: all inputs need ${n} values, one has ${other.length}`);
  const needed = kind === 'rotation' ? 1 : 2;
  if (n < needed)
    throw new InputError('too-short', `alignPlanar: ${kind} needs at least ${needed} points, got ${n}`);
  let total = 0;
  const mean = [0, 0, 0, 0] as [number, number, number, number];
  for (let i = 0; i < n; i++) {
    const weight = weights ? weights[i]! : 1;
    if (!(weight >= 0 && weight < Number.POSITIVE_INFINITY))
      throw new InputError('weights', `alignPlanar: weights must be finite and at least 0, got ${weight}`);
    if (!Number.isFinite(east[i]! + north[i]! + trueEast[i]! + trueNorth[i]!))
      throw new InputError('not-finite', `alignPlanar: point ${i} is not finite`);
    total += weight;
    mean[0] += weight * east[i]!;
    mean[1] += weight * north[i]!;
    mean[2] += weight * trueEast[i]!;
    mean[3] += weight * trueNorth[i]!;
  }
  if (!(total > 0)) throw new InputError('weights', 'alignPlanar: the weights are all 0');
  const keep = kind === 'rotation' ? 0 : 1 / total;
  const [e0, n0, te0, tn0] = mean.map((sum) => sum * keep) as [number, number, number, number];

  let along = 0;
  let across = 0;
  let spread = 0;
  let trueSpread = 0;
  for (let i = 0; i < n; i++) {
    const weight = weights ? weights[i]! : 1;
    const [e, k] = [east[i]! - e0, north[i]! - n0];
    const [te, tk] = [trueEast[i]! - te0, trueNorth[i]! - tn0];
    along += weight * (e * te + k * tk);
    across += weight * (k * te - e * tk);
    spread += weight * (e * e + k * k);
    trueSpread += weight * (te * te + tk * tk);
  }
  const gain = Math.hypot(along, across);
  if (!(gain > 1e-12 * Math.sqrt(spread * trueSpread)))
    throw new InputError(
      'degenerate',
      `alignPlanar: the ${n} points do not fix a direction; they must not all lie in one place`,
    );
  const turnRad = Math.atan2(across, along);
  const scale = kind === 'similarity' ? gain / spread : 1;
  const [sin, cos] = [Math.sin(turnRad) * scale, Math.cos(turnRad) * scale];
  const square = (trueSpread - 2 * scale * gain + scale * scale * spread) / total;
  return {
    turnRad,
    scale,
    eastM: te0 - (cos * e0 + sin * n0),
    northM: tn0 - (cos * n0 - sin * e0),
    rmseM: Math.sqrt(Math.max(0, square)),
  };
}
