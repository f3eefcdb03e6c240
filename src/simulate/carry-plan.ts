import type { Quaternion } from '../geometry/quaternion.js';
import { randomStream } from '../stats/random.js';
import { CARRIES, type CarryInputs, type CarryName, type Mounting } from './carries.js';
import { attitudeOf, type CarryPose, type QuaternionJet } from './carry-pose.js';
import { addProduct, combine, constantJet, type Jet, product, zeroJet } from './jet.js';
import { QuinticSpline } from './quintic-spline.js';
import { type Curve2, smoothStep } from './smooth-step.js';

/** A carry and when the phone is moved into it; the first from the start on. */
export interface CarrySpell {
  carry: CarryName;
  fromS: number;
}

/** One spell of a walk with its mounting and the slow wander of its angles. */
interface Spell extends CarrySpell {
  mounting: Mounting;
  wander: readonly [yaw: QuinticSpline, pitch: QuinticSpline, roll: QuinticSpline];
}

/** Moving a phone from one carry to another takes this long, s. Common practice, no source. */
export const HANDLING_S = 1.6;

/** Knots of the wander, s. */
const WANDER_S = 2.5;

/** Draws how the phone sits in each of a walk's carries; `wanderShare` times each carry's own slow wander. */
export function drawSpells(
  seed: number,
  walk: string,
  spells: readonly CarrySpell[],
  durationS: number,
  wanderShare: number,
): Spell[] {
  return spells.map((spell, index) => {
    const random = randomStream(seed, 'walk', walk, 'carry', index);
    const carry = CARRIES[spell.carry];
    const mounting = carry.mount(random);
    const n = Math.max(2, Math.ceil(durationS / WANDER_S) + 1);
    const wander = () =>
      new QuinticSpline(
        Float64Array.from({ length: n }, (_, i) => (i * durationS) / (n - 1)),
        Float64Array.from({ length: n }, () => wanderShare * carry.wanderRad * random.normal()),
      );
    return { ...spell, mounting, wander: [wander(), wander(), wander()] };
  });
}

/** The phone against the walker: place in the walker's frame, and attitude in ENU (not of unit length while it is handled). */
export interface Carried {
  right: Jet;
  forward: Jet;
  up: Jet;
  attitude: QuaternionJet;
}

/**
 * The phone's place and attitude at some instants.
 *
 * Between carries the poses are blended with smooth weights, by way of a pose half-way, so that no
 * blend spans more than a right angle by much and the turn stays even.
 */
export function carriedAt(
  spells: readonly Spell[],
  times: Float64Array,
  inputs: CarryInputs,
  heading: Jet,
): Carried {
  const n = times.length;
  const first = times[0]!;
  const last = times[n - 1]!;
  let sum: Carried | null = null;
  for (const [index, spell] of spells.entries()) {
    const until = spells[index + 1]?.fromS ?? Number.POSITIVE_INFINITY;
    if (last >= spell.fromS && first <= until + HANDLING_S) {
      const pose = posed(spell, times, inputs);
      const here = { ...pose, attitude: attitudeOf(pose, heading) };
      if (first >= spell.fromS + HANDLING_S && last <= until) return here;
      // In by the second half of the handling before, out by the first half of the one after.
      const rise = ramp(times, spell.fromS + HANDLING_S / 2, HANDLING_S / 2, index === 0);
      const fall = ramp(times, until, HANDLING_S / 2, false);
      sum = addWeighted(sum, combine(0, 1, rise, -1, fall), here, signOf(spells, index));
    }
    const next = spells[index + 1];
    if (next && last >= until && first <= until + HANDLING_S) {
      const between = handled(spell, next, n);
      const here = { ...between, attitude: attitudeOf(between, heading) };
      const rise = ramp(times, until, HANDLING_S / 2, false);
      const fall = ramp(times, until + HANDLING_S / 2, HANDLING_S / 2, false);
      sum = addWeighted(sum, combine(0, 1, rise, -1, fall), here, signOf(spells, index));
    }
  }
  return sum!;
}

/** 0 before `fromS`, 1 from `seconds` later; 1 throughout where `always`. */
function ramp(times: Float64Array, fromS: number, seconds: number, always: boolean): Jet {
  if (always) return constantJet(times.length, 1);
  const out = zeroJet(times.length);
  const step: Curve2 = [0, 0, 0];
  for (let i = 0; i < times.length; i++) {
    smoothStep((times[i]! - fromS) / seconds, step);
    out.v[i] = step[0];
    out.d[i] = step[1] / seconds;
    out.dd[i] = step[2] / (seconds * seconds);
  }
  return out;
}

function posed(spell: Spell, times: Float64Array, inputs: CarryInputs): CarryPose {
  const pose = CARRIES[spell.carry].pose(inputs, spell.mounting);
  const [yaw, pitch, roll] = spell.wander.map((spline) => splineJet(spline, times));
  return {
    ...pose,
    yaw: combine(0, 1, pose.yaw, 1, yaw!),
    pitch: combine(0, 1, pose.pitch, 1, pitch!),
    roll: combine(0, 1, pose.roll, 1, roll!),
  };
}

function splineJet(spline: QuinticSpline, times: Float64Array): Jet {
  const out = zeroJet(times.length);
  const at: Curve2 = [0, 0, 0];
  let knot = 0;
  for (let i = 0; i < times.length; i++) {
    knot = spline.interval(times[i]!, knot);
    spline.evaluate(times[i]!, knot, at);
    out.v[i] = at[0];
    out.d[i] = at[1];
    out.dd[i] = at[2];
  }
  return out;
}

/** Held in front of the trunk, turned half-way from one mounting to the other. */
function handled(from: Spell, to: Spell, n: number): CarryPose {
  const [a, b] = [restingAttitude(from.mounting), restingAttitude(to.mounting)];
  const sign = dot(a, b) < 0 ? -1 : 1;
  const middle = a.map((value, i) => value + sign * b[i]!) as Quaternion;
  const length = Math.hypot(...middle);
  const zero = constantJet(n, 0);
  return {
    right: constantJet(n, 0.15),
    forward: constantJet(n, 0.25),
    up: constantJet(n, 0.15),
    yaw: zero,
    pitch: zero,
    roll: zero,
    base: middle.map((value) => value / length) as Quaternion,
  };
}

/** Device -> walker's frame while standing. */
function restingAttitude(mounting: Mounting): Quaternion {
  const zero = constantJet(1, 0);
  const pose: CarryPose = {
    right: zero,
    forward: zero,
    up: zero,
    yaw: constantJet(1, mounting.yawRad),
    pitch: constantJet(1, mounting.pitchRad),
    roll: constantJet(1, mounting.rollRad),
    base: mounting.base,
  };
  return attitudeOf(pose, zero).map(({ v }) => v[0]!) as Quaternion;
}

function dot(a: Quaternion, b: Quaternion): number {
  return a[0] * b[0] + a[1] * b[1] + a[2] * b[2] + a[3] * b[3];
}

/** q and -q are one attitude: the sign that keeps the blends of all handlings before this one short. */
function signOf(spells: readonly Spell[], index: number): number {
  let sign = 1;
  for (let i = 1; i <= index; i++)
    if (dot(restingAttitude(spells[i - 1]!.mounting), restingAttitude(spells[i]!.mounting)) < 0) sign = -sign;
  return sign;
}

function addWeighted(sum: Carried | null, weight: Jet, part: Carried, sign: number): Carried {
  const attitude = part.attitude.map((component) =>
    product(weight, combine(0, sign, component)),
  ) as QuaternionJet;
  if (!sum)
    return {
      right: product(weight, part.right),
      forward: product(weight, part.forward),
      up: product(weight, part.up),
      attitude,
    };
  addProduct(sum.right, 1, weight, part.right);
  addProduct(sum.forward, 1, weight, part.forward);
  addProduct(sum.up, 1, weight, part.up);
  return {
    ...sum,
    attitude: sum.attitude.map((component, i) => combine(0, 1, component, 1, attitude[i]!)) as QuaternionJet,
  };
}
