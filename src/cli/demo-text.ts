import { join } from 'node:path';
import type { Results } from '../pipeline/read-results.js';
import type { SimulationSummary } from '../simulate/simulate-campaign.js';
import { type JsonCell, rowsOf } from '../tables/rows.js';
import { scoreText } from './score-text.js';
import { fixed } from './text-table.js';

type Row = Record<string, JsonCell>;

/** The demo's result explained in about a dozen lines, with the files to look at next. */
export function demoText(dir: string, simulated: SimulationSummary, results: Results): string {
  const groups = rowsOf(results.groupScores);
  const walks = rowsOf(results.walkScores).filter((row) => Number(row.scored) > 0);
  const of = (by: string) => groups.filter((row) => row.by === by && row.mean_m !== null);
  const byMean = [...walks].sort((a, b) => Number(b.mean_m) - Number(a.mean_m));
  const worst = byMean[0];
  const best = byMean.at(-1);
  const at = (name: string, ...parts: string[]) => join(name, ...parts);
  const metres = (row: Row) => `${fixed(Number(row.mean_m), 2)} m`;
  const lines = [
    `An invented trial: ${simulated.walkers} walkers in two groups, ${simulated.walks} walks, ` +
      `${(simulated.distanceM / 1000).toFixed(2)} km past ${simulated.checkpoints} checkpoints. Nobody walked it; the readings are simulated.`,
    '',
    scoreText(results, 'groups').trimEnd(),
    '',
    `How to read it: each walk's path began at its first checkpoint and never saw the others. ${sentences(of('group'), metres)}`,
    'With three walkers a group the intervals are wide: such a pilot shows what can go wrong, not which group fares worse.',
  ];
  if (worst && best && worst !== best)
    lines.push(
      `Walk ${best.walk} (${best.carry}) is the best with ${metres(best)}, ${worst.walk} (${worst.carry}, ${worst.group}) the worst with ${metres(worst)}.`,
    );
  lines.push(
    '',
    'Look next at',
    `  ${at(results.dir, 'walk-scores.arrow')}   every walk: treadline score ${results.dir}`,
    `  ${at(results.dir, String(worst?.walk ?? 'w01'), 'checkpoints.arrow')}   where the worst walk went wrong: treadline show that file`,
    `  ${at(results.dir, String(worst?.walk ?? 'w01'), 'steps.arrow')}   its steps; strides, headings and path stand beside`,
    `  ${at(results.dir, 'recipe.yaml')}   every method and setting: copy it to ${at(dir, 'recipes')}, change it, run again`,
    `  ${at(dir, 'path-truth')}, attitude-truth, step-truth.csv   what really happened, which a real trial seldom knows`,
  );
  return `${lines.join('\n')}\n`;
}

function sentences(groups: readonly Row[], metres: (row: Row) => string): string {
  const parts = groups.map((row) => `${row.value} ${metres(row)}`);
  return `Half of the walks had a mean error below: ${parts.join(', ')}.`;
}
