import { type CarrySpell, carriedAt, drawSpells } from './carry-plan.js';
import { gaitMotion } from './gait-motion.js';
import { addProduct, combine, cosine, product, sine, zeroJet } from './jet.js';
import type { RouteCurve } from './route-curve.js';
import { courseAt, type Timeline } from './timeline.js';
import { liftM } from './walk-bout.js';
import type { WalkerModel } from './walker-model.js';

/** True motion of walker and phone at n instants; vectors as three arrays. */
export interface DeviceMotion {
  /** The walker's even course, without the sway of the steps: east, north, up, m. */
  body: Triple;
  /** Clockwise from grid north, unwrapped, rad. */
  headingRad: Float64Array;
  /** The phone's position, velocity and acceleration in ENU: m, m/s, m/s². */
  position: Triple;
  velocity: Triple;
  acceleration: Triple;
  /** Device -> ENU, unit length, qw >= 0. */
  attitude: readonly [Float64Array, Float64Array, Float64Array, Float64Array];
  /** Angular rate in the device frame, rad/s. */
  rate: Triple;
}

export type Triple = readonly [Float64Array, Float64Array, Float64Array];

/** One walk's motion, computable at any instants. */
export interface MotionModel {
  walker: WalkerModel;
  curve: RouteCurve;
  timeline: Timeline;
  /** Height of the pelvis above the grid's zero at the start, m. */
  pelvisUpM: number;
  spells: ReturnType<typeof drawSpells>;
}

/** Makes a walk's motion; the carries' mountings are drawn from the walk's own stream. */
export function motionModel(
  seed: number,
  walk: string,
  parts: {
    walker: WalkerModel;
    curve: RouteCurve;
    timeline: Timeline;
    upM: number;
    carries: readonly CarrySpell[];
    /** The phone's slow wander, times that of each carry. */
    wander: number;
  },
): MotionModel {
  const { walker, curve, timeline, upM, carries, wander } = parts;
  const spells = drawSpells(seed, walk, carries, timeline.durationS, wander);
  return { walker, curve, timeline, pelvisUpM: upM + 1.05 * walker.legM, spells };
}

const BLOCK = 1024;

function triple(n: number): Triple {
  return [new Float64Array(n), new Float64Array(n), new Float64Array(n)];
}

/**
 * The motion at some instants; every derivative is exact.
 *
 * @param times - shape (n), s from the walk's true start, ascending.
 */
export function motionAt(model: MotionModel, times: Float64Array): DeviceMotion {
  const n = times.length;
  const out: DeviceMotion = {
    body: triple(n),
    headingRad: new Float64Array(n),
    position: triple(n),
    velocity: triple(n),
    acceleration: triple(n),
    attitude: [new Float64Array(n), ...triple(n)],
    rate: triple(n),
  };
  for (let from = 0; from < n; from += BLOCK)
    block(model, times.subarray(from, Math.min(n, from + BLOCK)), from, out);
  return out;
}

/** A step's length against the leg's at a comfortable pace: limbs swing by about 20 degrees. Norms of gait-norms.ts. */
const COMFORTABLE_STEP_PER_LEG = 0.73;

function vigourPerLift(walker: WalkerModel): number {
  const pace = walker.stepLengthM / walker.legM / COMFORTABLE_STEP_PER_LEG;
  return pace / liftM(walker, walker.stepLengthM);
}

function block(model: MotionModel, times: Float64Array, from: number, out: DeviceMotion): void {
  const n = times.length;
  const course = courseAt(model.timeline, times);
  const [east, north, heading] = [zeroJet(n), zeroJet(n), zeroJet(n)];
  model.curve.follow(course.along, east, north, heading);
  const gait = gaitMotion(model.walker, course.phase, course.lift);
  const vigour = combine(0, vigourPerLift(model.walker), course.lift);
  const inputs = { walker: model.walker, gait, phase: course.phase, vigour };
  const carried = carriedAt(model.spells, times, inputs, heading);
  const [sin, cos] = [sine(heading), cosine(heading)];
  // Right is (cos, -sin) and forward (sin, cos) in east and north.
  const place = [
    combine(0, 1, east, 1, addProduct(product(cos, carried.right), 1, sin, carried.forward)),
    combine(0, 1, north, 1, addProduct(product(cos, carried.forward), -1, sin, carried.right)),
    combine(model.pelvisUpM, 1, course.up, 1, carried.up),
  ];
  out.body[0].set(east.v, from);
  out.body[1].set(north.v, from);
  for (let i = 0; i < n; i++) out.body[2][from + i] = model.pelvisUpM + course.up.v[i]!;
  out.headingRad.set(heading.v, from);
  for (let axis = 0; axis < 3; axis++) {
    out.position[axis]!.set(place[axis]!.v, from);
    out.velocity[axis]!.set(place[axis]!.d, from);
    out.acceleration[axis]!.set(place[axis]!.dd, from);
  }
  const [qw, qx, qy, qz] = carried.attitude;
  for (let i = 0; i < n; i++) {
    const [w, x, y, z] = [qw.v[i]!, qx.v[i]!, qy.v[i]!, qz.v[i]!];
    const [dw, dx, dy, dz] = [qw.d[i]!, qx.d[i]!, qy.d[i]!, qz.d[i]!];
    const square = w * w + x * x + y * y + z * z;
    // Twice the vector part of the inverse quaternion times its derivative; its length drops out.
    const k = 2 / square;
    out.rate[0][from + i] = k * (w * dx - x * dw - y * dz + z * dy);
    out.rate[1][from + i] = k * (w * dy + x * dz - y * dw - z * dx);
    out.rate[2][from + i] = k * (w * dz - x * dy + y * dx - z * dw);
    const scale = (w < 0 ? -1 : 1) / Math.sqrt(square);
    out.attitude[0][from + i] = w * scale;
    out.attitude[1][from + i] = x * scale;
    out.attitude[2][from + i] = y * scale;
    out.attitude[3][from + i] = z * scale;
  }
}

/**
 * ENU vectors in the device frame.
 *
 * @param attitude - device -> ENU; `vectors` in ENU; both shape (n).
 */
export function intoDevice(attitude: DeviceMotion['attitude'], vectors: Triple): Triple {
  const n = vectors[0].length;
  const out = triple(n);
  const [qw, qx, qy, qz] = attitude;
  for (let i = 0; i < n; i++) {
    const [w, x, y, z] = [qw[i]!, -qx[i]!, -qy[i]!, -qz[i]!];
    const [a, b, c] = [vectors[0][i]!, vectors[1][i]!, vectors[2][i]!];
    const tx = 2 * (y * c - z * b);
    const ty = 2 * (z * a - x * c);
    const tz = 2 * (x * b - y * a);
    out[0][i] = a + w * tx + y * tz - z * ty;
    out[1][i] = b + w * ty + z * tx - x * tz;
    out[2][i] = c + w * tz + x * ty - y * tx;
  }
  return out;
}

/** Specific force in the device frame, m/s²: acceleration less gravity (down). */
export function specificForce(motion: DeviceMotion, gravityMps2: number): Triple {
  const up = motion.acceleration[2].map((value) => value + gravityMps2);
  return intoDevice(motion.attitude, [motion.acceleration[0], motion.acceleration[1], up]);
}
