import { readCampaign } from '../campaign/read-campaign.js';
import { readLog } from '../campaign/read-log.js';
import { InputError } from '../errors.js';
import { chosenWalks } from '../pipeline.js';
import { medianRateHz } from '../signal/sampling-rate.js';
import { type AllanDeviation, type AllanKind, allanDeviation } from '../stats/allan.js';
import { fitNoise, type NoiseFit } from '../stats/noise-fit.js';
import { layoutOf } from './import-readings.js';

/** Noise of one axis of a device at rest. */
export interface AxisNoise {
  sensor: 'accel' | 'gyro';
  axis: 'x' | 'y' | 'z';
  deviation: AllanDeviation;
  /** Null for kinds other than the overlapping Allan deviation. */
  fit: NoiseFit | null;
}

/** Shorter records say nothing of the bias. */
const LEAST_S = 60;
/** A step in time longer than this many sample intervals is a gap, over which noise cannot be followed. */
const GAP_INTERVALS = 5;

/**
 * Allan deviations of accelerometer and gyroscope of a log in which the device lay still, and the noise parameters
 * fitted to them.
 *
 * @param kind - default `overlapping-allan`; the fit is of this one.
 * @throws InputError `too-short` where the longest stretch without a gap is below a minute; `not-still` where the device moved.
 */
export async function noiseOfLog(
  campaignDir: string,
  walk: string,
  kind: AllanKind = 'overlapping-allan',
): Promise<AxisNoise[]> {
  const campaign = readCampaign(campaignDir);
  const [name] = chosenWalks(campaign, [walk]);
  const row = campaign.walks.find((candidate) => candidate.walk === name)!;
  const { accel, gyro } = await readLog(campaign.dir, row, layoutOf(campaign, row));
  const out: AxisNoise[] = [];
  const add = (
    sensor: AxisNoise['sensor'],
    t: Float64Array,
    columns: readonly Float64Array[],
    limit: number,
  ) => {
    const rateHz = medianRateHz(t);
    const { from, to } = longestStretch(t, GAP_INTERVALS / rateHz);
    const seconds = t[to - 1]! - t[from]!;
    if (!(seconds >= LEAST_S))
      throw new InputError(
        'too-short',
        `${walk}: ${sensor}: the longest stretch without a gap is ${seconds.toFixed(0)} s, must be at least ${LEAST_S}; record longer, ten minutes and more`,
      );
    const actualHz = (to - from - 1) / seconds;
    for (const [a, column] of columns.entries()) {
      const part = column.slice(from, to);
      const spread = slowSpread(part, Math.round(actualHz));
      if (spread > limit)
        throw new InputError(
          'not-still',
          `${walk}: ${sensor}: one-second means of ${'xyz'[a]} scatter by ${spread.toPrecision(2)}, must be below ${limit}; the device moved: record it lying still`,
        );
      const deviation = allanDeviation(part, actualHz, kind);
      out.push({
        sensor,
        axis: 'xyz'[a] as AxisNoise['axis'],
        deviation,
        fit: kind === 'overlapping-allan' ? fitNoise(deviation) : null,
      });
    }
  };
  if (accel) add('accel', accel.t_s, [accel.x_mps2, accel.y_mps2, accel.z_mps2], 0.1);
  if (gyro) add('gyro', gyro.t_s, [gyro.x_radps, gyro.y_radps, gyro.z_radps], 0.02);
  return out;
}

function longestStretch(t: Float64Array, gapS: number): { from: number; to: number } {
  let best = { from: 0, to: 0 };
  for (let from = 0; from < t.length; ) {
    let to = from + 1;
    while (to < t.length && t[to]! - t[to - 1]! <= gapS) to++;
    if (to - from > best.to - best.from) best = { from, to };
    from = to;
  }
  return best;
}

/** Robust scatter of one-second means: white noise is averaged away, motion is not. */
function slowSpread(values: Float64Array, perSecond: number): number {
  const means: number[] = [];
  for (let from = 0; from + perSecond <= values.length; from += perSecond) {
    let sum = 0;
    for (let i = from; i < from + perSecond; i++) sum += values[i]!;
    means.push(sum / perSecond);
  }
  means.sort((a, b) => a - b);
  const middle = means[means.length >> 1] ?? 0;
  const away = means.map((x) => Math.abs(x - middle)).sort((a, b) => a - b);
  return 1.4826 * (away[away.length >> 1] ?? 0);
}
