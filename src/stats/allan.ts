import { InputError } from '../errors.js';
import { equivalentDegreesOfFreedom } from './allan-degrees.js';
import { chiSquareQuantile } from './chi-square.js';
import { noiseExponent } from './noise-exponent.js';
import type { NoiseExponent } from './power-law-covariance.js';

export type AllanKind = 'overlapping-allan' | 'modified-allan' | 'overlapping-hadamard' | 'time';

/** One entry a tau in every array. */
export interface AllanDeviation {
  kind: AllanKind;
  sampleRateHz: number;
  nSamples: number;
  /** Of the interval `low` to `high`. */
  confidence: number;
  /** Averaging times, ascending; whole multiples of the sample interval. */
  tauS: Float64Array;
  /** Unit of the rate; of `time` the rate's unit times seconds. */
  deviation: Float64Array;
  low: Float64Array;
  high: Float64Array;
  /** Equivalent degrees of freedom of the squared deviation. */
  degreesOfFreedom: Float64Array;
  /** Exponent of the spectrum f^alpha that prevails at this tau; degrees of freedom depend on it. */
  noiseExponent: NoiseExponent[];
}

/** Phase points that one difference spans: this many averaging times. */
const SPAN: Record<AllanKind, number> = {
  'overlapping-allan': 2,
  'modified-allan': 3,
  'overlapping-hadamard': 3,
  time: 3,
};

/**
 * Stability of a rate over averaging time, with chi-square intervals.
 *
 * Overlapping estimators: every position of the window counts, which halves the scatter of the plain
 * ones. Cost is one pass over the phase a tau, whatever the averaging.
 *
 * @param rate - shape (n), n >= 3, evenly sampled, any unit; every value finite (bridge no gaps: noise
 *   across a bridge is not the sensor's).
 * @param sampleRateHz - above 0.
 * @param kind - `overlapping-allan` (default) for noise fits; `modified-allan` also tells white from
 *   flicker phase noise; `overlapping-hadamard` is blind to a steady drift; `time` is tau/√3 times modified.
 * @param tausS - seconds; each is taken to the nearest multiple of the sample interval. Default: about ten
 *   a decade from one sample to a fifth of the record.
 * @param confidence - of the intervals, default 0.95.
 * @throws InputError `too-short`, `not-finite`, `sample-rate`, `tau`, `confidence`.
 * @see Riley (2008), Handbook of Frequency Stability Analysis, NIST Special Publication 1065, sections
 *   5.2.4, 5.2.5, 5.2.10, 5.2.6 and 5.3.
 */
export function allanDeviation(
  rate: Float64Array,
  sampleRateHz: number,
  kind: AllanKind = 'overlapping-allan',
  tausS?: ArrayLike<number>,
  confidence = 0.95,
): AllanDeviation {
  const nSamples = rate.length;
  if (!(sampleRateHz > 0 && sampleRateHz < Number.POSITIVE_INFINITY))
    throw new InputError(
      'sample-rate',
      `allanDeviation: sampleRateHz must be a finite number above 0, got ${sampleRateHz}`,
    );
  if (!(confidence > 0 && confidence < 1))
    throw new InputError(
      'confidence',
      `allanDeviation: confidence must be between 0 and 1, got ${confidence}`,
    );
  if (nSamples < SPAN[kind])
    throw new InputError(
      'too-short',
      `allanDeviation: ${kind} needs at least ${SPAN[kind]} samples, got ${nSamples}`,
    );
  const phase = phaseOf(rate);
  const averages = tausS
    ? averagesOf(tausS, sampleRateHz, kind, nSamples)
    : spreadAverages(Math.max(1, Math.floor(nSamples / 5)));

  const count = averages.length;
  const out: AllanDeviation = {
    kind,
    sampleRateHz,
    nSamples,
    confidence,
    tauS: Float64Array.from(averages, (m) => m / sampleRateHz),
    deviation: new Float64Array(count),
    low: new Float64Array(count),
    high: new Float64Array(count),
    degreesOfFreedom: new Float64Array(count),
    noiseExponent: [],
  };
  const order = kind === 'overlapping-hadamard' ? 3 : 2;
  const modified = kind === 'modified-allan' || kind === 'time';
  // White rate noise, until there are enough averages to tell.
  let exponent: NoiseExponent = 0;
  for (const [k, m] of averages.entries()) {
    const deviation =
      Math.sqrt(stabilityVariance(phase, m, kind)) * sampleRateHz ** (kind === 'time' ? -1 : 0);
    exponent = noiseExponent(phase, m, order) ?? exponent;
    const degrees = equivalentDegreesOfFreedom(exponent, order, m, phase.length, modified);
    out.deviation[k] = deviation;
    out.degreesOfFreedom[k] = degrees;
    out.low[k] = deviation * Math.sqrt(degrees / chiSquareQuantile((1 + confidence) / 2, degrees));
    out.high[k] = deviation * Math.sqrt(degrees / chiSquareQuantile((1 - confidence) / 2, degrees));
    out.noiseExponent.push(exponent);
  }
  return out;
}

/** Integral of the rate in units of one sample interval; the mean is taken out first, for the digits. */
function phaseOf(rate: Float64Array): Float64Array {
  let mean = 0;
  for (let i = 0; i < rate.length; i++) {
    if (!Number.isFinite(rate[i]!))
      throw new InputError('not-finite', `allanDeviation: sample ${i} is ${rate[i]}`);
    mean += rate[i]! / rate.length;
  }
  const phase = new Float64Array(rate.length + 1);
  for (let i = 0; i < rate.length; i++) phase[i + 1] = phase[i]! + (rate[i]! - mean);
  return phase;
}

/** Variance at m samples of averaging, with the sample interval as the unit of time. */
function stabilityVariance(x: Float64Array, m: number, kind: AllanKind): number {
  switch (kind) {
    case 'overlapping-allan': {
      const n = x.length - 2 * m;
      let sum = 0;
      for (let i = 0; i < n; i++) sum += (x[i + 2 * m]! - 2 * x[i + m]! + x[i]!) ** 2;
      return sum / (2 * m * m * n);
    }
    case 'overlapping-hadamard': {
      const n = x.length - 3 * m;
      let sum = 0;
      for (let i = 0; i < n; i++) sum += (x[i + 3 * m]! - 3 * x[i + 2 * m]! + 3 * x[i + m]! - x[i]!) ** 2;
      return sum / (6 * m * m * n);
    }
    case 'modified-allan':
      return modifiedVariance(x, m);
    case 'time':
      return (modifiedVariance(x, m) * m * m) / 3;
    default:
      return kind satisfies never;
  }
}

function modifiedVariance(x: Float64Array, m: number): number {
  const n = x.length - 3 * m + 1;
  let window = 0;
  for (let i = 0; i < m; i++) window += x[i + 2 * m]! - 2 * x[i + m]! + x[i]!;
  let sum = window * window;
  for (let i = 0; i < n - 1; i++) {
    window += x[i + 3 * m]! - 3 * x[i + 2 * m]! + 3 * x[i + m]! - x[i]!;
    sum += window * window;
  }
  return sum / (2 * m ** 4 * n);
}

function averagesOf(
  tausS: ArrayLike<number>,
  sampleRateHz: number,
  kind: AllanKind,
  nSamples: number,
): number[] {
  const longest = Math.floor(nSamples / SPAN[kind]);
  const averages = new Set<number>();
  for (let k = 0; k < tausS.length; k++) {
    const m = Math.round(tausS[k]! * sampleRateHz);
    if (!(m >= 1 && m <= longest))
      throw new InputError(
        'tau',
        `allanDeviation: tau must be within ${1 / sampleRateHz}..${longest / sampleRateHz} (s) for ${kind} of ${nSamples} samples at ${sampleRateHz} Hz, got ${tausS[k]}`,
      );
    averages.add(m);
  }
  return [...averages].sort((a, b) => a - b);
}

/** Whole numbers from 1 to `longest`, about ten a decade. */
function spreadAverages(longest: number): number[] {
  const averages = new Set<number>();
  for (let k = 0; 10 ** (k / 10) <= longest * (1 + 1e-12); k++) averages.add(Math.round(10 ** (k / 10)));
  return [...averages];
}
