import { join } from 'node:path';
import { describe, expect, test } from 'vitest';
import { readAttitudeTruth } from '../../src/campaign/attitude-truth.js';
import { runCampaign } from '../../src/pipeline.js';
import { mean, rootMeanSquare } from '../../src/stats/summary.js';
import { readColumns } from '../../src/tables/read.js';
import { attitudeTable } from '../../src/tables/schemas.js';
import { temporaryFolder } from '../temporary-folder.js';
import { openCampaign } from './open-campaign.js';

// Source: ten trials of BROAD (Laidig, Caruso, Cereatti & Seel, Data 6(7):72, 2021), optical motion capture.
const optical = openCampaign('optical-attitude');

/** Angle of the rotation between two unit quaternions, degrees. */
function angleDeg(a: readonly number[], b: readonly number[]): number {
  const dot = Math.abs(a.reduce((sum, x, i) => sum + x * b[i]!, 0));
  return (2 * Math.acos(Math.min(1, dot)) * 180) / Math.PI;
}

describe.skipIf(!optical)('attitude against optical motion capture, one recipe for all', () => {
  test('mean over recordings of the total error (root mean square over moving rows)', async () => {
    const out = temporaryFolder();
    const { campaign, outcomes } = await runCampaign(optical!, { out, upto: 'attitude', jobs: 1 });
    const errors: number[] = [];
    for (const { walk } of outcomes) {
      const attitude = readColumns(join(out, walk, 'attitude.arrow'), attitudeTable);
      const truth = await readAttitudeTruth(campaign.attitudeTruth.get(walk)!);
      const stepS = (attitude.t_s.at(-1)! - attitude.t_s[0]!) / (attitude.t_s.length - 1);
      const own: number[] = [];
      for (let i = 0; i < truth.t_s.length; i++) {
        const k = Math.round((truth.t_s[i]! - attitude.t_s[0]!) / stepS);
        if (truth.moving?.[i] === 0 || k < 0 || k >= attitude.t_s.length) continue;
        own.push(
          angleDeg(
            [attitude.qw[k]!, attitude.qx[k]!, attitude.qy[k]!, attitude.qz[k]!],
            [truth.qw[i]!, truth.qx[i]!, truth.qy[i]!, truth.qz[i]!],
          ),
        );
      }
      errors.push(rootMeanSquare(Float64Array.from(own)));
    }
    expect(errors).toHaveLength(10);
    // Asked: 2.0 degrees; 1.65 when this was written. Published on the same ten: 1.91 causal, 1.56 acausal.
    expect(mean(Float64Array.from(errors))).toBeLessThan(1.8);
  });
});
