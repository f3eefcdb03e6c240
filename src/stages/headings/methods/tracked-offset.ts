import { z } from 'zod';
import { type CircleMove, smoothOnCircle } from '../../../stats/circle-smoother.js';
import { wrapToPi, wrapToTurn } from '../../../stats/circular.js';
import type { Headings, Steps } from '../../../tables/schemas.js';
import { defineMethod } from '../../stage.js';
import { type CarryPrior, carryPrior } from '../carry-prior.js';
import { type CarrySpell, carrySpells } from '../carry-spells.js';
import type { HeadingsInputs } from '../index.js';
import { meanOverIntervals } from '../mean-over-intervals.js';
import { motionEvidence } from '../motion-evidence.js';
import { spellDirection } from '../spell-direction.js';
import { startOffset } from '../start-offset.js';
import { strideMotion } from '../stride-motion.js';
import { alongWalls, legWeights } from '../wall-evidence.js';
import { withoutSway } from '../without-sway.js';
import { yawSdAt } from '../yaw-sd-at.js';

const settingsSchema = z.strictObject({
  /** Whether the phone's motion tells the walking direction, or only the way it is carried and a given start heading. */
  motion: z.boolean().default(true),
  /** Random walk of the offset, as a factor on what is usual for the carry. */
  offset_walk: z.number().positive().default(1),
  /** Scatter of a single step. */
  step_sd_deg: z.number().positive().default(1),
  /** First steps after the start whose mean direction is set to the start heading: two strides, so sway averages out. */
  start_steps: z.int().min(1).max(20).default(4),
  /** Standard deviation of a given start heading against those steps. */
  start_sd_deg: z.number().positive().default(2),
  /**
   * Directions that legs are likelier to have: of the floor plan's walls (`floor`, where the campaign has a plan), or
   * `none`.
   */
  dominant_directions: z.enum(['floor', 'none']).default('floor'),
  /** How far people turn while they move the phone from one place to another. */
  handling_turn_deg: z.number().positive().default(25),
});

type Settings = z.output<typeof settingsSchema>;

const BINS = 360;
const CELL_RAD = (2 * Math.PI) / BINS;
const ANY = new Float64Array(BINS).fill(1 / BINS);

/** Degrees of freedom of Student's t: heavy tails, variance still finite (common practice, no source). */
const FREEDOM = 4;

/** Probability, per step, that the phone is turned in the hand or bag with its lie unchanged. */
const TURNED_SHARE = 3e-4;

/** Probability that a start heading, or the straight course while the phone is moved, is not as said. */
const WRONG_SHARE = 0.02;
const TURNED_WALKER_SHARE = 0.2;

/**
 * Walking direction = direction of the device over the ground plus an offset that is tracked through the walk.
 *
 * The belief about the offset begins with what the carry tells; a start heading, the axis of horizontal motion at the
 * step rate and its sense by the gait's phase, per stride, sharpen it forwards and backwards in time. Where gravity in the
 * device shows that the phone was moved to another place, the offset is open again but for the walker's course,
 * which goes on about straight.
 */
export const trackedOffset = defineMethod<HeadingsInputs, Headings, typeof settingsSchema>({
  name: 'tracked-offset',
  source:
    'principal axis of horizontal acceleration, sense by gait phase: Kunze, Lukowicz, Partridge & Begole (2009), ' +
    'ISWC, 103-106; smoothing of beliefs: Rabiner (1989), Proceedings of the IEEE 77(2), 257-286',
  version: 3,
  settings: settingsSchema,
  uses: ['start', 'carry', 'floor'],
  run({ steps, motion, attitude }, settings, context) {
    const n = steps.t_s.length;
    const spells = carrySpells(attitude, steps);
    const { east, north } = spellDirection(attitude, steps, spells);
    const whole = meanOverIntervals(attitude.t_s, east, north, steps.start_s, steps.end_s);
    const direction = swayRemoved(whole, steps, spells);
    const priors = spells.map(({ up }, i) => carryPrior(i === 0 ? context.carry : null, up));
    const yawSd = spells.map((spell) => meanYawSd(attitude, steps, spell));
    const logLikelihood = new Float64Array(n * BINS);
    const axisWeight = new Float64Array(spells.length);
    if (settings.motion) {
      const strideFrom = steps.t_s.map((t, k) => (k > 0 ? steps.t_s[k - 1]! : t));
      const strideTo = steps.t_s.map((t, k) => (k + 1 < n ? steps.t_s[k + 1]! : t));
      const along = meanOverIntervals(attitude.t_s, east, north, strideFrom, strideTo);
      const strides = strideMotion(motion, attitude, steps, along);
      for (const [i, { from, to }] of spells.entries()) {
        const seen = motionEvidence(strides, from, to, Math.hypot(priors[i]!.axisSdRad, yawSd[i]!));
        for (let k = from; k < to; k++) {
          // Told along the stride's mean direction; the table's is the step's.
          const shift = wrapToPi(along[k]! - direction[k]!);
          addMotion(logLikelihood.subarray(k * BINS, (k + 1) * BINS), seen, k - from, shift);
          axisWeight[i]! += 4 * Math.hypot(seen.axisCos[k - from]!, seen.axisSin[k - from]!);
        }
      }
    }
    if (settings.dominant_directions === 'floor' && context.floor) {
      const likelihood = alongWalls(context.floor.wall_share);
      const weights = legWeights(direction);
      for (let k = 0; k < n; k++)
        for (let b = 0; b < BINS; b++)
          logLikelihood[k * BINS + b]! += weights[k]! * Math.log(likelihood(direction[k]! + b * CELL_RAD));
    }
    const start = startOffset(direction, steps, context.start, settings.start_steps);
    if (start) {
      const row = logLikelihood.subarray((start.to - 1) * BINS, start.to * BINS);
      addAngle(row, start.offsetRad, radians(settings.start_sd_deg), WRONG_SHARE);
    }
    for (const [i, { from, to }] of spells.entries()) {
      // One thing known of the whole spell: each step brings its share of it.
      const known = distribution(priors[i]!, yawSd[i]!).map((p) => Math.log(p) / (to - from));
      for (let k = from; k < to; k++)
        for (let b = 0; b < BINS; b++) logLikelihood[k * BINS + b]! += known[b]!;
    }
    const smoothed = smoothOnCircle({
      bins: BINS,
      logLikelihood,
      prior: ANY,
      moves: movesOf(spells, priors, direction, settings),
    });
    const step2 = radians(settings.step_sd_deg) ** 2;
    const heading_rad = new Float64Array(n);
    const sd_rad = new Float64Array(n);
    const source: string[] = [];
    for (const [i, { from, to }] of spells.entries())
      for (let k = from; k < to; k++) {
        heading_rad[k] = wrapToTurn(direction[k]! + smoothed.mean[k]!);
        sd_rad[k] = Math.sqrt(step2 + smoothed.sd[k]! ** 2);
        source.push(axisWeight[i]! * priors[i]!.sdRad ** 2 > 1 ? 'motion' : 'device-axis');
      }
    const offset_rad = heading_rad.map((heading, k) => wrapToPi(heading - whole[k]!));
    return { step: steps.step.slice(), heading_rad, sd_rad, offset_rad, source };
  },
});

function radians(degrees: number): number {
  return (degrees * Math.PI) / 180;
}

/** Sway taken out of each stretch of one bout in one spell. */
function swayRemoved(direction: Float64Array, steps: Steps, spells: readonly CarrySpell[]): Float64Array {
  const out = direction.slice();
  for (const spell of spells)
    for (let from = spell.from; from < spell.to; ) {
      let to = from + 1;
      while (to < spell.to && steps.bout[to] === steps.bout[from]) to++;
      out.set(withoutSway(direction.subarray(from, to)), from);
      from = to;
    }
  return out;
}

function addMotion(
  row: Float64Array,
  seen: ReturnType<typeof motionEvidence>,
  k: number,
  shift: number,
): void {
  for (let b = 0; b < BINS; b++) {
    const p = b * CELL_RAD - shift;
    row[b]! +=
      seen.axisCos[k]! * Math.cos(2 * p) +
      seen.axisSin[k]! * Math.sin(2 * p) +
      seen.senseCos[k]! * Math.cos(p) +
      seen.senseSin[k]! * Math.sin(p);
  }
}

function addAngle(row: Float64Array, angle: number, sd: number, wrongShare: number): void {
  const scale = CELL_RAD / (sd * Math.sqrt(2 * Math.PI));
  for (let b = 0; b < BINS; b++) {
    const z = wrapToPi(b * CELL_RAD - angle) / sd;
    row[b]! += Math.log((1 - wrongShare) * scale * Math.exp(-0.5 * z * z) + wrongShare / BINS);
  }
}

/**
 * The carry's prior with the error of the yaw in it, in the tails of Student's t: buildings turn a compass by tens of
 * degrees.
 */
function distribution(prior: CarryPrior, yawSd: number): Float64Array {
  const out = new Float64Array(BINS).fill(prior.openShare / BINS);
  const scale2 = prior.sdRad ** 2 + yawSd ** 2;
  for (const near of prior.near) {
    const peak = out.map(
      (_, b) => (1 + wrapToPi(b * CELL_RAD - near) ** 2 / (FREEDOM * scale2)) ** (-(FREEDOM + 1) / 2),
    );
    const sum = peak.reduce((total, value) => total + value, 0);
    for (let b = 0; b < BINS; b++) out[b]! += ((1 - prior.openShare) / prior.near.length) * (peak[b]! / sum);
  }
  return out;
}

function meanYawSd(attitude: HeadingsInputs['attitude'], steps: Steps, { from, to }: CarrySpell): number {
  let sum = 0;
  for (let k = from; k < to; k++) sum += yawSdAt(attitude, steps.t_s[k]!) ** 2;
  return Math.sqrt(sum / (to - from));
}

function movesOf(
  spells: readonly CarrySpell[],
  priors: readonly CarryPrior[],
  direction: Float64Array,
  settings: Settings,
): CircleMove[] {
  const moves: CircleMove[] = [];
  for (const [i, { from, to }] of spells.entries())
    for (let k = from; k < to; k++) {
      if (k === 0) continue;
      const changed = k === from;
      moves.push({
        shiftRad: changed ? wrapToPi(direction[k - 1]! - direction[k]!) : 0,
        sdRad: changed ? radians(settings.handling_turn_deg) : settings.offset_walk * priors[i]!.walkRad,
        freshShare: changed ? TURNED_WALKER_SHARE : TURNED_SHARE,
        fresh: ANY,
      });
    }
  return moves;
}
