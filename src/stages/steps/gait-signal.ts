import { InputError } from '../../errors.js';
import type { Attitude, Motion } from '../../tables/schemas.js';

/** What the detectors work on: one channel at a rate that gait needs, no more. */
export interface GaitSignal {
  /** Time of the first sample, seconds on the motion table's clock. */
  startS: number;
  /** 25 to 50 Hz, or the motion table's own rate where that is lower. */
  rateHz: number;
  /** Shape (n), m/s2, up positive, gravity still in it; 0 where missing. */
  vertical: Float64Array;
  /** Shape (n), 1 inside gaps. */
  missing: Uint8Array;
}

/** Gait has nothing of use above some 10 Hz, and 25 Hz places an instant to a few milliseconds. */
const LEAST_RATE_HZ = 25;

/**
 * Vertical acceleration of the device, thinned to 25 to 50 Hz by averaging.
 *
 * With an attitude it is the up component of the specific force. Without one it is the magnitude: gravity is
 * much larger than what a step adds, so the magnitude changes by the component along gravity to first order.
 *
 * @throws InputError `not-finite` where a reading outside gaps is not a number; `rows-differ` where the
 *   attitude has another number of rows; `not-uniform` where the times have no constant step.
 */
export function gaitSignal(motion: Motion, attitude: Attitude | undefined): GaitSignal {
  const { t_s, ax_mps2: ax, ay_mps2: ay, az_mps2: az, gap } = motion;
  const n = t_s.length;
  if (attitude && attitude.qw.length !== n)
    throw new InputError(
      'rows-differ',
      `steps: attitude must have the ${n} rows of motion, got ${attitude.qw.length}; make both from the same log`,
    );
  if (n < 2)
    return {
      startS: n ? t_s[0]! : 0,
      rateHz: LEAST_RATE_HZ,
      vertical: new Float64Array(0),
      missing: new Uint8Array(0),
    };
  const stepS = (t_s[n - 1]! - t_s[0]!) / (n - 1);
  if (!(stepS > 0 && Math.abs(t_s[1]! - t_s[0]! - stepS) < 0.01 * stepS))
    throw new InputError(
      'not-uniform',
      `steps: motion must have a constant time step, got ${t_s[1]! - t_s[0]!} s first and ${stepS} s on average`,
    );
  const keep = Math.max(1, Math.floor(1 / (stepS * LEAST_RATE_HZ) + 1e-6));
  const count = Math.floor(n / keep);
  const vertical = new Float64Array(count);
  const missing = new Uint8Array(count);
  for (let o = 0, i = 0; o < count; o++) {
    let sum = 0;
    let holes = 0;
    for (const end = i + keep; i < end; i++) {
      holes |= gap[i]!;
      const x = ax[i]!;
      const y = ay[i]!;
      const z = az[i]!;
      if (attitude) {
        const w = attitude.qw[i]!;
        const a = attitude.qx[i]!;
        const b = attitude.qy[i]!;
        const c = attitude.qz[i]!;
        sum += 2 * (a * c - w * b) * x + 2 * (b * c + w * a) * y + (1 - 2 * (a * a + b * b)) * z;
      } else sum += Math.sqrt(x * x + y * y + z * z);
    }
    if (holes) missing[o] = 1;
    else if (Number.isFinite(sum)) vertical[o] = sum / keep;
    else
      throw new InputError(
        'not-finite',
        `steps: motion must be finite outside gaps, got a value that is not between ${t_s[i - keep]!} and ${t_s[i - 1]!} s`,
      );
  }
  return { startS: t_s[0]! + 0.5 * (keep - 1) * stepS, rateHz: 1 / (stepS * keep), vertical, missing };
}
