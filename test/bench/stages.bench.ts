import { createReadStream, rmSync } from 'node:fs';
import { join } from 'node:path';
import { afterAll, bench, describe } from 'vitest';
import { readLog } from '../../src/campaign/read-log.js';
import { defaultRecipe } from '../../src/campaign/recipe.js';
import { walkContext } from '../../src/campaign/walk-context.js';
import { layoutOf, readingsInMemory } from '../../src/pipeline/import-readings.js';
import type { OnHand } from '../../src/pipeline/on-hand.js';
import { computeStage, stageTask } from '../../src/pipeline/run-stage.js';
import { STAGES } from '../../src/pipeline/stages.js';
import { hourCampaign } from './hour.js';

const { folder, campaign, readings, durationS } = await hourCampaign();
afterAll(() => rmSync(folder, { recursive: true, force: true }));

const walk = campaign.walks[0]!;
const layout = layoutOf(campaign, walk);
const recipe = defaultRecipe(STAGES);
const log = await readLog(campaign.dir, walk, layout);
const { tables, span } = readingsInMemory(log);
const context = walkContext(campaign, walk, span);
const onHand = new Map<string, OnHand>(tables);
const tasks = STAGES.map((stage) => {
  const task = stageTask(stage, recipe.stages[stage.name]!, onHand, new Map(), context, '');
  const columns = computeStage(task);
  onHand.set(stage.name, { sha256: '', columns: () => columns });
  return { name: stage.name, task };
});

const OPTIONS = { time: 0, iterations: 5, warmupTime: 0, warmupIterations: 1 };

/** Times a piece of work and prints the readings of the log that it gets through in a second. */
function timed(name: string, work: () => unknown): void {
  const seconds: number[] = [];
  bench(
    name,
    async () => {
      const startedMs = performance.now();
      await work();
      seconds.push((performance.now() - startedMs) / 1000);
    },
    {
      ...OPTIONS,
      teardown: (_task, mode) => {
        if (mode !== 'run') return;
        const median = seconds.sort((a, b) => a - b)[seconds.length >> 1]!;
        console.log(
          `${name.padEnd(16)} ${(readings / median / 1e6).toFixed(2).padStart(8)} million readings/s`,
        );
      },
    },
  );
}

describe(`one walk of ${Math.round(durationS / 60)} min at 100 Hz, ${readings} readings`, () => {
  // What everything is compared with: the bytes of the log read and looked at no further.
  timed('plain file read', async () => {
    for await (const _ of createReadStream(join(campaign.dir, walk.log)));
  });
  timed('log to readings', () => readLog(campaign.dir, walk, layout));
  for (const { name, task } of tasks) timed(name, () => computeStage(task));
});
