import { medianRateHz } from '../../signal/sampling-rate.js';
import { type Finding, SENSOR_WORDS } from './finding.js';

export interface SamplingLimits {
  /** Below this rate the steps of a quick walker are no longer told apart well, hertz. */
  lowestRateHz: number;
  /** Longest time between two readings that is no gap, seconds. */
  gapS: number;
  /** Largest spread of the time between readings, as a percentage of its median. */
  jitterPct: number;
}

/**
 * How often and how evenly one sensor was read, and where it was silent.
 *
 * @param t - its times, ascending, seconds.
 */
export function checkSampling(sensor: string, t: Float64Array, limits: SamplingLimits): Finding[] {
  const name = SENSOR_WORDS[sensor] ?? sensor;
  const from_s = t[0] ?? 0;
  const to_s = t.at(-1) ?? 0;
  const rate = medianRateHz(t);
  if (!(rate > 0))
    return [
      {
        severity: 'fail',
        kind: 'too-short',
        sensor,
        from_s,
        to_s,
        value: t.length,
        message: `${name}: only ${t.length} ${t.length === 1 ? 'reading' : 'readings'} at different times, so nothing can be made of it; record longer or look at the log's time column`,
      },
    ];
  const out: Finding[] = [];
  const whole = { sensor, from_s, to_s };
  const rateText = `${rate.toFixed(1)} readings a second`;
  // The barometer is slow by design and no step is read from it.
  if (rate < limits.lowestRateHz && sensor !== 'baro')
    out.push({
      severity: 'warn',
      kind: 'low-rate',
      ...whole,
      value: rate,
      message: `${name}: ${rateText}, below ${limits.lowestRateHz}; steps are missed or placed late; set the logger to 50 or more`,
    });
  else out.push({ severity: 'note', kind: 'rate', ...whole, value: rate, message: `${name}: ${rateText}` });
  const jitter = 100 * intervalSpread(t) * rate;
  if (jitter > limits.jitterPct)
    out.push({
      severity: 'warn',
      kind: 'jitter',
      ...whole,
      value: jitter,
      message: `${name}: the time between readings varies by ${jitter.toFixed(0)} % of its median; turns and steps are smeared; use the sensor's own time stamps rather than those of arrival`,
    });
  out.push(...gaps(sensor, name, t, limits.gapS));
  return out;
}

function gaps(sensor: string, name: string, t: Float64Array, gapS: number): Finding[] {
  const out: Finding[] = [];
  for (let i = 1; i < t.length; i++) {
    const from_s = t[i - 1]!;
    const to_s = t[i]!;
    const length = to_s - from_s;
    if (!(length > gapS)) continue;
    out.push({
      severity: 'warn',
      kind: 'gap',
      sensor,
      from_s,
      to_s,
      value: length,
      message: `${name}: silent for ${length.toFixed(2)} s from ${from_s.toFixed(2)} s; steps and turns in it are lost; keep the recorder in the foreground`,
    });
  }
  return out;
}

/** Spread of the times between readings: half of the width that the middle 90 % take, seconds. */
function intervalSpread(t: Float64Array): number {
  const steps = new Float64Array(t.length - 1);
  for (let i = 1; i < t.length; i++) steps[i - 1] = t[i]! - t[i - 1]!;
  steps.sort();
  const at = (share: number) => steps[Math.round(share * (steps.length - 1))]!;
  return (at(0.95) - at(0.05)) / 2;
}
