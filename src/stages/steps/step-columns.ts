import { butterworthLowPass } from '../../signal/butterworth.js';
import { zeroPhase } from '../../signal/zero-phase.js';
import type { Steps } from '../../tables/schemas.js';
import type { GaitSignal } from './gait-signal.js';

/** What a detector found, in time order. */
export interface StepEvents {
  /** Shape (n), seconds on the motion table's clock, strictly ascending. */
  timeS: Float64Array;
  /** Shape (n), 0 to 1. */
  confidence: Float64Array;
}

/** Longest time between two steps of one bout: a slow shuffling step lasts 2.5 s. */
export const LONGEST_STEP_S = 2.5;

/**
 * Low-pass of the acceleration that `strength_mps2` is told from. Up to 3 Hz there is the body's rise and fall
 * at step and stride rate; above it the shock of the heel, which says more about shoe and floor than about length.
 */
const STRENGTH_BAND_HZ = 3;
const STRENGTH_ORDER = 4;

/**
 * The steps table from the events: bouts, spans and strengths.
 *
 * A new bout begins where two events lie further apart than {@link LONGEST_STEP_S} or a gap lies between them.
 * A step spans from half way to the event before to half way to the event after; at the ends of a bout it
 * reaches half of the neighbouring interval out (0.25 s for a bout of one step).
 */
export function stepColumns(signal: GaitSignal, events: StepEvents): Steps {
  const { timeS, confidence } = events;
  const n = timeS.length;
  const start_s = new Float64Array(n);
  const end_s = new Float64Array(n);
  const bout = new Int32Array(n);
  const joined = (i: number) =>
    i > 0 &&
    i < n &&
    timeS[i]! - timeS[i - 1]! <= LONGEST_STEP_S &&
    !gapBetween(signal, timeS[i - 1]!, timeS[i]!);
  let number = 0;
  let withBefore = false;
  for (let i = 0; i < n; i++) {
    const withAfter = joined(i + 1);
    if (!withBefore) number++;
    bout[i] = number;
    const before = withBefore ? timeS[i]! - timeS[i - 1]! : Number.NaN;
    const after = withAfter ? timeS[i + 1]! - timeS[i]! : Number.NaN;
    start_s[i] = timeS[i]! - 0.5 * (withBefore ? before : withAfter ? after : 0.5);
    end_s[i] = timeS[i]! + 0.5 * (withAfter ? after : withBefore ? before : 0.5);
    withBefore = withAfter;
  }
  return {
    step: Int32Array.from({ length: n }, (_, i) => i + 1),
    t_s: timeS.slice(),
    start_s,
    end_s,
    strength_mps2: strengths(signal, start_s, end_s),
    confidence: confidence.slice(),
    bout,
  };
}

function gapBetween(signal: GaitSignal, fromS: number, toS: number): boolean {
  const from = Math.ceil((fromS - signal.startS) * signal.rateHz);
  const to = Math.floor((toS - signal.startS) * signal.rateHz);
  for (let i = Math.max(0, from); i <= to && i < signal.missing.length; i++)
    if (signal.missing[i]) return true;
  return false;
}

function strengths(signal: GaitSignal, start_s: Float64Array, end_s: Float64Array): Float64Array {
  const out = new Float64Array(start_s.length);
  if (out.length === 0) return out;
  const cutoff = Math.min(STRENGTH_BAND_HZ, 0.45 * signal.rateHz);
  const level = zeroPhase(butterworthLowPass(STRENGTH_ORDER, cutoff, signal.rateHz), signal.vertical);
  for (let i = 0; i < out.length; i++) {
    const from = Math.max(0, Math.round((start_s[i]! - signal.startS) * signal.rateHz));
    const to = Math.min(level.length - 1, Math.round((end_s[i]! - signal.startS) * signal.rateHz));
    let low = Number.POSITIVE_INFINITY;
    let high = Number.NEGATIVE_INFINITY;
    for (let k = from; k <= to; k++) {
      const value = level[k]!;
      if (value < low) low = value;
      if (value > high) high = value;
    }
    out[i] = high > low ? high - low : 0;
  }
  return out;
}
