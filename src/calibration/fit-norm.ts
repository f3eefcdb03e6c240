import { EigenvalueDecomposition, inverse, Matrix } from 'ml-matrix';
import { InputError } from '../errors.js';

/** What of a sensor is fitted: its zero, its scales too, or its axes' angles as well. */
export type NormShape = 'bias' | 'scales' | 'full';

/** Calibrated reading = matrix (3 x 3, row by row, symmetric) times (raw - bias). */
export interface NormFit {
  bias: [number, number, number];
  matrix: [number, number, number, number, number, number, number, number, number];
  /** Standard errors of the bias, in the reading's unit, and of the matrix' entries. */
  biasSd: [number, number, number];
  matrixSd: [number, number, number, number, number, number, number, number, number];
  /** Root mean square of |calibrated| - radius, in the radius' unit; and before, with bias 0 and matrix 1. */
  residual: number;
  residualBefore: number;
  /** Largest of |calibrated| - radius. */
  worst: number;
  /** Ratio of the largest to the smallest singular value of the scaled problem: how well the data tell the parameters apart. */
  condition: number;
  samples: number;
}

/** Symmetric entries in the order of the parameters: which (row, column). */
const ENTRIES: readonly (readonly [number, number])[] = [
  [0, 0],
  [1, 1],
  [2, 2],
  [0, 1],
  [0, 2],
  [1, 2],
];
const USED: Readonly<Record<NormShape, number>> = { bias: 0, scales: 3, full: 6 };
/** Beyond this some direction was hardly seen: its parameters would be noise. */
const LARGEST_CONDITION = 200;
const ROUNDS = 60;

/**
 * Bias, scales and axis angles that bring readings of a vector of constant size onto a sphere.
 *
 * Least squares on the size, by damped Gauss-Newton steps from the sphere that fits best, optionally with
 * Huber's weights against disturbed readings.
 *
 * @param xyz - three arrays of shape (n), raw readings in as many directions as can be.
 * @param radius - true size of the vector, same unit.
 * @param shape - `bias` (3 parameters), `scales` (6) or `full` (9).
 * @param robust - whether readings far off count less; default no.
 * @returns parameters with standard errors from the residuals.
 * @throws InputError `too-few`, `undetermined` where the directions do not tell the parameters apart.
 * @see Frosio, Pedersini & Borghese (2009), IEEE Trans. Instrumentation and Measurement 58(6), 2034-2041
 *   (accelerometers from still positions); Huber (1964), Annals of Mathematical Statistics 35(1), 73-101.
 */
export function fitNorm(
  xyz: readonly [Float64Array, Float64Array, Float64Array],
  radius: number,
  shape: NormShape,
  robust = false,
): NormFit {
  const n = xyz[0].length;
  const size = 3 + USED[shape];
  if (n < size)
    throw new InputError(
      'too-few',
      `calibration: needs at least ${size} directions for ${shape === 'full' ? 'bias, scales and angles' : shape}, got ${n}; record more positions`,
    );
  if (!(radius > 0))
    throw new InputError('bad-radius', `calibration: size of the vector must be above 0, got ${radius}`);
  const p = new Float64Array(9);
  p.set(sphereCentre(xyz));
  p.fill(1, 3, 6);
  const weights = new Float64Array(n).fill(1);
  let damping = 1e-3;
  let cost = costOf(xyz, radius, p, weights);
  for (let round = 0; round < ROUNDS; round++) {
    if (robust) {
      huber(residuals(xyz, radius, p), weights);
      cost = costOf(xyz, radius, p, weights);
    }
    const { normal, right } = equations(xyz, radius, p, weights, size);
    for (let i = 0; i < size; i++) normal.set(i, i, normal.get(i, i) * (1 + damping) + 1e-12);
    const step = inverse(normal, true).mmul(right);
    const next = p.slice();
    for (let i = 0; i < size; i++) next[i]! -= step.get(i, 0);
    const nextCost = costOf(xyz, radius, next, weights);
    if (nextCost < cost) {
      const gain = (cost - nextCost) / cost;
      p.set(next);
      cost = nextCost;
      damping = Math.max(1e-9, damping / 5);
      if (gain < 1e-12) break;
    } else if ((damping *= 10) > 1e6) break;
  }
  return resultOf(xyz, radius, p, weights, size);
}

/** Centre of the sphere that fits in the least-squares sense: linear in centre and squared radius. */
function sphereCentre(xyz: readonly [Float64Array, Float64Array, Float64Array]): number[] {
  const normal = Matrix.zeros(4, 4);
  const right = Matrix.zeros(4, 1);
  for (let i = 0; i < xyz[0].length; i++) {
    const row = [2 * xyz[0][i]!, 2 * xyz[1][i]!, 2 * xyz[2][i]!, 1];
    const square = xyz[0][i]! ** 2 + xyz[1][i]! ** 2 + xyz[2][i]! ** 2;
    for (let a = 0; a < 4; a++) {
      right.set(a, 0, right.get(a, 0) + row[a]! * square);
      for (let b = 0; b < 4; b++) normal.set(a, b, normal.get(a, b) + row[a]! * row[b]!);
    }
  }
  const solution = inverse(normal, true).mmul(right);
  return [solution.get(0, 0), solution.get(1, 0), solution.get(2, 0)];
}

function calibrated(xyz: readonly Float64Array[], p: Float64Array, i: number, out: Float64Array): number {
  const dx = xyz[0]![i]! - p[0]!;
  const dy = xyz[1]![i]! - p[1]!;
  const dz = xyz[2]![i]! - p[2]!;
  out[0] = p[3]! * dx + p[6]! * dy + p[7]! * dz;
  out[1] = p[6]! * dx + p[4]! * dy + p[8]! * dz;
  out[2] = p[7]! * dx + p[8]! * dy + p[5]! * dz;
  return Math.hypot(out[0], out[1], out[2]);
}

function residuals(xyz: readonly Float64Array[], radius: number, p: Float64Array): Float64Array {
  const u = new Float64Array(3);
  return xyz[0]!.map((_, i) => calibrated(xyz, p, i, u) - radius);
}

function costOf(
  xyz: readonly Float64Array[],
  radius: number,
  p: Float64Array,
  weights: Float64Array,
): number {
  let sum = 0;
  for (const [i, r] of residuals(xyz, radius, p).entries()) sum += weights[i]! * r * r;
  return sum;
}

/** Huber's weights at 1.345 robust standard deviations: 95 % efficient where nothing is disturbed. */
function huber(r: Float64Array, weights: Float64Array): void {
  const sorted = r.map(Math.abs).sort();
  const scale = 1.4826 * sorted[sorted.length >> 1]!;
  const limit = 1.345 * Math.max(scale, 1e-12);
  for (let i = 0; i < r.length; i++) weights[i] = Math.min(1, limit / Math.abs(r[i]!));
}

/** Derivative of the size by the parameters: -M u for the bias, u d for the entries. */
function gradient(
  xyz: readonly Float64Array[],
  p: Float64Array,
  i: number,
  u: Float64Array,
  row: Float64Array,
): number {
  const length = calibrated(xyz, p, i, u);
  const [ux, uy, uz] = [u[0]! / length, u[1]! / length, u[2]! / length];
  const d = [xyz[0]![i]! - p[0]!, xyz[1]![i]! - p[1]!, xyz[2]![i]! - p[2]!];
  row[0] = -(p[3]! * ux + p[6]! * uy + p[7]! * uz);
  row[1] = -(p[6]! * ux + p[4]! * uy + p[8]! * uz);
  row[2] = -(p[7]! * ux + p[8]! * uy + p[5]! * uz);
  row[3] = ux * d[0]!;
  row[4] = uy * d[1]!;
  row[5] = uz * d[2]!;
  row[6] = ux * d[1]! + uy * d[0]!;
  row[7] = ux * d[2]! + uz * d[0]!;
  row[8] = uy * d[2]! + uz * d[1]!;
  return length;
}

function equations(
  xyz: readonly Float64Array[],
  radius: number,
  p: Float64Array,
  weights: Float64Array,
  size: number,
): { normal: Matrix; right: Matrix } {
  const normal = Matrix.zeros(size, size);
  const right = Matrix.zeros(size, 1);
  const u = new Float64Array(3);
  const row = new Float64Array(9);
  for (let i = 0; i < weights.length; i++) {
    const r = gradient(xyz, p, i, u, row) - radius;
    for (let a = 0; a < size; a++) {
      right.set(a, 0, right.get(a, 0) + weights[i]! * row[a]! * r);
      for (let b = 0; b < size; b++) normal.set(a, b, normal.get(a, b) + weights[i]! * row[a]! * row[b]!);
    }
  }
  return { normal, right };
}

function resultOf(
  xyz: readonly [Float64Array, Float64Array, Float64Array],
  radius: number,
  p: Float64Array,
  weights: Float64Array,
  size: number,
): NormFit {
  const n = weights.length;
  const { normal } = equations(xyz, radius, p, weights, size);
  // Bias in parts of the radius, so that all parameters are of one size.
  const scaled = normal.clone();
  for (let a = 0; a < size; a++)
    for (let b = 0; b < size; b++)
      scaled.set(a, b, (scaled.get(a, b) * (a < 3 ? radius : 1) * (b < 3 ? radius : 1)) / n / radius ** 2);
  const condition = conditionOf(scaled);
  if (!(condition < LARGEST_CONDITION))
    throw new InputError(
      'undetermined',
      `calibration: the directions do not tell all parameters apart (condition ${condition.toPrecision(3)}, must be below ${LARGEST_CONDITION}); turn the device through more and other directions, or fit less`,
    );
  const r = residuals(xyz, radius, p);
  const before = residuals(xyz, radius, Float64Array.of(0, 0, 0, 1, 1, 1, 0, 0, 0));
  let sum = 0;
  let used = 0;
  let worst = 0;
  for (let i = 0; i < n; i++) {
    sum += weights[i]! * r[i]! ** 2;
    used += weights[i]!;
    worst = Math.max(worst, Math.abs(r[i]!));
  }
  const variance = n > size ? sum / Math.max(used - size, 1e-9) : Number.NaN;
  const covariance = inverse(normal, true).mul(variance);
  const sd = (k: number) => (k < size ? Math.sqrt(Math.max(0, covariance.get(k, k))) : 0);
  const full = (of: (k: number) => number): NormFit['matrix'] => {
    const out: NormFit['matrix'] = [0, 0, 0, 0, 0, 0, 0, 0, 0];
    for (const [k, [row, column]] of ENTRIES.entries())
      out[3 * row + column] = out[3 * column + row] = of(3 + k);
    return out;
  };
  const rms = (values: Float64Array) => Math.sqrt(values.reduce((total, x) => total + x * x, 0) / n);
  return {
    bias: [p[0]!, p[1]!, p[2]!],
    matrix: full((k) => p[k]!),
    biasSd: [sd(0), sd(1), sd(2)],
    matrixSd: full(sd),
    residual: rms(r),
    residualBefore: rms(before),
    worst,
    condition,
    samples: n,
  };
}

/** Root of the ratio of the largest to the smallest eigenvalue; infinite where one is 0. */
function conditionOf(normal: Matrix): number {
  const values = new EigenvalueDecomposition(normal, { assumeSymmetric: true }).realEigenvalues;
  const smallest = Math.min(...values);
  return smallest > 0 ? Math.sqrt(Math.max(...values) / smallest) : Number.POSITIVE_INFINITY;
}
