import type { Trajectory } from './trajectory.js';

/** What the magnetometer says of the yaw error, per node interval. */
export interface MagneticHeading {
  /** Clockwise angle from expected magnetic north to the measured one, rad; unwrapped where asked. */
  angle: Float64Array;
  /** How far norm and dip stand from their reference: 1 where they agree, growing with the square. */
  deviation: Float64Array;
}

export interface MagneticTolerances {
  norm_tolerance: number;
  dip_tolerance_deg: number;
}

/**
 * The angle between measured and expected magnetic north on each node interval, and how disturbed the field is there.
 *
 * The reference norm and dip are the walk's own medians: they do not depend on the phone's calibration or on a
 * building's constant influence, which the model of the earth's field does not know.
 *
 * @param declinationRad - direction of magnetic north, clockwise from grid north.
 * @see Laidig & Seel (2023), Information Fusion 91, 187-204, for norm and dip as signs of a disturbance.
 */
export function magneticHeading(
  trajectory: Trajectory,
  declinationRad: number,
  tolerances: MagneticTolerances,
): MagneticHeading {
  const { field, fieldCount } = trajectory;
  const intervals = fieldCount.length;
  const angle = new Float64Array(intervals);
  const norm = new Float64Array(intervals);
  const dip = new Float64Array(intervals);
  for (let j = 0; j < intervals; j++) {
    if (fieldCount[j] === 0) continue;
    const east = field[3 * j]!;
    const north = field[3 * j + 1]!;
    const up = field[3 * j + 2]!;
    const horizontal = Math.sqrt(east * east + north * north);
    angle[j] = wrapped(Math.atan2(east, north) - declinationRad);
    norm[j] = Math.sqrt(horizontal * horizontal + up * up);
    dip[j] = Math.atan2(-up, horizontal);
  }
  const referenceNorm = medianWhere(norm, fieldCount);
  const referenceDip = medianWhere(dip, fieldCount);
  const dipTolerance = (tolerances.dip_tolerance_deg * Math.PI) / 180;
  const deviation = new Float64Array(intervals);
  for (let j = 0; j < intervals; j++) {
    if (fieldCount[j] === 0) continue;
    const byNorm = (norm[j]! / referenceNorm - 1) / tolerances.norm_tolerance;
    const byDip = (dip[j]! - referenceDip) / dipTolerance;
    deviation[j] = 1 + byNorm * byNorm + byDip * byDip;
  }
  return { angle, deviation };
}

/** Mean direction of the angles, rad. */
export function meanAngle(angle: Float64Array, count: Int32Array): number {
  let s = 0;
  let c = 0;
  for (let j = 0; j < angle.length; j++) {
    if (count[j] === 0) continue;
    s += Math.sin(angle[j]!);
    c += Math.cos(angle[j]!);
  }
  return Math.atan2(s, c);
}

/**
 * Puts each angle on the branch (multiple of a full turn) that follows the slow course of its neighbours, so that a
 * drift of more than half a turn stays continuous and a short disturbance cannot tip it over.
 *
 * @param halfWindow - intervals on either side that make the slow course.
 */
export function followBranch(angle: Float64Array, count: Int32Array, halfWindow: number): void {
  const n = angle.length;
  const cosines = new Float64Array(n + 1);
  const sines = new Float64Array(n + 1);
  for (let j = 0; j < n; j++) {
    const used = count[j]! > 0 ? 1 : 0;
    cosines[j + 1] = cosines[j]! + used * Math.cos(angle[j]!);
    sines[j + 1] = sines[j]! + used * Math.sin(angle[j]!);
  }
  const course = new Float64Array(n);
  for (let j = 0; j < n; j++) {
    const from = Math.max(0, j - halfWindow);
    const to = Math.min(n, j + halfWindow + 1);
    const here = Math.atan2(sines[to]! - sines[from]!, cosines[to]! - cosines[from]!);
    course[j] = j === 0 ? here : course[j - 1]! + wrapped(here - course[j - 1]!);
  }
  const turns = 2 * Math.PI * Math.round(medianWhere(course, count) / (2 * Math.PI));
  for (let j = 0; j < n; j++) angle[j] = course[j]! - turns + wrapped(angle[j]! - course[j]!);
}

function wrapped(angle: number): number {
  return angle - 2 * Math.PI * Math.round(angle / (2 * Math.PI));
}

function medianWhere(values: Float64Array, count: Int32Array): number {
  const used = values.filter((_, j) => count[j]! > 0).sort();
  return used.length === 0 ? 0 : used[used.length >> 1]!;
}
