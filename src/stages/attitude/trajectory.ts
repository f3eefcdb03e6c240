import type { InertialSamples } from './inertial-samples.js';
import { turnInEarthFrame, turnInPlace, turnsBetween } from './strapdown.js';

/**
 * The current estimate of the orientation at every sample, with gyroscope bias per node interval and scale,
 * and the sums over each node interval that the error model is linear in.
 */
export class Trajectory {
  /** Samples per node interval. */
  readonly perNode: number;
  readonly nodes: number;
  /** Unit quaternions device -> earth, shape (count, 4). */
  readonly q: Float64Array;
  /** Gyroscope bias per node interval, rad/s, shape (nodes - 1, 3). */
  readonly bias: Float64Array;
  /** Gyroscope scale error per axis. */
  readonly scale = new Float64Array(3);
  /** What integration lacks to reach the next node's orientation, earth frame, rad, shape (nodes - 1, 3). */
  readonly mismatch: Float64Array;
  /** Integral of the rotation matrix over the interval, row-major, s. */
  readonly rotation: Float64Array;
  /** Integral of the rotation matrix with columns scaled by the angular rate, rad. */
  readonly turning: Float64Array;
  /** Integral of the specific force in the earth frame, m/s, shape (nodes - 1, 3). */
  readonly impulse: Float64Array;
  /** Integral of the angular rate's magnitude, rad, shape (nodes - 1). */
  readonly turned: Float64Array;
  /** Seconds of the interval inside gaps. */
  readonly gapS: Float64Array;
  /** Mean magnetic field in the earth frame, uT, shape (nodes - 1, 3). */
  readonly field: Float64Array;
  /** Magnetometer samples in the interval. */
  readonly fieldCount: Int32Array;
  private readonly samples: InertialSamples;
  private readonly turns: Float64Array;

  constructor(samples: InertialSamples, nodeS: number) {
    this.samples = samples;
    this.perNode = Math.max(1, Math.round(nodeS / samples.stepS));
    this.nodes = Math.max(2, Math.ceil((samples.count - 1) / this.perNode) + 1);
    const intervals = this.nodes - 1;
    this.turns = new Float64Array(3 * this.perNode);
    this.q = new Float64Array(4 * samples.count);
    this.q[0] = 1;
    this.bias = new Float64Array(3 * intervals);
    this.mismatch = new Float64Array(3 * intervals);
    this.rotation = new Float64Array(9 * intervals);
    this.turning = new Float64Array(9 * intervals);
    this.impulse = new Float64Array(3 * intervals);
    this.turned = new Float64Array(intervals);
    this.field = new Float64Array(3 * intervals);
    this.fieldCount = new Int32Array(intervals);
    this.gapS = new Float64Array(intervals);
    for (let j = 0; j < intervals; j++)
      for (let i = this.sampleOf(j); i < this.sampleOf(j + 1); i++)
        if (samples.gap[i]) this.gapS[j]! += samples.stepS;
  }

  /** The sample at which a node stands. */
  sampleOf(node: number): number {
    return Math.min(node * this.perNode, this.samples.count - 1);
  }

  /** Length of a node interval, s. */
  intervalS(j: number): number {
    return (this.sampleOf(j + 1) - this.sampleOf(j)) * this.samples.stepS;
  }

  /** Integrates the gyroscope through node interval j from the orientation at its first sample. */
  integrate(j: number): void {
    const from = this.sampleOf(j);
    const end = this.sampleOf(j + 1);
    const gain = [1 + this.scale[0]!, 1 + this.scale[1]!, 1 + this.scale[2]!] as const;
    turnsBetween(this.samples.gyro, from, end, this.bias, 3 * j, gain, this.samples.stepS, this.turns);
    const q = this.q;
    for (let i = from, k = 0; i < end; i++, k += 3) {
      const to = 4 * (i + 1);
      q[to] = q[to - 4]!;
      q[to + 1] = q[to - 3]!;
      q[to + 2] = q[to - 2]!;
      q[to + 3] = q[to - 1]!;
      turnInPlace(q, to, this.turns, k);
    }
  }

  /** Turns the whole trajectory by a rotation vector in the earth frame, rad. */
  turnAll(x: number, y: number, z: number): void {
    for (let i = 0; i < this.samples.count; i++) turnInEarthFrame(this.q, 4 * i, x, y, z);
  }

  /** Renews the sums over each node interval. */
  accumulate(): void {
    const { rotation, turning, impulse, turned, field, fieldCount, q, samples } = this;
    for (const sums of [rotation, turning, impulse, turned, field]) sums.fill(0);
    fieldCount.fill(0);
    const [gx, gy, gz] = samples.gyro;
    const [ax, ay, az] = samples.accel;
    const mag = samples.mag;
    const dt = samples.stepS;
    for (let j = 0; j < this.nodes - 1; j++) {
      const end = this.sampleOf(j + 1);
      const m = 9 * j;
      const v = 3 * j;
      for (let i = this.sampleOf(j); i < end; i++) {
        const w = q[4 * i]!;
        const x = q[4 * i + 1]!;
        const y = q[4 * i + 2]!;
        const z = q[4 * i + 3]!;
        const r00 = 1 - 2 * (y * y + z * z);
        const r01 = 2 * (x * y - w * z);
        const r02 = 2 * (x * z + w * y);
        const r10 = 2 * (x * y + w * z);
        const r11 = 1 - 2 * (x * x + z * z);
        const r12 = 2 * (y * z - w * x);
        const r20 = 2 * (x * z - w * y);
        const r21 = 2 * (y * z + w * x);
        const r22 = 1 - 2 * (x * x + y * y);
        rotation[m]! += r00 * dt;
        rotation[m + 1]! += r01 * dt;
        rotation[m + 2]! += r02 * dt;
        rotation[m + 3]! += r10 * dt;
        rotation[m + 4]! += r11 * dt;
        rotation[m + 5]! += r12 * dt;
        rotation[m + 6]! += r20 * dt;
        rotation[m + 7]! += r21 * dt;
        rotation[m + 8]! += r22 * dt;
        const wx = (gx[i]! - this.bias[v]!) * dt;
        const wy = (gy[i]! - this.bias[v + 1]!) * dt;
        const wz = (gz[i]! - this.bias[v + 2]!) * dt;
        turning[m]! += r00 * wx;
        turning[m + 1]! += r01 * wy;
        turning[m + 2]! += r02 * wz;
        turning[m + 3]! += r10 * wx;
        turning[m + 4]! += r11 * wy;
        turning[m + 5]! += r12 * wz;
        turning[m + 6]! += r20 * wx;
        turning[m + 7]! += r21 * wy;
        turning[m + 8]! += r22 * wz;
        turned[j]! += Math.sqrt(wx * wx + wy * wy + wz * wz);
        const fx = ax[i]!;
        const fy = ay[i]!;
        const fz = az[i]!;
        impulse[v]! += (r00 * fx + r01 * fy + r02 * fz) * dt;
        impulse[v + 1]! += (r10 * fx + r11 * fy + r12 * fz) * dt;
        impulse[v + 2]! += (r20 * fx + r21 * fy + r22 * fz) * dt;
        if (mag) {
          const bx = mag[0][i]!;
          // A silent magnetometer is NaN on all three axes.
          if (!Number.isNaN(bx)) {
            const by = mag[1][i]!;
            const bz = mag[2][i]!;
            field[v]! += r00 * bx + r01 * by + r02 * bz;
            field[v + 1]! += r10 * bx + r11 * by + r12 * bz;
            field[v + 2]! += r20 * bx + r21 * by + r22 * bz;
            fieldCount[j]!++;
          }
        }
      }
      if (fieldCount[j]! > 0) for (let a = 0; a < 3; a++) field[v + a]! /= fieldCount[j]!;
    }
  }

  /**
   * Applies smoothed corrections: node orientations are turned by `attitude` (earth frame, rad), biases and
   * scales moved, the gyroscope integrated anew, and what it then lacks at the next node spread over the interval.
   *
   * @param attitude - correction of each node, shape (nodes, 3); the turn about up is applied last, so that it
   *   may be large.
   */
  correct(attitude: Float64Array, biasChange: Float64Array, scaleChange: Float64Array): void {
    const { nodes, q } = this;
    const atNode = new Float64Array(4 * nodes);
    for (let j = 0; j < nodes; j++) {
      const i = this.sampleOf(j);
      for (let a = 0; a < 4; a++) atNode[4 * j + a] = q[4 * i + a]!;
      turnInEarthFrame(atNode, 4 * j, attitude[3 * j]!, attitude[3 * j + 1]!, 0);
      turnInEarthFrame(atNode, 4 * j, 0, 0, attitude[3 * j + 2]!);
    }
    for (let k = 0; k < this.bias.length; k++) this.bias[k]! += biasChange[k]!;
    for (let a = 0; a < 3; a++) this.scale[a]! += scaleChange[a]!;
    for (let j = 0; j < nodes - 1; j++) {
      const from = this.sampleOf(j);
      const to = this.sampleOf(j + 1);
      for (let a = 0; a < 4; a++) q[4 * from + a] = atNode[4 * j + a]!;
      this.integrate(j);
      const lack = turnFromTo(q, 4 * to, atNode, 4 * (j + 1));
      for (let a = 0; a < 3; a++) this.mismatch[3 * j + a] = -lack[a]!;
      for (let i = from + 1; i < to; i++) {
        const share = (i - from) / (to - from);
        turnInEarthFrame(q, 4 * i, share * lack[0]!, share * lack[1]!, share * lack[2]!);
      }
      for (let a = 0; a < 4; a++) q[4 * to + a] = atNode[4 * (j + 1) + a]!;
    }
  }
}

/** Rotation vector, earth frame, that turns orientation b[k..] into a[i..]. */
function turnFromTo(b: Float64Array, k: number, a: Float64Array, i: number): [number, number, number] {
  const aw = a[i]!;
  const ax = a[i + 1]!;
  const ay = a[i + 2]!;
  const az = a[i + 3]!;
  const bw = b[k]!;
  const bx = -b[k + 1]!;
  const by = -b[k + 2]!;
  const bz = -b[k + 3]!;
  const w = aw * bw - ax * bx - ay * by - az * bz;
  const x = aw * bx + ax * bw + ay * bz - az * by;
  const y = aw * by - ax * bz + ay * bw + az * bx;
  const z = aw * bz + ax * by - ay * bx + az * bw;
  const s = Math.sqrt(x * x + y * y + z * z);
  const sign = w < 0 ? -1 : 1;
  const f = s < 1e-9 ? 2 * sign : (2 * sign * Math.atan2(s, sign * w)) / s;
  return [f * x, f * y, f * z];
}
