import { addProduct, type Jet, product, sine, zeroJet } from './jet.js';
import { type Curve2, smoothHill } from './smooth-step.js';
import { liftM } from './walk-bout.js';
import type { WalkerModel } from './walker-model.js';

/** Displacement of the pelvis from its even course: to the walker's right, forward and up, m. */
export interface GaitMotion {
  right: Jet;
  forward: Jet;
  up: Jet;
  /** The jolt of the heel strike at the pelvis, upward, m; apart, for it is damped or grows on the way to the phone. */
  jolt: Jet;
}

const TURN = 2 * Math.PI;

/**
 * Harmonics of the vertical acceleration: share of the first, and where in the step (0 is foot contact)
 * the maximum lies. The body is lowest in the middle of double support, a tenth of a step after contact.
 * Shares of the second and third from memory, after Menz, Lord & Fitzpatrick (2003), Gait & Posture 18, 35-46.
 */
export const VERTICAL_HARMONICS = [
  { times: 1, share: 1, at: 0.11 },
  { times: 2, share: 0.25, at: 0.06 },
  { times: 3, share: 0.1, at: 0.03 },
] as const;

/** Fore-aft acceleration: share of the vertical's first harmonic, and where the body is fastest. From memory, as above. */
export const FORWARD_HARMONICS = [
  { times: 1, share: 0.5, at: 0.06 },
  { times: 2, share: 0.18, at: 0.04 },
] as const;

/** How long the jolt of the heel strike lasts from contact on, part of a step: about 80 ms, half of it at its peak's foot. From memory. */
const HEEL_PART = 0.16;
/** So steep a hill is smooth enough at its foot that readings can be integrated at high order. */
const HEEL_POWER = 6;

/**
 * Motion of the pelvis within the steps.
 *
 * @param phase - steps taken, whole at each contact, even at the left foot's.
 * @param lift - half the rise and fall, m.
 * @see Zijlstra & Hof (1997), Gait & Posture 5, 249-262 (inverted pendulum and phases of the trunk's motion).
 */
export function gaitMotion(walker: WalkerModel, phase: Jet, lift: Jet): GaitMotion {
  const n = phase.v.length;
  const up = zeroJet(n);
  for (const { times, share, at } of VERTICAL_HARMONICS)
    addProduct(up, -share / times ** 2, lift, sine(phase, TURN * times, Math.PI / 2 - TURN * times * at));
  // As a part of the lift, so that a timid step has a timid heel strike.
  const jolt = addProduct(zeroJet(n), -1, lift, heelStrike(walker, phase));
  const forward = zeroJet(n);
  for (const { times, share, at } of FORWARD_HARMONICS)
    addProduct(forward, share / times ** 2, lift, sine(phase, TURN * times, -TURN * times * at));
  // Over the left foot from its contact (even phase) to the right one's, as wide as the body is lifted:
  // about 2 cm to each side at a comfortable pace (from memory).
  const right = product(lift, sine(phase, Math.PI, Math.PI));
  return { right, forward, up, jolt };
}

/** A short dip after each contact, in parts of the lift; its upward acceleration peaks at the walker's value. */
function heelStrike(walker: WalkerModel, phase: Jet): Jet {
  const out = zeroJet(phase.v.length);
  const hill: Curve2 = [0, 0, 0];
  // The hill's second derivative at its top, in units of its width, is -8 times its power.
  const widthS = HEEL_PART / walker.cadenceHz;
  const usualLift = liftM(walker, walker.stepLengthM);
  const height = usualLift > 0 ? (walker.heelStrikeMps2 * widthS ** 2) / (8 * HEEL_POWER) / usualLift : 0;
  for (let i = 0; i < out.v.length; i++) {
    const u = (phase.v[i]! - Math.floor(phase.v[i]!)) / HEEL_PART;
    if (u >= 1) continue;
    smoothHill(u, HEEL_POWER, hill);
    const rate = phase.d[i]! / HEEL_PART;
    out.v[i] = height * hill[0];
    out.d[i] = height * hill[1] * rate;
    out.dd[i] = height * (hill[2] * rate * rate + (hill[1] * phase.dd[i]!) / HEEL_PART);
  }
  return out;
}
