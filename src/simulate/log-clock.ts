import { randomStream } from '../stats/random.js';
import type { Sensor } from './device-schema.js';
import type { DeviceModel } from './sensor-errors.js';

const PER_S = { s: 1, ms: 1e3, us: 1e6, ns: 1e9 } as const;
/** Decimals of a stamp in each unit: seconds keep microseconds, the others are whole. */
export const STAMP_DIGITS = { s: 6, ms: 0, us: 0, ns: 0 } as const;

/**
 * The phone's clock in one walk: stamps count from its start-up, whole seconds before the walk.
 *
 * A stamp in nanoseconds stays below 2^53, so that every stamp is exact in a float64.
 */
export interface LogClock {
  /** The stamp of a true instant (s), in the log's unit, as written. */
  stamp(trueS: number): number;
  /** Clock time of a true instant, s, since a stamp; not rounded to the stamps' step. */
  sinceStamp(trueS: number, stamp: number): number;
}

export function logClock(seed: number, walk: string, device: DeviceModel): LogClock {
  const unit = device.plan.time_unit;
  const startedS = randomStream(seed, 'walk', walk, 'clock').integer(1000, 500000);
  const fast = 1 + device.clock_ppm * 1e-6;
  const perS = PER_S[unit];
  const steps = unit === 's' ? 1e6 : 1;
  return {
    stamp: (trueS) => startedS * perS + Math.round(trueS * fast * perS * steps) / steps,
    sinceStamp: (trueS, stamp) => trueS * fast - (stamp - startedS * perS) / perS,
  };
}

/** When one sensor measures, and the instants that its stamps show (both true time, s, ascending). */
export interface Sampling {
  measuredS: Float64Array;
  stampedS: Float64Array;
}

/**
 * A sensor's sampling instants from 0 to `durationS`.
 *
 * @param together - sampled with the others from 0 on, as in a wide log; else each sensor has its own offset.
 */
export function sample(
  seed: number,
  walk: string,
  device: DeviceModel,
  sensor: Sensor,
  rateHz: number,
  durationS: number,
  together: boolean,
): Sampling {
  const random = randomStream(seed, 'walk', walk, 'sampling', together ? 'all' : sensor);
  const period = 1 / (rateHz * (1 + (device.plan[sensor].rate_error_ppm ?? 0) * 1e-6));
  const offset = together ? 0 : random.uniform() * period;
  const n = Math.max(1, Math.floor((durationS - offset) / period + 1e-9));
  const measuredS = new Float64Array(n);
  const stampedS = new Float64Array(n);
  const delay = device.plan[sensor].delay_s ?? 0;
  for (let i = 0; i < n; i++) {
    // Within 0.45 of a period, so that readings keep their order; the first stands where it should.
    const early = i === 0 ? 0 : bounded(device.jitter_s * random.normal(), period);
    const error = i === 0 ? 0 : device.stamp_error_s * random.normal();
    measuredS[i] = offset + i * period + early - delay;
    stampedS[i] = offset + i * period + bounded(early + error, period);
  }
  return { measuredS, stampedS };
}

function bounded(value: number, period: number): number {
  return Math.max(-0.45 * period, Math.min(0.45 * period, value));
}

/** Times (true, s) between which no reading is written, in pairs, ascending. */
export function lostSpells(seed: number, walk: string, device: DeviceModel, durationS: number): Float64Array {
  const random = randomStream(seed, 'walk', walk, 'loss');
  const spells: number[] = [];
  if (device.loss_per_min > 0)
    for (let t = 0; ; ) {
      t += (-60 / device.loss_per_min) * Math.log(1 - random.uniform());
      if (t >= durationS) break;
      const until = t - device.loss_s * Math.log(1 - random.uniform());
      spells.push(t, until);
      t = until;
    }
  return Float64Array.from(spells);
}
