import { describe, expect, test } from 'vitest';
import { cadenceOf } from '../../../src/stages/strides/cadence.js';
import { normStepLength } from '../../../src/stages/strides/gait-norm.js';
import { stridesStage } from '../../../src/stages/strides/index.js';
import type { Motion, Steps } from '../../../src/tables/schemas.js';
import { walkContext } from '../walk-context.js';

const method = stridesStage.methods.weinberg!;

function stepsEvery(period: number, count: number, strength: number): Steps {
  const t_s = Float64Array.from({ length: count }, (_, i) => 1 + i * period);
  return {
    step: Int32Array.from({ length: count }, (_, i) => i + 1),
    t_s,
    start_s: t_s.map((t) => t - period / 2),
    end_s: t_s.map((t) => t + period / 2),
    strength_mps2: new Float64Array(count).fill(strength),
    confidence: new Float64Array(count).fill(1),
    bout: new Int32Array(count).fill(1),
  };
}
const NO_MOTION = { t_s: new Float64Array(0) } as unknown as Motion;
const run = (steps: Steps, settings: object = {}, context = walkContext()) =>
  method.run({ steps, motion: NO_MOTION }, method.settings.parse(settings), context);

describe('weinberg', () => {
  test('the worked example: K 0.45 and 6.8 m/s2 give 0.726 m', () => {
    // Source: arithmetic of the published formula (Weinberg 2002): 0.45 * 6.8^(1/4) = 0.72667.
    expect(run(stepsEvery(0.55, 5, 6.8), { k: 0.45 }).length_m[2]).toBeCloseTo(0.72667, 5);
  });

  test("a calibrated walker's constant is used, with its standard error", () => {
    const context = walkContext();
    const calibrated = walkContext({
      walker: { ...context.walker, step_constants: { weinberg: { value: 0.5, sd: 0.01, from: 'walker' } } },
    });
    const strides = run(stepsEvery(0.5, 5, 16), {}, calibrated);
    expect(strides.length_m[0]).toBeCloseTo(1, 12);
    // 2 percent of the constant and 6 percent of a step.
    expect(strides.sd_m[0]).toBeCloseTo(Math.hypot(0.02, 0.06), 12);
  });

  test('without calibration the length lies between what the literature and the norm say', () => {
    const strides = run(stepsEvery(0.5, 20, 5));
    const byLiterature = 0.43 * 5 ** 0.25;
    const byNorm = normStepLength(2, null);
    const length = strides.length_m[10]!;
    expect(length).toBeGreaterThan(Math.min(byLiterature, byNorm));
    expect(length).toBeLessThan(Math.max(byLiterature, byNorm));
    // Wider than any calibrated walker's: both sources together leave 7.2 percent, and a step's own 6.
    expect(strides.sd_m[10]! / length).toBeCloseTo(
      Math.hypot(1 / Math.sqrt(0.17 ** -2 + 0.08 ** -2), 0.06),
      12,
    );
  });

  test('no steps, no strides; a step without strength has no length', () => {
    expect(run(stepsEvery(0.5, 0, 0)).length_m).toHaveLength(0);
    expect(run(stepsEvery(0.5, 3, 0)).length_m[1]).toBe(0);
  });
});

describe('cadence', () => {
  test('is one over the median interval nearby, within the bout', () => {
    const steps = stepsEvery(0.5, 10, 5);
    steps.bout.fill(2, 5);
    for (let i = 5; i < 10; i++) steps.t_s[i]! += 30;
    for (const c of cadenceOf(steps)) expect(c).toBeCloseTo(2, 12);
  });

  test('a bout of one step takes the length of the step', () => {
    expect(cadenceOf(stepsEvery(0.8, 1, 5))[0]).toBeCloseTo(1.25, 12);
  });
});

describe('gait norm', () => {
  test('at comfortable cadence: speed over cadence; proportional to height', () => {
    // Source: Bohannon & Andrews 2011 and Öberg 1993 as cited in the source: 1.36 / 2.03 = 0.670 m.
    expect(normStepLength(2.03, null)).toBeCloseTo(0.67, 3);
    expect(normStepLength(2.03, 1.87) / normStepLength(2.03, 1.7)).toBeCloseTo(1.1, 12);
  });

  test('a pace near the comfortable one says little, a slow one makes steps short in proportion', () => {
    expect(Math.abs(normStepLength(1.95, null) / normStepLength(2.03, null) - 1)).toBeLessThan(0.01);
    // At one step a second nobody walks at an able adult's own pace: the walk ratio holds, 1 / 2.03 of the length.
    expect(normStepLength(1, null) / normStepLength(2.03, null)).toBeCloseTo(1 / 2.03, 3);
    expect(normStepLength(1.5, null)).toBeLessThan(normStepLength(1.8, null));
  });
});
