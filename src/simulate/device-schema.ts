import { z } from 'zod';
import { CLASS_NAMES } from './device-classes.js';

const amount = z.number().min(0);

/** Errors of one sensor, in its unit u (m/s², rad/s, uT, hPa); what is not given is the class's. */
const sensorErrorsSchema = z.strictObject({
  noise_density: amount.optional().describe('White noise N, u/sqrt(Hz).'),
  bias_sd: amount.optional().describe('Constant bias of a device, u; for the magnetometer its hard iron.'),
  bias: z.tuple([z.number(), z.number(), z.number()]).optional().describe('That bias itself, u.'),
  turn_on_sd: amount.optional().describe('Change of the bias from walk to walk, u.'),
  bias_instability: amount.optional().describe('Flicker B, u.'),
  random_walk: amount.optional().describe('Rate random walk K, u/sqrt(s).'),
  scale_sd: amount
    .max(0.3)
    .optional()
    .describe('Scale error of each axis; for the magnetometer its soft iron.'),
  misalignment_sd_rad: amount.max(0.3).optional(),
  per_degC_sd: amount.optional().describe('Drift of the bias with temperature, u/K.'),
  range: z.number().positive().optional().describe('Readings are clipped to this, u.'),
  step: amount.optional().describe('Quantisation, u; 0 for none.'),
  rate_error_ppm: z.number().min(-1e5).max(1e5).optional(),
  delay_s: z.number().min(0).max(1).optional().describe('Its stamps are late by this.'),
});

const rate = z.number().positive().max(2000);

export const SENSORS = ['accel', 'gyro', 'mag', 'baro'] as const;
export type Sensor = (typeof SENSORS)[number];

/** One phone of a plan. */
export const deviceSchema = z
  .strictObject({
    class: z.enum(CLASS_NAMES).default('typical'),
    shape: z.enum(['wide', 'tagged']).default('wide'),
    time_unit: z.enum(['s', 'ms', 'us', 'ns']).default('ns'),
    gzip: z.boolean().default(true),
    rate_hz: z
      .union(
        [
          rate,
          z.strictObject({ accel: rate, gyro: rate.optional(), mag: rate.optional(), baro: rate.optional() }),
        ],
        'must be a rate in Hz, or a rate for each sensor that there is: { accel: 100, gyro: 100, mag: 50 }',
      )
      .default(100)
      .describe('One rate: accelerometer, gyroscope and magnetometer.'),
    accel: sensorErrorsSchema.prefault({}),
    gyro: sensorErrorsSchema.prefault({}),
    mag: sensorErrorsSchema.prefault({}),
    baro: sensorErrorsSchema.prefault({}),
    clock_ppm: z.number().min(-1e4).max(1e4).optional().describe('How much too fast the clock is.'),
    jitter_s: amount.max(0.1).optional().describe('Irregularity of sampling; stamps stay true.'),
    stamp_error_s: amount.max(0.1).optional().describe('Error of stamps; sampling stays regular.'),
    loss_per_min: amount.max(60).optional().describe('Bursts of lost readings.'),
    loss_s: amount.max(30).optional().describe('Mean length of a burst.'),
    duplicates: amount.max(0.5).optional().describe('Part of the rows that are written twice.'),
    disorder: amount.max(0.5).optional().describe('Part of the rows that change place with the next.'),
    warming_degC: z
      .number()
      .min(-50)
      .max(50)
      .optional()
      .describe('By how much the phone warms up in the end.'),
    warming_s: z.number().positive().optional(),
  })
  .superRefine((device, context) => {
    const rates = typeof device.rate_hz === 'number' ? [] : Object.values(device.rate_hz);
    if (device.shape === 'wide' && new Set(rates).size > 1)
      context.addIssue({
        code: 'custom',
        path: ['rate_hz'],
        message: 'a wide log has one rate for all sensors; give one, or shape: tagged',
      });
  });

export type DevicePlan = z.output<typeof deviceSchema>;
export type SensorErrorsPlan = z.output<typeof sensorErrorsSchema>;
