import { z } from 'zod';
import type { StartContext } from '../../../campaign/context.js';
import { circularMean, wrapToPi, wrapToTurn } from '../../../stats/circular.js';
import type { Headings, Steps } from '../../../tables/schemas.js';
import { defineMethod } from '../../stage.js';
import { deviceDirection } from '../device-direction.js';
import type { HeadingsInputs } from '../index.js';
import { meanOverSteps } from '../mean-over-steps.js';

const settingsSchema = z.strictObject({
  /** Walking direction minus the device's direction, clockwise, where the start heading does not tell it. */
  offset_deg: z.number().min(-180).max(180).default(0),
  /** How far people hold a phone off their walking direction: about five degrees in the hand. */
  offset_sd_deg: z.number().positive().default(5),
  /** Scatter of a single step: the trunk's and hand's yaw sway. */
  step_sd_deg: z.number().positive().default(4),
  /** First steps after the start whose mean direction is set to the start heading: two strides, so sway averages out. */
  start_steps: z.int().min(1).max(20).default(4),
  /** Standard deviation of a given start heading against those steps. */
  start_sd_deg: z.number().positive().default(4),
});

/**
 * Walking direction = direction of the device over the ground plus a constant offset.
 *
 * The device's direction is averaged over the step's whole interval. Where the walk gives a start heading, the offset
 * is what brings the first steps to it; so it also takes out a constant error of the magnetic heading.
 */
export const deviceAxis = defineMethod<HeadingsInputs, Headings, typeof settingsSchema>({
  name: 'device-axis',
  source: 'common practice of pedestrian dead reckoning with a phone held in front of the body, no source',
  version: 1,
  settings: settingsSchema,
  uses: ['start'],
  run({ steps, attitude }, settings, context) {
    const n = steps.t_s.length;
    const { east, north } = deviceDirection(attitude);
    const direction = meanOverSteps(attitude.t_s, east, north, steps);
    const fromStart = offsetFromStart(direction, steps, context.start, settings.start_steps);
    const offset = fromStart ?? (settings.offset_deg * Math.PI) / 180;
    const constantSd =
      ((fromStart === null ? settings.offset_sd_deg : settings.start_sd_deg) * Math.PI) / 180;
    const stepSd = (settings.step_sd_deg * Math.PI) / 180;
    const heading_rad = new Float64Array(n);
    const sd_rad = new Float64Array(n);
    for (let k = 0; k < n; k++) {
      heading_rad[k] = wrapToTurn(direction[k]! + offset);
      const yaw = fromStart === null ? yawSdAt(attitude, steps.t_s[k]!) : 0;
      sd_rad[k] = Math.hypot(yaw, constantSd, stepSd);
    }
    return {
      step: steps.step.slice(),
      heading_rad,
      sd_rad,
      offset_rad: new Float64Array(n).fill(wrapToPi(offset)),
      source: new Array<string>(n).fill('device-axis'),
    };
  },
});

/** Offset that brings the first steps after the start to the given heading; null where none is given or no step follows. */
function offsetFromStart(
  direction: Float64Array,
  steps: Steps,
  start: StartContext | null,
  startSteps: number,
): number | null {
  if (!start || start.heading_rad === null) return null;
  let first = 0;
  if (start.t_s !== null) while (first < direction.length && steps.t_s[first]! < start.t_s) first++;
  const used = direction.subarray(first, first + startSteps);
  if (used.length === 0) return null;
  const mean = circularMean(used).directionRad;
  return mean === null ? null : wrapToPi(start.heading_rad - mean);
}

function yawSdAt(attitude: HeadingsInputs['attitude'], t: number): number {
  const rows = attitude.t_s.length;
  const stepS = rows > 1 ? (attitude.t_s[rows - 1]! - attitude.t_s[0]!) / (rows - 1) : 1;
  return attitude.yaw_sd_rad[Math.max(0, Math.min(rows - 1, Math.round((t - attitude.t_s[0]!) / stepS)))]!;
}
