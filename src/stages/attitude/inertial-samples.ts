import { InputError } from '../../errors.js';
import { fillGaps } from '../../signal/fill-gaps.js';
import type { Motion } from '../../tables/schemas.js';
import { LeftOut } from '../left-out.js';

/** One walk's motion as attitude methods read it: gaps bridged for the arithmetic, and where they were. */
export interface InertialSamples {
  count: number;
  stepS: number;
  gyro: readonly [Float64Array, Float64Array, Float64Array];
  accel: readonly [Float64Array, Float64Array, Float64Array];
  /** NaN where the magnetometer is silent; null where the log has none. */
  mag: readonly [Float64Array, Float64Array, Float64Array] | null;
  gap: Uint8Array;
}

/**
 * @throws LeftOut where the motion has no angular rate; `too-short` below 3 rows.
 */
export function inertialSamples(motion: Motion): InertialSamples {
  const { gx_radps: gx, gy_radps: gy, gz_radps: gz, mx_uT: mx, my_uT: my, mz_uT: mz } = motion;
  if (!gx || !gy || !gz) throw new LeftOut('the log has no gyroscope: attitude, headings and path need one');
  const count = motion.t_s.length;
  if (count < 3) throw new InputError('too-short', `attitude: needs at least 3 rows of motion, got ${count}`);
  return {
    count,
    stepS: (motion.t_s[count - 1]! - motion.t_s[0]!) / (count - 1),
    gyro: [fillGaps(gx), fillGaps(gy), fillGaps(gz)],
    accel: [fillGaps(motion.ax_mps2), fillGaps(motion.ay_mps2), fillGaps(motion.az_mps2)],
    mag: mx && my && mz ? [mx, my, mz] : null,
    gap: motion.gap,
  };
}
