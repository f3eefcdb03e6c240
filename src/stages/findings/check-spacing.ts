import type { PassContext } from '../../campaign/context.js';
import { butterworthLowPass } from '../../signal/butterworth.js';
import { zeroPhase } from '../../signal/zero-phase.js';
import { quantile } from '../../stats/quantile.js';
import type { ReadingsAccel } from '../../tables/schemas.js';
import { binned } from './binned.js';
import type { Finding } from './finding.js';
import { vectorSize } from './vector-size.js';

export interface SpacingLimits {
  /** Shortest and longest distance between checkpoints per step, m. */
  shortestM: number;
  longestM: number;
}

const BIN_S = 0.04;
/** Fewer steps between two passes say too little: a tap may be a step early or late. */
const LEAST_STEPS = 8;
/** Rise of the acceleration's size that counts as a step: a quarter of the walk's usual one, and more than noise, m/s2. */
const RISE_SHARE = 0.25;
const LEAST_RISE_MPS2 = 0.1;
/** A weak gait may hide steps: only where the walker would also be quicker than this is the distance doubted, m/s. */
const QUICK_MPS = 1.7;

/**
 * Whether the distances between surveyed checkpoints fit the steps between their passes: a swapped checkpoint, a
 * survey in feet or a wrong clock shows here. Steps are counted plainly, by crossings of the mean.
 */
export function checkSpacing(
  accel: ReadingsAccel,
  passes: readonly PassContext[],
  limits: SpacingLimits,
): Finding[] {
  const end_s = accel.t_s.at(-1) ?? 0;
  const bins = Math.floor(end_s / BIN_S);
  if (passes.length < 2 || bins < 50) return [];
  const size = vectorSize(accel.x_mps2, accel.y_mps2, accel.z_mps2);
  const [mean] = binned(accel.t_s, [size], BIN_S, bins);
  let last = 9.8;
  const level = zeroPhase(
    butterworthLowPass(2, 3, 1 / BIN_S),
    mean!.map((value) => (Number.isNaN(value) ? last : (last = value))),
  );
  const slow = zeroPhase(butterworthLowPass(2, 0.3, 1 / BIN_S), level);
  const usual = quantile(
    level.map((value, b) => Math.abs(value - slow[b]!)),
    0.9,
  );
  const rise = Math.max(LEAST_RISE_MPS2, RISE_SHARE * usual);
  const stepS: number[] = [];
  let armed = false;
  for (let b = 0; b < bins; b++) {
    const away = level[b]! - slow[b]!;
    if (away < -rise / 2) armed = true;
    else if (armed && away > rise / 2) {
      stepS.push(b * BIN_S);
      armed = false;
    }
  }
  const out: Finding[] = [];
  for (let i = 1; i < passes.length; i++) {
    const [a, b] = [passes[i - 1]!, passes[i]!];
    const steps = stepS.filter((t) => t > a.t_s && t <= b.t_s).length;
    const distance = Math.hypot(b.east_m - a.east_m, b.north_m - a.north_m);
    // Walkers go round corners: a distance that is short for its steps is told only where it is absurd.
    const perStep = distance / Math.max(steps, 1);
    const quick = distance > QUICK_MPS * (b.t_s - a.t_s);
    const tooFar = quick && distance > LEAST_STEPS * limits.longestM && perStep > limits.longestM;
    const tooNear = steps >= 4 * LEAST_STEPS && perStep < limits.shortestM && a.checkpoint !== b.checkpoint;
    if (tooFar || tooNear)
      out.push({
        severity: 'warn',
        kind: 'checkpoint-spacing',
        sensor: 'walk',
        from_s: a.t_s,
        to_s: b.t_s,
        value: perStep,
        message: `from ${a.checkpoint} to ${b.checkpoint} it is ${distance.toFixed(1)} m in about ${steps} steps, ${perStep.toFixed(2)} m each; a checkpoint may be mistaken, the survey in another unit, or the passes' clock off; look at passes.csv and survey.csv`,
      });
  }
  return out;
}
