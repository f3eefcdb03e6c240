import { readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { beforeAll, expect, test } from 'vitest';
import { readPathTruth } from '../../src/campaign/path-truth.js';
import { readCampaign } from '../../src/campaign/read-campaign.js';
import { runCampaign } from '../../src/pipeline.js';
import { readPlan } from '../../src/simulate/read-plan.js';
import { simulateCampaign } from '../../src/simulate/simulate-campaign.js';
import { wrapToPi } from '../../src/stats/circular.js';
import { quantile } from '../../src/stats/quantile.js';
import { rootMeanSquare } from '../../src/stats/summary.js';
import { readColumns } from '../../src/tables/read.js';
import { headingsTable, stepsTable } from '../../src/tables/schemas.js';
import { temporaryFolder } from '../temporary-folder.js';

/** Sensors without error, a phone that is held still against the body, a walk round a block with a stop. */
const PLAN = `name: perfect sensors (invented)
seed: 7
grid: local
places: { A: [0, 0], B: [30, 0], C: [30, 22], D: [6, 22], E: [6, 8] }
groups: { g: { age: [30, 39] } }
walkers: [{ walker: a, group: g, sex: female }, { walker: b, group: g, sex: male }]
devices: { phone: { class: ideal, rate_hz: 100, gzip: false } }
routes: { way: { points: [A, B, C, D, E], pauses: [{ at: C, seconds: 3 }], initial_still_s: 2 } }
walks: [{ walker: all, route: way, carry: [hand, chest], wander: 0 }]
survey: { sigma_m: 0 }
passes: { sigma_s: 0 }
`;

interface WalkFigures {
  walk: string;
  found: number;
  labelled: number;
  late: Float64Array;
  headingErrorDeg: Float64Array;
  pathErrorShare: number;
}

/** The figures of one walk against its exact truth. */
async function figuresOf(dir: string, results: string, walk: string): Promise<WalkFigures> {
  const steps = readColumns(join(results, walk, 'steps.arrow'), stepsTable);
  const { heading_rad } = readColumns(join(results, walk, 'headings.arrow'), headingsTable);
  const truth = await readPathTruth(join(dir, 'path-truth', `${walk}.csv`));
  const contacts = readFileSync(join(dir, 'step-truth.csv'), 'utf8')
    .split('\n')
    .filter((line) => line.startsWith(`${walk},`))
    .map((line) => Number(line.split(',')[1]));
  const at = (t: number): [number, number] => {
    const after = Math.max(
      1,
      truth.t_s.findIndex((time) => time >= t),
    );
    const share = (t - truth.t_s[after - 1]!) / (truth.t_s[after]! - truth.t_s[after - 1]!);
    const between = (c: Float64Array) => c[after - 1]! + share * (c[after]! - c[after - 1]!);
    return [between(truth.east_m), between(truth.north_m)];
  };
  const headingErrorDeg: number[] = [];
  let [east, north] = at(steps.start_s[0]!);
  let walked = 0;
  let worst = 0;
  for (let k = 0; k < steps.t_s.length; k++) {
    const [e0, n0] = at(steps.start_s[k]!);
    const [e1, n1] = at(steps.end_s[k]!);
    const length = Math.hypot(e1 - e0, n1 - n0);
    walked += length;
    east += length * Math.sin(heading_rad[k]!);
    north += length * Math.cos(heading_rad[k]!);
    worst = Math.max(worst, Math.hypot(east - e1, north - n1));
    // On the spot there is no direction to be right about.
    if (length > 0.2)
      headingErrorDeg.push((wrapToPi(heading_rad[k]! - Math.atan2(e1 - e0, n1 - n0)) * 180) / Math.PI);
  }
  return {
    walk,
    found: steps.t_s.length,
    labelled: contacts.length,
    late: steps.t_s.map((t, k) => t - contacts[k]!),
    headingErrorDeg: Float64Array.from(headingErrorDeg),
    pathErrorShare: worst / walked,
  };
}

let figures: WalkFigures[];
beforeAll(async () => {
  const folder = temporaryFolder();
  writeFileSync(join(folder, 'plan.yaml'), PLAN);
  const dir = join(folder, 'campaign');
  await simulateCampaign(readPlan(join(folder, 'plan.yaml')), dir);
  const { resultsDir } = await runCampaign(dir, { jobs: 1 });
  figures = await Promise.all(readCampaign(dir).walks.map(({ walk }) => figuresOf(dir, resultsDir, walk)));
});

test('every step is found, and nothing else', () => {
  for (const { walk, found, labelled } of figures) expect(found, walk).toBe(labelled);
});

test('step instants: 95 of 100 within 40 ms of foot contact, all within 100', () => {
  for (const { walk, late } of figures) {
    const away = late.map(Math.abs);
    expect(quantile(away, 0.95), walk).toBeLessThan(0.04);
    // The first and the last step of a bout rise and fall slowly: their crest says less of the instant.
    expect(Math.max(...away), walk).toBeLessThan(0.1);
  }
});

test('walking direction: within half a degree (root mean square)', () => {
  expect(
    quantile(
      Float64Array.from(figures, (f) => rootMeanSquare(f.headingErrorDeg)),
      0.5,
    ),
  ).toBeLessThan(0.5);
  // How the phone sits against the walker is known to the start heading's 2 degrees and the carry's prior, no better.
  for (const { walk, headingErrorDeg } of figures)
    expect(rootMeanSquare(headingErrorDeg), walk).toBeLessThan(1);
});

test('the path with true step lengths stays within 0.3 % of the distance', () => {
  expect(
    quantile(
      Float64Array.from(figures, (f) => f.pathErrorShare),
      0.5,
    ),
  ).toBeLessThan(0.003);
  for (const { walk, pathErrorShare } of figures) expect(pathErrorShare, walk).toBeLessThan(0.006);
});
