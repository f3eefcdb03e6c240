import { stillWindows } from '../../signal/still-windows.js';
import { median } from '../../stats/quantile.js';
import type { ReadingsAccel, ReadingsGyro } from '../../tables/schemas.js';
import type { Finding } from './finding.js';

export interface RestLimits {
  /** Largest part by which |f| at rest may differ from gravity, percent. */
  gravityPct: number;
  /** Largest rate of a gyroscope at rest, rad/s. */
  biasRadps: number;
}

/** Scatter of a phone that is still, m/s2 and rad/s: a hand held quiet shows as much. */
const STILL_MPS2 = 0.15;
const STILL_RADPS = 0.02;

/** Fewer still seconds say too little. */
const LEAST_WINDOWS = 2;

/**
 * Gravity and the gyroscope's zero, where the phone is still.
 *
 * @param gravity - expected at the place, m/s2.
 */
export function checkRest(
  accel: ReadingsAccel | undefined,
  gyro: ReadingsGyro | undefined,
  gravity: number,
  limits: RestLimits,
): Finding[] {
  const out: Finding[] = [];
  if (accel) {
    const still = stillWindows(accel.t_s, [accel.x_mps2, accel.y_mps2, accel.z_mps2], STILL_MPS2);
    if (still.length >= LEAST_WINDOWS) {
      const size = median(Float64Array.from(still, ({ mean }) => Math.hypot(...mean)));
      const off = (100 * (size - gravity)) / gravity;
      // A wrong unit is told by itself.
      if (Math.abs(off) > limits.gravityPct && size > 5 && size < 20)
        out.push({
          severity: 'warn',
          kind: 'gravity-off',
          sensor: 'accel',
          from_s: still[0]!.from_s,
          to_s: still.at(-1)!.to_s,
          value: off,
          message: `accelerometer: at rest it reads ${size.toFixed(2)} m/s2, ${Math.abs(off).toFixed(1)} % ${off > 0 ? 'more' : 'less'} than gravity (${gravity.toFixed(3)}); step lengths and tilt are off; calibrate it from still positions`,
        });
    }
  }
  if (gyro) {
    const still = stillWindows(gyro.t_s, [gyro.x_radps, gyro.y_radps, gyro.z_radps], STILL_RADPS);
    if (still.length >= LEAST_WINDOWS) {
      const bias = [0, 1, 2].map((a) => median(Float64Array.from(still, ({ mean }) => mean[a]!)));
      const size = Math.hypot(...bias);
      if (size > limits.biasRadps)
        out.push({
          severity: 'warn',
          kind: 'gyro-bias',
          sensor: 'gyro',
          from_s: still[0]!.from_s,
          to_s: still.at(-1)!.to_s,
          value: size,
          message: `gyroscope: at rest it reads ${((size * 180) / Math.PI).toFixed(1)} degrees a second; it is estimated and taken off, but a part of that size is worn or was not calibrated by its phone; calibrate it at rest`,
        });
    }
  }
  return out;
}
