import { type Jet, zeroJet } from './jet.js';
import type { QuinticSpline } from './quintic-spline.js';
import { type Curve2, smoothStep } from './smooth-step.js';

/** An instant of foot contact. */
export interface Contact {
  tS: number;
  foot: 'left' | 'right';
  /** How far the body advanced along the path since the contact before, or since standing. */
  lengthM: number;
  /** Where along the path the body was. */
  alongM: number;
}

/** Uninterrupted walking, with its functions of time. */
export interface Bout {
  startS: number;
  endS: number;
  contacts: readonly Contact[];
  /** Distance along the path. */
  along: QuinticSpline;
  /** Steps taken: a whole number at each contact, even at the left foot's. */
  phase: QuinticSpline;
  /** Half the rise and fall of the body, m: 0 while standing. */
  lift: QuinticSpline;
}

/** A change of height while standing, as in a lift. */
export interface Ride {
  startS: number;
  endS: number;
  upM: number;
}

/** A walk's course in time: bouts with standing between them, from 0 to `durationS`. */
export interface Timeline {
  durationS: number;
  bouts: readonly Bout[];
  rides: readonly Ride[];
}

/** The timeline's functions at some instants. */
export interface Course {
  along: Jet;
  phase: Jet;
  lift: Jet;
  up: Jet;
}

/**
 * Distance, step phase, lift and height as functions of time.
 *
 * @param times - shape (n), s, any order.
 */
export function courseAt(timeline: Timeline, times: Float64Array): Course {
  const n = times.length;
  const course = { along: zeroJet(n), phase: zeroJet(n), lift: zeroJet(n), up: zeroJet(n) };
  const out: Curve2 = [0, 0, 0];
  let bout = 0;
  let knot = 0;
  for (let i = 0; i < n; i++) {
    const t = times[i]!;
    while (bout > 0 && t < timeline.bouts[bout]!.startS) bout--;
    while (bout + 1 < timeline.bouts.length && t >= timeline.bouts[bout + 1]!.startS) bout++;
    const current = timeline.bouts[bout];
    if (current) {
      knot = current.along.interval(t, knot);
      // The three have the same knots.
      store(current.along, t, knot, course.along, i, out);
      store(current.phase, t, knot, course.phase, i, out);
      store(current.lift, t, knot, course.lift, i, out);
    }
    for (const ride of timeline.rides) {
      if (t <= ride.startS) break;
      const seconds = ride.endS - ride.startS;
      smoothStep((t - ride.startS) / seconds, out);
      course.up.v[i]! += ride.upM * out[0];
      course.up.d[i]! += (ride.upM * out[1]) / seconds;
      course.up.dd[i]! += (ride.upM * out[2]) / (seconds * seconds);
    }
  }
  return course;
}

function store(spline: QuinticSpline, t: number, knot: number, jet: Jet, i: number, out: Curve2): void {
  spline.evaluate(t, knot, out);
  jet.v[i] = out[0];
  jet.d[i] = out[1];
  jet.dd[i] = out[2];
}

/** Whether the walker walks at t. */
export function isWalking(timeline: Timeline, t: number): boolean {
  return timeline.bouts.some(({ startS, endS }) => t > startS && t < endS);
}

/** The first instant at which the body has gone `alongM`; the start of the first bout for 0. */
export function instantAt(timeline: Timeline, alongM: number): number {
  for (const { startS, endS, along } of timeline.bouts) {
    if (along.at(endS) < alongM - 1e-9) continue;
    let low = startS;
    let high = endS;
    // Sixty halvings of minutes reach the last digit of a float64.
    for (let round = 0; round < 60; round++) {
      const middle = (low + high) / 2;
      if (along.at(middle) < alongM) low = middle;
      else high = middle;
    }
    return alongM <= 0 ? startS : high;
  }
  return timeline.bouts.at(-1)?.endS ?? 0;
}
