import { z } from 'zod';
import { median } from '../../../stats/quantile.js';
import type { Strides } from '../../../tables/schemas.js';
import { defineMethod } from '../../stage.js';
import { cadenceOf } from '../cadence.js';
import { normStepLength } from '../gait-norm.js';
import type { StridesInputs } from '../index.js';

const settingsSchema = z.strictObject({
  /** Constant for all walkers; `walker`: the calibrated one, else one estimated as the docstring says. */
  k: z.union([z.literal('walker'), z.number().positive()]).default('walker'),
  /**
   * The constant in the literature, 0.41 to 0.50, and its relative spread: a tenth between authors, and
   * as much or more because the same walker's acceleration differs by half between hand, pocket and trunk.
   */
  literature_k: z.number().positive().default(0.43),
  literature_sd: z.number().positive().default(0.17),
  /** Relative spread of people's step lengths around the gait norm: 3.5 to 6 cm in 62 to 66 cm (Öberg et al. 1993). */
  norm_sd: z.number().positive().default(0.08),
  /** Relative error of a single step. */
  step_sd: z.number().positive().default(0.06),
});

/**
 * Step length from the fourth root of the vertical acceleration's range over the step.
 *
 * L = k (a_max - a_min)^(1/4), m and m/s2. Where the walker is not calibrated, k is the mean of two independent
 * sources weighted by their precision: the literature's constant, and the constant with which this walk's steps
 * have the length that gait norms let expect (by the walker's height, where known, and where the cadence is unusual by that).
 */
export const weinberg = defineMethod<StridesInputs, Strides, typeof settingsSchema>({
  name: 'weinberg',
  source:
    'Weinberg (2002), Using the ADXL202 in pedometer and personal navigation applications, Analog Devices AN-602',
  version: 2,
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
  for (let i = 0; i < root.length; i++) sum += root[i]!;
  if (!(sum > 0)) return { k: settings.literature_k, relativeSd: settings.literature_sd };
  const expected = root.length * normStepLength(median(cadence), walker.height_m);
  const byLiterature = 1 / settings.literature_sd ** 2;
  const byNorm = 1 / settings.norm_sd ** 2;
  const logarithm =
    (byLiterature * Math.log(settings.literature_k) + byNorm * Math.log(expected / sum)) /
    (byLiterature + byNorm);
  return { k: Math.exp(logarithm), relativeSd: 1 / Math.sqrt(byLiterature + byNorm) };
}
