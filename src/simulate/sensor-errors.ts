import { randomStream } from '../stats/random.js';
import { DEVICE_CLASSES, type DeviceErrors, type SensorErrors } from './device-classes.js';
import type { Triple } from './device-motion.js';
import type { DevicePlan, Sensor } from './device-schema.js';

/** What a device does to the truth: the class's errors with the plan's own, and what was drawn for the device. */
export interface DeviceModel extends DeviceErrors {
  device: string;
  plan: DevicePlan;
}

type Given<T> = { [K in keyof T]: T[K] };

/** The entries that are given. */
function given<T extends object>(values: T): Partial<Given<T>> {
  return Object.fromEntries(Object.entries(values).filter(([, value]) => value !== undefined)) as Partial<T>;
}

/** A device of the plan with all its errors' sizes. */
export function deviceModel(device: string, plan: DevicePlan): DeviceModel {
  const base = DEVICE_CLASSES[plan.class];
  const own = given(plan);
  const sensor = (name: Sensor): SensorErrors => ({ ...base[name], ...given(plan[name]) }) as SensorErrors;
  return {
    ...base,
    ...own,
    accel: sensor('accel'),
    gyro: sensor('gyro'),
    mag: sensor('mag'),
    baro: sensor('baro'),
    device,
    plan,
  } as DeviceModel;
}

/** Readings with the bias that is in them (before scale and misalignment are undone: it is added last). */
export interface SensedTriple {
  values: Triple;
  bias: Triple;
}

/** Time constants of the processes that make up flicker noise, a factor of four apart, s. */
const FLICKER_S = [0.0625, 0.25, 1, 4, 16, 64, 256, 1024, 4096];

/**
 * A drifting bias and white noise on true values, then clipping and quantisation.
 *
 * Reading = (I + scale + misalignment) truth + bias(t) + white noise. The bias is the device's constant,
 * the walk's turn-on change, temperature drift, a random walk (K) and flicker noise (B), the last as a
 * sum of first-order Gauss-Markov processes: with time constants a factor r apart and variance
 * B² ln(r) / pi each, their densities add up to B²/(pi f), whose Allan deviation is B sqrt(2 ln 2 / pi)
 * between the outer time constants, well from 0.5 s to an hour.
 *
 * @param truth - shape (n) each of one to three axes, in the sensor's unit u.
 * @param times - shape (n), s, ascending.
 * @param rateHz - of the sensor, for the white noise: N sqrt(rate) a reading.
 * @see IEEE Std 952-1997, annex C (N, B, K).
 */
export function sense(
  seed: number,
  walk: string,
  device: DeviceModel,
  sensor: Sensor,
  truth: readonly Float64Array[],
  times: Float64Array,
  rateHz: number,
): { values: Float64Array[]; bias: Float64Array[] } {
  const errors = device[sensor];
  const n = times.length;
  const axes = truth.length;
  const part = randomStream(seed, 'device', device.device, sensor);
  const matrix = new Float64Array(9);
  for (let i = 0; i < 9; i++)
    matrix[i] =
      (i % 4 === 0 ? 1 + errors.scale_sd * part.normal() : errors.misalignment_sd_rad * part.normal()) || 0;
  const constants = [0, 1, 2].map((axis) => {
    const drawn = errors.bias_sd * part.normal();
    return device.plan[sensor].bias?.[axis] ?? drawn;
  });
  const perDegC = [0, 1, 2].map(() => errors.per_degC_sd * part.normal());
  const values = truth.map(() => new Float64Array(n));
  const bias = truth.map(() => new Float64Array(n));
  for (let axis = 0; axis < axes; axis++) {
    const random = randomStream(seed, 'walk', walk, sensor, axis);
    const drift = bias[axis]!;
    const constant = constants[axis]! + errors.turn_on_sd * random.normal();
    for (let i = 0; i < n; i++)
      drift[i] =
        constant + perDegC[axis]! * device.warming_degC * (1 - Math.exp(-times[i]! / device.warming_s));
    if (errors.random_walk > 0) addRandomWalk(drift, times, errors.random_walk, random.normal);
    if (errors.bias_instability > 0) addFlicker(drift, times, errors.bias_instability, random.normal);
    const out = values[axis]!;
    for (let other = 0; other < axes; other++) {
      const k = matrix[3 * axis + other]!;
      if (k === 0) continue;
      const from = truth[other]!;
      for (let i = 0; i < n; i++) out[i]! += k * from[i]!;
    }
    const white = randomStream(seed, 'walk', walk, sensor, axis, 'white');
    const sd = errors.noise_density * Math.sqrt(rateHz);
    const { range, step } = errors;
    for (let i = 0; i < n; i++) {
      let value = out[i]! + drift[i]!;
      if (sd > 0) value += sd * white.normal();
      value = Math.max(-range, Math.min(range, value));
      out[i] = step > 0 ? Math.round(value / step) * step : value;
    }
  }
  return { values, bias };
}

function addRandomWalk(drift: Float64Array, times: Float64Array, k: number, normal: () => number): void {
  let walk = 0;
  for (let i = 1; i < times.length; i++) {
    walk += k * Math.sqrt(Math.max(0, times[i]! - times[i - 1]!)) * normal();
    drift[i]! += walk;
  }
}

function addFlicker(drift: Float64Array, times: Float64Array, b: number, normal: () => number): void {
  const sd = b * Math.sqrt(Math.log(4) / Math.PI);
  const nSteps = times.length;
  const meanStep = nSteps > 1 ? (times[nSteps - 1]! - times[0]!) / (nSteps - 1) : 1;
  for (const constant of FLICKER_S) {
    const keep = Math.exp(-meanStep / constant);
    const kick = sd * Math.sqrt(1 - keep * keep);
    let state = sd * normal();
    for (let i = 0; i < nSteps; i++) {
      drift[i]! += state;
      state = keep * state + kick * normal();
    }
  }
}
