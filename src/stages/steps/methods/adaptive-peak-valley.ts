import { z } from 'zod';
import { butterworthLowPass } from '../../../signal/butterworth.js';
import { localMaxima, parabolicTop } from '../../../signal/local-maxima.js';
import { zeroPhase } from '../../../signal/zero-phase.js';
import type { Steps } from '../../../tables/schemas.js';
import { defineMethod } from '../../stage.js';
import { gaitSignal } from '../gait-signal.js';
import type { StepsInputs } from '../index.js';
import { stepColumns } from '../step-columns.js';

const settingsSchema = z.strictObject({
  /** Low-pass before anything else: the step rate and its neighbourhood. */
  lowpass_hz: z.number().min(1).max(10).default(3),
  /** A peak stands out of the running level by the running deviation over this. */
  magnitude_alpha: z.number().positive().default(4),
  /** Two peaks lie apart by the mean interval less its deviation over this. */
  interval_beta: z
    .number()
    .positive()
    .default(1 / 3),
  /** How many of the latest peaks and valleys the thresholds remember. */
  memory: z.int().min(2).max(200).default(10),
  /** No step takes less: runners reach 3.3 steps a second. */
  shortest_s: z.number().positive().default(0.25),
  /** Least peak to valley: above what a held phone shows when its owner stands. */
  least_swing_mps2: z.number().min(0).default(0.6),
});

/**
 * Peaks and valleys in turn, each accepted against thresholds that follow the latest ones in height and time.
 *
 * A sample is a peak where it lies above level + deviation / alpha and, a valley where it lies below level -
 * deviation / alpha; of several peaks before the next valley the highest stays.
 */
export const adaptivePeakValley = defineMethod<StepsInputs, Steps, typeof settingsSchema>({
  name: 'adaptive-peak-valley',
  source: 'Lee, Choi & Lee (2015), Sensors 15(10), 27230-27259: step detection by adaptive thresholds',
  version: 1,
  settings: settingsSchema,
  uses: [],
  run({ motion, attitude }, settings) {
    const signal = gaitSignal(motion, attitude);
    const level = zeroPhase(
      butterworthLowPass(2, Math.min(settings.lowpass_hz, 0.45 * signal.rateHz), signal.rateHz),
      signal.vertical,
    );
    const negative = level.map((v) => -v);
    const isPeak = new Int8Array(level.length);
    for (const i of localMaxima(level)) isPeak[i] = 1;
    for (const i of localMaxima(negative)) isPeak[i] = -1;
    const times: number[] = [];
    let peak = -1;
    let valley = -1;
    let meanSwing = 0;
    let meanS = 0.6;
    let deviationS = 0.1;
    const weight = 1 / settings.memory;
    for (let i = 0; i < level.length; i++) {
      if (signal.missing[i]) {
        peak = valley = -1;
        continue;
      }
      if (isPeak[i] === 1) {
        if (peak < 0 || level[i]! > level[peak]!) peak = i;
      } else if (isPeak[i] === -1 && peak >= 0) {
        const swing = level[peak]! - Math.min(level[i]!, valley >= 0 ? level[valley]! : level[i]!);
        const needed = Math.max(settings.least_swing_mps2, meanSwing / settings.magnitude_alpha);
        const at = signal.startS + parabolicTop(level, peak) / signal.rateHz;
        const since = at - (times[times.length - 1] ?? Number.NEGATIVE_INFINITY);
        if (level[peak]! - level[i]! < 0.5 * needed) continue;
        valley = i;
        const soonest = Math.max(
          settings.shortest_s,
          Math.min(0.75 * meanS, meanS - deviationS / settings.interval_beta),
        );
        if (swing >= needed && since >= soonest) {
          times.push(at);
          meanSwing += weight * (swing - meanSwing);
          if (since < 2) {
            deviationS += weight * (Math.abs(since - meanS) - deviationS);
            meanS += weight * (since - meanS);
          }
        }
        peak = -1;
      }
    }
    const timeS = Float64Array.from(times);
    return stepColumns(signal, { timeS, confidence: new Float64Array(timeS.length).fill(0.9) });
  },
});
