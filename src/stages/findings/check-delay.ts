import { interpolateCubic } from '../../signal/interpolate-cubic.js';
import { vectorDelay } from '../../signal/vector-delay.js';
import type { ReadingsGyro, ReadingsMag } from '../../tables/schemas.js';
import type { Finding } from './finding.js';

export interface DelayLimits {
  /** Longest delay of the magnetometer against the gyroscope, s. */
  delayS: number;
}

const GRID_S = 0.04;
/** Only where the two look alike does a delay mean anything; walks with turns reach 0.9. */
const LEAST_CORRELATION = 0.6;
/** Each half needs this long for a delay of its own, s. */
const LEAST_HALF_S = 15;

/**
 * Whether the magnetometer's stamps belong to the gyroscope's: a constant delay, and one that changes between the halves
 * of the walk (clocks that drift apart, or one that was set). Accelerometers share the gyroscope's chip and clock.
 */
export function checkDelay(gyro: ReadingsGyro, mag: ReadingsMag, limits: DelayLimits): Finding[] {
  const to_s = Math.min(gyro.t_s.at(-1) ?? 0, mag.t_s.at(-1) ?? 0);
  const n = Math.floor(to_s / GRID_S);
  if (n < 100) return [];
  const onGrid = (t: Float64Array, columns: readonly Float64Array[]) =>
    columns.map((column) => interpolateCubic(t, column, 0, GRID_S, n));
  const rate = onGrid(gyro.t_s, [gyro.x_radps, gyro.y_radps, gyro.z_radps]);
  const field = onGrid(mag.t_s, [mag.x_uT, mag.y_uT, mag.z_uT]);
  const whole = vectorDelay(rate, field, GRID_S);
  const out: Finding[] = [];
  const ms = (s: number) => `${Math.round(1000 * s)} ms`;
  if (whole && whole.correlation > LEAST_CORRELATION && Math.abs(whole.delayS) > limits.delayS)
    out.push({
      severity: 'warn',
      kind: 'sensor-delay',
      sensor: 'mag',
      from_s: 0,
      to_s,
      value: whole.delayS,
      message: `magnetometer: stamped ${ms(Math.abs(whole.delayS))} ${whole.delayS > 0 ? 'later' : 'earlier'} than the gyroscope's readings of the same motion; headings lag in every turn; calibrate the delay`,
    });
  const half = n >> 1;
  if (half * GRID_S < LEAST_HALF_S) return out;
  const first = vectorDelay(rate, field, GRID_S, 0, half);
  const second = vectorDelay(rate, field, GRID_S, half, n);
  if (!first || !second || Math.min(first.correlation, second.correlation) < LEAST_CORRELATION) return out;
  const change = second.delayS - first.delayS;
  if (Math.abs(change) > limits.delayS)
    out.push({
      severity: 'warn',
      kind: 'clock-drift',
      sensor: 'mag',
      from_s: 0,
      to_s,
      value: change,
      message: `magnetometer: its clock and the gyroscope's come apart by ${ms(Math.abs(change))} from the first half of the walk to the second; late headings are wrong; look at whether both sensors' stamps are of one clock`,
    });
  return out;
}
