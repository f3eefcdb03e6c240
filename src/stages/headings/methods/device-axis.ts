import { z } from 'zod';
import { wrapToPi, wrapToTurn } from '../../../stats/circular.js';
import type { Headings } from '../../../tables/schemas.js';
import { defineMethod } from '../../stage.js';
import { deviceDirection } from '../device-direction.js';
import type { HeadingsInputs } from '../index.js';
import { meanOverIntervals } from '../mean-over-intervals.js';
import { startOffset } from '../start-offset.js';
import { yawSdAt } from '../yaw-sd-at.js';

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
  version: 2,
  settings: settingsSchema,
  uses: ['start'],
  run({ steps, attitude }, settings, context) {
    const n = steps.t_s.length;
    const { east, north } = deviceDirection(attitude);
    const direction = meanOverIntervals(attitude.t_s, east, north, steps.start_s, steps.end_s);
    const fromStart = startOffset(direction, steps, context.start, settings.start_steps)?.offsetRad ?? null;
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
