import { z } from 'zod';
import type { PassContext, StartContext } from '../../../campaign/context.js';
import type { Checkpoints } from '../../../tables/schemas.js';
import { LeftOut } from '../../left-out.js';
import { defineMethod } from '../../stage.js';
import { directionsOfTravel } from '../direction-of-travel.js';
import type { CheckpointsInputs } from '../index.js';
import { pathAt } from '../path-at.js';

const settingsSchema = z.strictObject({
  /**
   * Longest time that one step takes. Where two events lie further apart the walker stood, and moves only
   * in the last of it. Common practice, no source: slow walkers with a gait aid take about one second.
   */
  longest_step_s: z.number().positive().max(10).default(1.5),
});

/**
 * The estimate at the time of each pass, against the surveyed checkpoint; nothing is aligned or fitted.
 *
 * The direction that splits an error into along and across is the true one, from the checkpoint before
 * (for the first pass: from the start) straight to this one.
 */
export const atPassTimes = defineMethod<CheckpointsInputs, Checkpoints, typeof settingsSchema>({
  name: 'at-pass-times',
  source: 'ISO/IEC 18305:2016, clause 8: horizontal error at evaluation points',
  version: 1,
  settings: settingsSchema,
  uses: ['passes', 'start'],
  run({ path }, settings, { passes, start }) {
    if (passes.length === 0)
      throw new LeftOut('the campaign has no pass of a surveyed checkpoint for this walk');
    const n = passes.length;
    const out = emptyCheckpoints(passes);
    const direction = directionsOfTravel(passes, start);
    let travelled = 0;
    let before: PassContext | StartContext | null = start;
    for (let i = 0; i < n; i++) {
      const pass = passes[i]!;
      const at = pathAt(path, pass.t_s, settings.longest_step_s);
      const east = at.east_m - pass.east_m;
      const north = at.north_m - pass.north_m;
      const sin = Math.sin(direction[i]!);
      const cos = Math.cos(direction[i]!);
      if (before) travelled += Math.hypot(pass.east_m - before.east_m, pass.north_m - before.north_m);
      before = pass;
      out.est_east_m[i] = at.east_m;
      out.est_north_m[i] = at.north_m;
      out.error_m[i] = Math.hypot(east, north);
      out.along_m[i] = east * sin + north * cos;
      out.across_m[i] = east * cos - north * sin;
      out.travelled_m[i] = travelled;
      out.cov_ee_m2[i] = at.cov_ee_m2;
      out.cov_en_m2[i] = at.cov_en_m2;
      out.cov_nn_m2[i] = at.cov_nn_m2;
    }
    return out;
  },
});

/** One row a pass, in time order, with what the survey knows filled in. */
function emptyCheckpoints(passes: readonly PassContext[]): Checkpoints {
  const n = passes.length;
  return {
    checkpoint: passes.map((pass) => pass.checkpoint),
    t_s: Float64Array.from(passes, (pass) => pass.t_s),
    role: passes.map((pass) => pass.role),
    true_east_m: Float64Array.from(passes, (pass) => pass.east_m),
    true_north_m: Float64Array.from(passes, (pass) => pass.north_m),
    est_east_m: new Float64Array(n),
    est_north_m: new Float64Array(n),
    error_m: new Float64Array(n),
    along_m: new Float64Array(n),
    across_m: new Float64Array(n),
    travelled_m: new Float64Array(n),
    cov_ee_m2: new Float64Array(n),
    cov_en_m2: new Float64Array(n),
    cov_nn_m2: new Float64Array(n),
  };
}
