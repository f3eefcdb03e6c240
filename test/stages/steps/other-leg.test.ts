import { expect, test } from 'vitest';
import { stepsStage } from '../../../src/stages/steps/index.js';
import type { Motion } from '../../../src/tables/schemas.js';
import { walkContext } from '../walk-context.js';
import { drawnWalk } from './drawn-walk.js';

const method = stepsStage.methods['peak-chain']!;
const find = (motion: Motion) => method.run({ motion }, method.settings.parse({}), walkContext());

/** Slow crests of one a second, with the phone swung about its x axis at `swingHz` and the given amplitude. */
function swung(swingHz: number, amplitudeRadps: number): { motion: Motion; crests: number[] } {
  const { motion, crests } = drawnWalk([{ seconds: 3 }, { seconds: 40, periodS: 1 }, { seconds: 3 }]);
  const rate = (t: number) => (t > 3 && t < 43 ? amplitudeRadps * Math.sin(2 * Math.PI * swingHz * t) : 0);
  return {
    crests,
    motion: {
      ...motion,
      gx_radps: motion.t_s.map(rate),
      gy_radps: new Float64Array(motion.t_s.length),
      gz_radps: new Float64Array(motion.t_s.length),
    },
  };
}

test('a thigh that swings once from crest to crest: the other leg’s steps stand half way between', () => {
  const { motion, crests } = swung(1, 1.5);
  const { t_s } = find(motion);
  expect(t_s).toHaveLength(2 * crests.length - 1);
  for (let k = 1; k < t_s.length; k++) expect(Math.abs(t_s[k]! - t_s[k - 1]! - 0.5)).toBeLessThan(0.05);
});

test.each([
  ['one stride is two crests, as of a slow walker', 0.5, 1.5],
  ['the phone is held and hardly turns', 1, 0.2],
])('%s: nothing is added', (_what, swingHz, amplitude) => {
  const { motion, crests } = swung(swingHz, amplitude);
  expect(find(motion).t_s).toHaveLength(crests.length);
});

test('without a gyroscope nothing is added', () => {
  const { motion, crests } = drawnWalk([{ seconds: 3 }, { seconds: 40, periodS: 1 }, { seconds: 3 }]);
  expect(find(motion).t_s).toHaveLength(crests.length);
});
