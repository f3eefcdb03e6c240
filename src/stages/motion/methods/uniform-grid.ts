import { z } from 'zod';
import type { AxisCalibration } from '../../../campaign/context.js';
import { InputError } from '../../../errors.js';
import { interpolateCubic } from '../../../signal/interpolate-cubic.js';
import { decimate, lowPassTaps } from '../../../signal/low-pass-fir.js';
import { medianRateHz } from '../../../signal/sampling-rate.js';
import type { Motion } from '../../../tables/schemas.js';
import { defineMethod } from '../../stage.js';
import type { MotionInputs } from '../index.js';

/** Above this no body or hand motion of a walker is left, so a faster log is only longer. */
const HIGHEST_OWN_RATE_HZ = 200;

/** Taps on either side per kept sample: a transition band of about a fifth of the new rate. */
const HALF_TAPS_PER_KEPT = 14;

const settingsSchema = z.strictObject({
  /** Rate of the grid; `log`: the accelerometer's own, or a whole fraction of it not above 200 Hz. */
  rate_hz: z.union([z.literal('log'), z.number().min(10).max(2000)]).default('log'),
  /** Longest time without a reading that is bridged: a quarter of a second is half a step. */
  bridge_s: z.number().positive().max(2).default(0.25),
});

/**
 * One uniform time grid for all sensors by anti-aliased interpolation.
 *
 * Each sensor is interpolated by piecewise cubics onto a grid at or above its own rate, low-passed below
 * half of the new rate where that is lower, and thinned out. The grid runs while both the accelerometer
 * and, where present, the gyroscope report. Rows inside a gap longer than `bridge_s` carry NaN and, for
 * these two sensors, the flag `gap`.
 */
export const uniformGrid = defineMethod<MotionInputs, Motion, typeof settingsSchema>({
  name: 'uniform-grid',
  source:
    'Oppenheim & Schafer, Discrete-Time Signal Processing: sampling rate conversion; windowed-sinc low-pass',
  version: 1,
  settings: settingsSchema,
  uses: ['device'],
  run(inputs, settings, context) {
    const accel = inputs['readings-accel'];
    const gyro = inputs['readings-gyro'];
    const mag = inputs['readings-mag'];
    const baro = inputs['readings-baro'];
    const delay = context.device?.delay_s ?? {};
    const series: Series[] = [
      prepare('accel', accel.t_s, [accel.x_mps2, accel.y_mps2, accel.z_mps2], delay, context.device?.accel),
    ];
    if (gyro)
      series.push(
        prepare('gyro', gyro.t_s, [gyro.x_radps, gyro.y_radps, gyro.z_radps], delay, context.device?.gyro),
      );
    if (mag) series.push(prepare('mag', mag.t_s, [mag.x_uT, mag.y_uT, mag.z_uT], delay, context.device?.mag));
    if (baro) series.push(prepare('baro', baro.t_s, [baro.p_hPa], delay, null));

    const own = medianRateHz(series[0]!.t);
    const rate = settings.rate_hz === 'log' ? ownGridRate(own) : settings.rate_hz;
    const step = 1 / rate;
    const leading = series.filter((s) => s.sensor === 'accel' || s.sensor === 'gyro');
    const begin = Math.max(...leading.map((s) => s.t[0]!));
    const end = Math.min(...leading.map((s) => s.t[s.t.length - 1]!));
    const first = Math.ceil(begin * rate - 1e-9);
    const count = Math.max(0, Math.floor(end * rate + 1e-9) - first + 1);
    const t_s = new Float64Array(count);
    for (let i = 0; i < count; i++) t_s[i] = (first + i) * step;

    const gap = new Uint8Array(count);
    const out: Record<string, Float64Array> = {};
    for (const s of series) {
      const missing = gapRows(s.t, t_s, settings.bridge_s);
      const marks = s.sensor === 'accel' || s.sensor === 'gyro';
      for (const [axis, values] of s.values.entries()) {
        const column = resample(s, values, t_s, rate);
        for (let i = 0; i < count; i++) {
          if (!missing[i]) continue;
          column[i] = Number.NaN;
          if (marks) gap[i] = 1;
        }
        out[COLUMN_NAMES[s.sensor][axis]!] = column;
      }
    }
    return { t_s, ...out, gap } as Motion;
  },
});

const COLUMN_NAMES = {
  accel: ['ax_mps2', 'ay_mps2', 'az_mps2'],
  gyro: ['gx_radps', 'gy_radps', 'gz_radps'],
  mag: ['mx_uT', 'my_uT', 'mz_uT'],
  baro: ['p_hPa'],
} as const;

interface Series {
  sensor: keyof typeof COLUMN_NAMES;
  t: Float64Array;
  values: Float64Array[];
}

/** The log's own rate to a whole hertz, thinned by a whole factor where it is above what motion needs. */
function ownGridRate(ownHz: number): number {
  const whole = ownHz >= 10 ? Math.round(ownHz) : ownHz;
  return whole / Math.ceil(whole / HIGHEST_OWN_RATE_HZ);
}

/** Calibrated, delayed, and without readings that share the time of the one before (the first one stays). */
function prepare(
  sensor: Series['sensor'],
  t: Float64Array,
  values: readonly Float64Array[],
  delay: Readonly<Record<string, number>>,
  calibration: AxisCalibration | null | undefined,
): Series {
  const n = t.length;
  const shift = delay[sensor] ?? 0;
  const keptT = new Float64Array(n);
  const kept = values.map(() => new Float64Array(n));
  let count = 0;
  for (let i = 0; i < n; i++) {
    if (i > 0 && !(t[i]! > t[i - 1]!)) continue;
    keptT[count] = t[i]! + shift;
    for (let a = 0; a < values.length; a++) kept[a]![count] = values[a]![i]!;
    count++;
  }
  if (count < 2)
    throw new InputError(
      'too-short',
      `${sensor}: needs at least 2 readings at different times, got ${count}`,
    );
  const trimmed = kept.map((v) => v.subarray(0, count));
  if (calibration) applyCalibration(trimmed, calibration);
  return { sensor, t: keptT.subarray(0, count), values: trimmed };
}

function applyCalibration(xyz: readonly Float64Array[], c: AxisCalibration): void {
  const [x, y, z] = xyz as [Float64Array, Float64Array, Float64Array];
  const m = c.matrix;
  for (let i = 0; i < x.length; i++) {
    const dx = x[i]! - c.bias[0];
    const dy = y[i]! - c.bias[1];
    const dz = z[i]! - c.bias[2];
    x[i] = m[0] * dx + m[1] * dy + m[2] * dz;
    y[i] = m[3] * dx + m[4] * dy + m[5] * dz;
    z[i] = m[6] * dx + m[7] * dy + m[8] * dz;
  }
}

/** Marks grid times between two readings that lie further apart than the bridge, or that far beyond the ends. */
function gapRows(t: Float64Array, grid: Float64Array, bridgeS: number): Uint8Array {
  const out = new Uint8Array(grid.length);
  const n = t.length;
  let j = 0;
  for (let i = 0; i < grid.length; i++) {
    const at = grid[i]!;
    while (j + 1 < n && t[j + 1]! <= at) j++;
    if (at < t[0]!) out[i] = t[0]! - at > bridgeS ? 1 : 0;
    else if (j + 1 >= n) out[i] = at - t[n - 1]! > bridgeS ? 1 : 0;
    else out[i] = t[j + 1]! - t[j]! > bridgeS && at > t[j]! ? 1 : 0;
  }
  return out;
}

/** One axis on the grid: straight interpolation, or at a multiple of the grid's rate, low-passed and thinned. */
function resample(s: Series, values: Float64Array, grid: Float64Array, rateHz: number): Float64Array {
  if (grid.length === 0) return new Float64Array(0);
  const own = medianRateHz(s.t);
  // A sensor up to 5 % faster than the grid is the same rate with a clock of its own.
  const keep = own > 1.05 * rateHz ? Math.ceil(own / rateHz - 1e-6) : 1;
  if (keep === 1) return interpolateCubic(s.t, values, grid[0]!, 1 / rateHz, grid.length);
  const fine = interpolateCubic(s.t, values, grid[0]!, 1 / (rateHz * keep), (grid.length - 1) * keep + 1);
  // The middle of the transition at 0.4 of the new rate: flat to about 0.3, shut at 0.5.
  return decimate(fine, lowPassTaps(0.4 / keep, HALF_TAPS_PER_KEPT * keep), keep);
}
