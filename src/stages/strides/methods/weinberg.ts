import { z } from 'zod';
import type { Strides } from '../../../tables/schemas.js';
import { defineMethod } from '../../stage.js';
import { cadenceOf } from '../cadence.js';
import { normStepLength } from '../gait-norm.js';
import type { StridesInputs } from '../index.js';

const settingsSchema = z.strictObject({
  /** Constant for all walkers; `walker`: the calibrated one, else one estimated as the docstring says. */
  k: z.union([z.literal('walker'), z.number().positive()]).default('walker'),
  /** The constant in the literature, 0.41 to 0.50, and its relative spread between people. */
  literature_k: z.number().positive().default(0.43),
  literature_sd: z.number().positive().default(0.12),
  /** Relative spread of people's step lengths around the gait norm at their cadence. */
  norm_sd: z.number().positive().default(0.1),
  /** Relative error of a single step. */
  step_sd: z.number().positive().default(0.06),
});

/**
 * Step length from the fourth root of the vertical acceleration's range over the step.
 *
 * L = k (a_max - a_min)^(1/4), m and m/s2. Where the walker is not calibrated, k is the mean of two independent
 * sources weighted by their precision: the literature's constant, and the constant with which this walk's steps
 * have the length that gait norms let expect at its cadence (and the walker's height, where known).
 */
export const weinberg = defineMethod<StridesInputs, Strides, typeof settingsSchema>({
  name: 'weinberg',
  source:
    'Weinberg (2002), Using the ADXL202 in pedometer and personal navigation applications, Analog Devices AN-602',
  version: 1,
  settings: settingsSchema,
  uses: ['walker'],
  run({ steps }, settings, context) {
    const n = steps.t_s.length;
    const cadence_hz = cadenceOf(steps);
    const root = new Float64Array(n);
    for (let i = 0; i < n; i++) root[i] = Math.max(0, steps.strength_mps2[i]!) ** 0.25;
    const constant = constantFor(settings, context.walker, root, cadence_hz);
    const length_m = new Float64Array(n);
    const sd_m = new Float64Array(n);
    const relative = Math.hypot(constant.relativeSd, settings.step_sd);
    for (let i = 0; i < n; i++) {
      length_m[i] = constant.k * root[i]!;
      sd_m[i] = relative * length_m[i]!;
    }
    return { step: steps.step.slice(), length_m, sd_m, cadence_hz };
  },
});

interface Constant {
  k: number;
  relativeSd: number;
}

function constantFor(
  settings: z.output<typeof settingsSchema>,
  walker: {
    height_m: number | null;
    step_constants: Readonly<Record<string, { value: number; sd: number }>>;
  },
  root: Float64Array,
  cadence: Float64Array,
): Constant {
  if (settings.k !== 'walker') return { k: settings.k, relativeSd: settings.literature_sd };
  const calibrated = walker.step_constants.weinberg;
  if (calibrated) return { k: calibrated.value, relativeSd: calibrated.sd / calibrated.value };
  let sum = 0;
  let expected = 0;
  for (let i = 0; i < root.length; i++) {
    sum += root[i]!;
    expected += normStepLength(cadence[i]!, walker.height_m);
  }
  if (!(sum > 0)) return { k: settings.literature_k, relativeSd: settings.literature_sd };
  const byLiterature = 1 / settings.literature_sd ** 2;
  const byNorm = 1 / settings.norm_sd ** 2;
  const logarithm =
    (byLiterature * Math.log(settings.literature_k) + byNorm * Math.log(expected / sum)) /
    (byLiterature + byNorm);
  return { k: Math.exp(logarithm), relativeSd: 1 / Math.sqrt(byLiterature + byNorm) };
}
