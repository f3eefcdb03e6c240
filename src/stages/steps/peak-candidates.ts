import { butterworthLowPass } from '../../signal/butterworth.js';
import { localMaxima, parabolicTop } from '../../signal/local-maxima.js';
import { zeroPhase } from '../../signal/zero-phase.js';
import type { GaitSignal } from './gait-signal.js';

/** Every peak that could be a step, in time order. */
export interface PeakCandidates {
  count: number;
  /** Place in samples, with its fraction, shape (count). */
  at: Float64Array;
  /** Height above the higher of the two bases, m/s2, shape (count). */
  prominence: Float64Array;
  /** The low-passed signal that they are peaks of. */
  level: Float64Array;
  /** Of that signal. */
  rateHz: number;
}

/** A base is looked for this far on either side: a slow step. */
const BASE_REACH_S = 0.8;

/**
 * Peaks of the low-passed vertical acceleration with their prominence, outside gaps.
 *
 * @param lowpassHz - second order, forwards and backwards: a step's rise and fall passes, the shock's ringing does not.
 * @param leastMps2 - smaller ones are left out.
 */
export function peakCandidates(signal: GaitSignal, lowpassHz: number, leastMps2: number): PeakCandidates {
  const { rateHz, vertical, missing } = signal;
  const cutoffHz = Math.min(lowpassHz, 0.45 * rateHz);
  const level = vertical.length > 0 ? zeroPhase(butterworthLowPass(2, cutoffHz, rateHz), vertical) : vertical;
  const at: number[] = [];
  const prominence: number[] = [];
  const reach = Math.round(BASE_REACH_S * rateHz);
  for (const i of localMaxima(level)) {
    if (missing[i]) continue;
    const height = level[i]! - Math.max(base(level, i, -1, reach), base(level, i, 1, reach));
    if (!(height >= leastMps2)) continue;
    at.push(parabolicTop(level, i));
    prominence.push(height);
  }
  return {
    count: at.length,
    at: Float64Array.from(at),
    prominence: Float64Array.from(prominence),
    level,
    rateHz,
  };
}

/** The lowest value on one side of a peak before a higher one. */
function base(level: Float64Array, peak: number, direction: 1 | -1, reach: number): number {
  const top = level[peak]!;
  let low = top;
  for (let k = 1; k <= reach; k++) {
    const value = level[peak + direction * k];
    if (value === undefined || value > top) break;
    if (value < low) low = value;
  }
  return low;
}
