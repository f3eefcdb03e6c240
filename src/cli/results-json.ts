import type { Results } from '../pipeline/read-results.js';
import { rowsOf } from '../tables/rows.js';
import { VERSION } from '../version.js';

/** Results as `--json` prints them. */
export function resultsJson(results: Results) {
  const { dir, record, walkScores, groupScores, stepScores } = results;
  return {
    treadline: VERSION,
    results: dir,
    campaign: record.campaign.name,
    recipe: record.recipe,
    walks: record.walks,
    group_scores: rowsOf(groupScores),
    walk_scores: rowsOf(walkScores),
    step_scores: stepScores ? rowsOf(stepScores) : null,
  };
}
