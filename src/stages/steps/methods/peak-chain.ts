import { z } from 'zod';
import { median } from '../../../stats/quantile.js';
import type { Steps } from '../../../tables/schemas.js';
import { defineMethod } from '../../stage.js';
import { bestChain } from '../best-chain.js';
import { withBoutEdges } from '../bout-edges.js';
import { gaitSignal } from '../gait-signal.js';
import type { StepsInputs } from '../index.js';
import { otherLegSteps } from '../other-leg.js';
import { peakCandidates } from '../peak-candidates.js';
import { LONGEST_STEP_S, stepColumns } from '../step-columns.js';
import { stepLinks } from '../step-links.js';
import { stepProbability } from '../step-probability.js';
import { typicalProminence } from '../typical-prominence.js';

const settingsSchema = z.strictObject({
  /** Low-pass before peaks are looked for: the step rate and little of its harmonics. */
  lowpass_hz: z.number().min(1).max(10).default(2.8),
  /** Smaller peaks are no steps: a phone in a still hand shows as much. */
  least_prominence_mps2: z.number().min(0).default(0.1),
  /** Two steps lie further apart: runners reach four a second. */
  shortest_s: z.number().positive().default(0.24),
  /** Natural log of the odds against walking beginning at any one peak. */
  start_cost: z.number().min(0).default(12),
  /** The same less than ten seconds after another bout: who walked just now walks on. */
  restart_cost: z.number().min(0).default(7),
  /** The least prominence of a first or last step. */
  edge_prominence_mps2: z.number().min(0).default(0.15),
  /**
   * Part of the step's time by which foot contact comes before the peak. The body is pushed up hardest in the middle of
   * double support, which takes a tenth to an eighth of the stride and begins with the contact.
   */
  contact_lead_pct: z.number().min(-50).max(50).default(10),
  /** What a piece of evidence counts towards the confidence: neighbouring pieces are not independent. */
  evidence_share: z.number().positive().max(1).default(0.4),
});

/**
 * Steps as the most probable chains of acceleration peaks.
 *
 * Each peak of the low-passed vertical acceleration may be a step. How prominent it is, the time to the step before, the
 * beat with the one before that and the likeness to the last step of the same foot each count for or against; a chain of
 * peaks whose evidence outweighs that of no walking at all is a bout. The whole log is weighed at once, so a bout's first
 * steps are known by those that follow, and irregular motion (handling, turning on the spot, taps) makes no bout.
 * Where the gyroscope shows that only one leg was heard, the other's steps are put half way between.
 */
export const peakChain = defineMethod<StepsInputs, Steps, typeof settingsSchema>({
  name: 'peak-chain',
  source:
    'our own; chains by dynamic programming: Viterbi (1967), IEEE Trans. Information Theory 13(2), 260-269; double ' +
    'support: Perry & Burnfield (2010), Gait Analysis, ch. 1 (from memory)',
  version: 1,
  settings: settingsSchema,
  uses: [],
  run({ motion, attitude }, settings) {
    const signal = gaitSignal(motion, attitude);
    const candidates = peakCandidates(signal, settings.lowpass_hz, settings.least_prominence_mps2);
    const typical = typicalProminence(candidates);
    const links = stepLinks(candidates, typical, settings.shortest_s, LONGEST_STEP_S);
    const steps = withBoutEdges(
      candidates,
      bestChain(links, { startCost: settings.start_cost, restartCost: settings.restart_cost }),
      LONGEST_STEP_S,
      settings.edge_prominence_mps2,
    );
    const probability = stepProbability(links, settings.restart_cost, settings.evidence_share);
    const heardS = Float64Array.from(steps, (i) => signal.startS + candidates.at[i]! / signal.rateHz);
    const events = [...heardS].map((timeS, k) => ({ timeS, confidence: probability[steps[k]!]! }));
    for (const timeS of otherLegSteps(motion, heardS)) {
      const k = heardS.findLastIndex((t) => t < timeS);
      // No surer than the steps on either side.
      events.push({ timeS, confidence: Math.min(events[k]!.confidence, events[k + 1]!.confidence) });
    }
    events.sort((a, b) => a.timeS - b.timeS);
    return stepColumns(signal, {
      timeS: contacts(
        Float64Array.from(events, ({ timeS }) => timeS),
        settings.contact_lead_pct / 100,
      ),
      confidence: Float64Array.from(events, ({ confidence }) => confidence),
    });
  },
});

/** Instants of contact: each peak less a part of the time that steps take around it. */
function contacts(peakS: Float64Array, lead: number): Float64Array {
  const out = new Float64Array(peakS.length);
  for (let k = 0; k < peakS.length; k++) {
    const intervals: number[] = [];
    for (let i = Math.max(1, k - 2); i <= Math.min(peakS.length - 1, k + 3); i++) {
      const interval = peakS[i]! - peakS[i - 1]!;
      if (interval <= LONGEST_STEP_S) intervals.push(interval);
    }
    out[k] = peakS[k]! - lead * (intervals.length > 0 ? median(Float64Array.from(intervals)) : 0);
  }
  return out;
}
