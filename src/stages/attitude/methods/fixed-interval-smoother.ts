import { z } from 'zod';
import type { Attitude, Motion } from '../../../tables/schemas.js';
import { defineMethod } from '../../stage.js';
import { attitudeColumns } from '../attitude-columns.js';
import { smoothAttitude } from '../error-state-smoother.js';
import { inertialSamples } from '../inertial-samples.js';

/** Settings with the reason for each default; densities are those of consumer MEMS parts. */
export const smootherSettings = z.strictObject({
  /** Spacing of the nodes at which errors are estimated: a step of a walker holds four or five. */
  node_s: z.number().min(0.02).max(1).default(0.1),
  /** Rounds of linearisation and re-weighting; the last change is then below a hundredth of a degree. */
  rounds: z.int().min(3).max(20).default(7),
  /** Angle random walk: 3e-4 rad/sqrt(s) is twice the densities that data sheets of phone parts give. */
  angle_random_walk_radps: z.number().positive().default(3e-4),
  /** Random walk of the bias, rad/s per sqrt(s): 0.01 deg/s in a minute and a half. */
  bias_random_walk_radps: z.number().positive().default(3e-5),
  /** Least standard deviation of the bias before anything is seen, after a phone's own correction. */
  bias_sd_radps: z.number().positive().default(3e-3),
  /** Standard deviation of each axis' scale error: data sheets give one percent. */
  scale_sd: z.number().positive().default(0.01),
  /** Error that grows with turning (cross-axis, timing): share of the angle turned in each node interval. */
  turning_error: z.number().min(0).default(0.005),
  /** Standard deviation of each axis' accelerometer bias. */
  accel_bias_sd_mps2: z.number().positive().default(0.05),
  /** Velocity random walk of the accelerometer, m/s per sqrt(s). */
  velocity_random_walk_mps: z.number().positive().default(0.02),
  /** How long the velocity keeps its direction: a walker on one leg of a route some ten seconds, a waving hand less. */
  velocity_memory_s: z.number().positive().default(10),
  /** Least standard deviation of the velocity; the walk's own is estimated above it. */
  velocity_sd_mps: z.number().positive().default(0.3),
  /** Whether the magnetometer is used where there is one. */
  magnetometer: z.boolean().default(true),
  /** How long a magnetic disturbance lasts: a walker is past a piece of steel in some seconds. */
  magnetic_memory_s: z.number().positive().default(4),
  /** Relative deviation of the field's norm that doubles its variance. */
  norm_tolerance: z.number().positive().default(0.1),
  /** Deviation of the dip that doubles its variance. */
  dip_tolerance_deg: z.number().positive().default(10),
  /** Constant error of magnetic heading that no averaging removes (calibration, the building). */
  magnetic_offset_sd_deg: z.number().min(0).default(4),
  /** Window and limits of the test for a phone that lies still. */
  rest_window_s: z.number().positive().default(1),
  rest_gyro_radps: z.number().positive().default(0.02),
  rest_accel_mps2: z.number().positive().default(0.15),
});

export type SmootherSettings = z.output<typeof smootherSettings>;

/**
 * Attitude from the whole log at once: gyroscope integrated at the full rate, its errors estimated at nodes by a
 * fixed-interval smoother over an error-state model, re-linearised and re-weighted some rounds.
 *
 * State: attitude error, gyroscope bias, velocity, accelerometer bias, gyroscope scale (15). A walker's or a hand's
 * velocity stays bounded, so its integral from the accelerometer tells the tilt; the horizontal direction of the
 * magnetic field tells yaw, with Student-t weights and the deviations of norm and dip as signs of disturbance.
 * Without a magnetometer yaw starts at 0 and its standard deviation says so.
 */
export const fixedIntervalSmoother = defineMethod<{ motion: Motion }, Attitude, typeof smootherSettings>({
  name: 'fixed-interval-smoother',
  source:
    'error-state model: Lefferts, Markley & Shuster (1982), J. Guidance 5(5), 417-429; smoother: Bierman (1973), ' +
    'Int. J. Control 18(1), 65-75; Student-t weights: Lange, Little & Taylor (1989), JASA 84, 881-896',
  version: 3,
  settings: smootherSettings,
  uses: ['place'],
  run({ motion }, settings, context) {
    const samples = inertialSamples(motion);
    return attitudeColumns(motion, samples, smoothAttitude(samples, settings, context.place), settings);
  },
});
