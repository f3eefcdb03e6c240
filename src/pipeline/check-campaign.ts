import { createHash } from 'node:crypto';
import { readCampaign } from '../campaign/read-campaign.js';
import { readLog } from '../campaign/read-log.js';
import type { LogReadings } from '../campaign/readings.js';
import type { Campaign } from '../campaign/types.js';
import { walkContext } from '../campaign/walk-context.js';
import { chosenWalks, recipeOf } from '../pipeline.js';
import type { Finding } from '../stages/findings/finding.js';
import type { Findings } from '../tables/schemas.js';
import { layoutOf, readingsInMemory } from './import-readings.js';
import { problemOf, type WalkProblem } from './outcome.js';
import { computeStage, stageTask } from './run-stage.js';
import { STAGES } from './stages.js';

/** What the log check has to say of one walk. */
export interface CheckedWalk {
  walk: string;
  /** Length of the log, s; 0 where it could not be read. */
  duration_s: number;
  findings: Finding[];
  /** Why the log could not be read; null where it was. */
  problem: WalkProblem | null;
}

export interface CheckedCampaign {
  campaign: Campaign;
  walks: CheckedWalk[];
}

export interface CheckOptions {
  recipe?: string | undefined;
  walks?: readonly string[] | undefined;
  onWalk?: ((walk: string, done: number, total: number) => void) | undefined;
}

/**
 * Reads every log of a campaign and checks it; writes nothing.
 *
 * @throws InputError, InputErrors where the campaign, recipe or a walk's name cannot be used.
 */
export async function checkCampaign(dir: string, options: CheckOptions = {}): Promise<CheckedCampaign> {
  const campaign = readCampaign(dir);
  const recipe = recipeOf(campaign, options.recipe);
  const chosen = chosenWalks(campaign, options.walks ?? []);
  const stage = STAGES.find(({ name }) => name === 'findings')!;
  const walks: CheckedWalk[] = [];
  const firstWith = new Map<string, string>();
  for (const name of chosen) {
    const walk = campaign.walks.find((row) => row.walk === name)!;
    try {
      const log = await readLog(campaign.dir, walk, layoutOf(campaign, walk));
      const { tables, span } = readingsInMemory(log);
      const context = walkContext(campaign, walk, span);
      const task = stageTask(stage, recipe.stages.findings!, tables, new Map(), context, '');
      const findings = rowsOfFindings(computeStage(task) as unknown as Findings);
      findings.push(...duplicateOf(name, log, span.end_s, firstWith));
      walks.push({ walk: name, duration_s: span.end_s, findings, problem: null });
    } catch (error) {
      walks.push({ walk: name, duration_s: 0, findings: [], problem: problemOf(error, 'readings') });
    }
    options.onWalk?.(name, walks.length, chosen.length);
  }
  return { campaign, walks };
}

function rowsOfFindings(columns: Findings): Finding[] {
  return columns.kind.map((kind, i) => ({
    severity: columns.severity[i] as Finding['severity'],
    kind,
    sensor: columns.sensor[i]!,
    from_s: columns.from_s[i]!,
    to_s: columns.to_s[i]!,
    value: columns.value[i]!,
    message: columns.message[i]!,
  }));
}

/** The same readings under two names count one walk twice, whatever the files are called or how they are packed. */
function duplicateOf(
  walk: string,
  log: LogReadings,
  end_s: number,
  firstWith: Map<string, string>,
): Finding[] {
  const { accel, gyro } = log;
  const hash = createHash('sha256');
  for (const column of [accel?.x_mps2, accel?.y_mps2, accel?.z_mps2, gyro?.x_radps, gyro?.y_radps])
    if (column) hash.update(new Uint8Array(column.buffer, column.byteOffset, column.byteLength));
  const key = hash.digest('hex');
  const first = firstWith.get(key);
  if (first === undefined) {
    firstWith.set(key, walk);
    return [];
  }
  return [
    {
      severity: 'fail',
      kind: 'duplicate-log',
      sensor: 'walk',
      from_s: 0,
      to_s: end_s,
      value: 0,
      message: `the log has the very readings of walk ${first}: one of the two is filed under a wrong name and would count twice; look at walks.csv`,
    },
  ];
}
