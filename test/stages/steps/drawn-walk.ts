import { randomStream } from '../../../src/stats/random.js';
import type { Motion } from '../../../src/tables/schemas.js';

/** A stretch of a drawn vertical acceleration: steps of one period and strength, or nothing but noise. */
export interface Stretch {
  seconds: number;
  /** Time of a step, s; without it nobody walks. */
  periodS?: number;
  /** Amplitude, m/s2. */
  strength?: number;
  /** Every second step is weaker by this factor, as in a trouser pocket. */
  otherLeg?: number;
}

export interface DrawnWalk {
  motion: Motion;
  /** Instants of the acceleration's crests that were drawn, s. */
  crests: number[];
}

/** Draws a phone that lies flat: gravity, white noise of 0.05 m/s2, and a raised-cosine crest for each step. */
export function drawnWalk(stretches: readonly Stretch[], rateHz = 100, seed = 1): DrawnWalk {
  const random = randomStream(seed, 'drawn walk');
  const total = stretches.reduce((sum, { seconds }) => sum + seconds, 0);
  const n = Math.round(total * rateHz);
  const az = Float64Array.from({ length: n }, () => 9.81 + 0.05 * random.normal());
  const crests: number[] = [];
  let from = 0;
  for (const { seconds, periodS, strength = 2, otherLeg = 1 } of stretches) {
    for (let k = 0; periodS !== undefined && (k + 1) * periodS <= seconds; k++) {
      const crest = from + (k + 0.5) * periodS;
      crests.push(crest);
      const height = strength * (k % 2 ? otherLeg : 1);
      const first = Math.max(0, Math.ceil((crest - periodS / 2) * rateHz));
      for (let i = first; i < n && i / rateHz <= crest + periodS / 2; i++)
        az[i]! += height * (1 + Math.cos((2 * Math.PI * (i / rateHz - crest)) / periodS));
    }
    from += seconds;
  }
  const zero = () => Float64Array.from({ length: n }, () => 0.05 * random.normal());
  return {
    motion: {
      t_s: Float64Array.from({ length: n }, (_, i) => i / rateHz),
      ax_mps2: zero(),
      ay_mps2: zero(),
      az_mps2: az,
      gap: new Uint8Array(n),
    },
    crests,
  };
}
