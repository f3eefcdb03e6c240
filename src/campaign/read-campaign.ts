import { existsSync, statSync } from 'node:fs';
import { resolve } from 'node:path';
import { InputError } from '../errors.js';
import { findStored, readCampaignText } from './campaign-table.js';
import { readCampaignYaml } from './campaign-yaml.js';
import { filesByName } from './files-by-name.js';
import { didYouMean } from './nearest-name.js';
import { readPasses } from './passes.js';
import { Problems } from './problems.js';
import { resolveInside } from './resolve-inside.js';
import { readStepTruth } from './step-truth.js';
import { readSurvey } from './survey.js';
import type { Campaign, Walk } from './types.js';
import { readWalkers } from './walkers.js';
import { readWalks } from './walks.js';
import { wallEdges } from './wall-edges.js';

/** Truth files by walk; one for a walk that walks.csv does not have is a problem: its name is likely misspelt. */
function truthFiles(
  dir: string,
  folder: string,
  walks: readonly Walk[] | null,
  problems: Problems,
): Map<string, string> {
  const files = filesByName(dir, folder, '', ['.csv', '.csv.gz'], problems);
  const names = walks?.map(({ walk }) => walk);
  for (const name of names ? files.keys() : [])
    if (!names?.includes(name))
      problems.add(
        `${folder}/${name}.csv: walk "${name}" is not in walks.csv.${didYouMean(name, names ?? [])}`,
      );
  return files;
}

/**
 * Reads a campaign folder: campaign.yaml and its tables, checked against each other. Logs are not opened.
 *
 * Of the optional files, `step-truth.csv` and `passes.csv` must name walks of walks.csv; `passes.csv`
 * and the walks' `start` must name surveyed checkpoints where there is a survey.csv. Calibrations are
 * found by name: `calibrations/device-<device>.yaml` and `calibrations/walker-<walker>.yaml`.
 *
 * @throws InputErrors `campaign` with a line for each problem of the folder, all at once; InputError
 *   `no-campaign` where there is no such folder, or no campaign.yaml in it.
 */
export function readCampaign(dir: string): Campaign {
  const root = resolve(dir);
  if (!existsSync(root) || !statSync(root).isDirectory())
    throw new InputError('no-campaign', `${dir}: there is no such folder; name a campaign folder`);
  const problems = new Problems();
  const yamlPath = resolveInside(root, 'campaign.yaml', 'campaign.yaml');
  if (!existsSync(yamlPath))
    throw new InputError(
      'no-campaign',
      `${dir}: no campaign.yaml; a campaign folder holds campaign.yaml, walkers.csv, walks.csv and the logs`,
    );
  const yaml = problems.attempt(() =>
    readCampaignYaml(readCampaignText(yamlPath, 'campaign.yaml'), problems),
  );
  for (const name of ['walkers.csv', 'walks.csv'])
    if (problems.attempt(() => findStored(root, name) ?? false) === false)
      problems.add(
        `${name}: missing; a campaign folder holds campaign.yaml, walkers.csv, walks.csv and the logs`,
      );
  const survey = readSurvey(root, yaml?.grid ?? null, problems);
  const walkers = readWalkers(root, problems);
  const layouts = yaml && Object.keys(yaml.layouts);
  const walks = readWalks(root, { walkers, layouts, survey }, problems);
  if (walks?.length === 0) problems.add('walks.csv: has no walk; give each recording a row');
  const passes = readPasses(root, walks, survey, problems);
  const stepTruth = readStepTruth(root, walks, problems);
  const attitudeTruth = truthFiles(root, 'attitude-truth', walks, problems);
  const pathTruth = truthFiles(root, 'path-truth', walks, problems);
  const floorPlan = problems.attempt(() => findStored(root, 'floor-plan.geojson')) ?? null;
  const walls =
    floorPlan &&
    problems.attempt(() => wallEdges(readCampaignText(floorPlan.path, floorPlan.file), floorPlan.file));
  const deviceCalibrations = filesByName(root, 'calibrations', 'device-', ['.yaml'], problems);
  const walkerCalibrations = filesByName(root, 'calibrations', 'walker-', ['.yaml'], problems);
  problems.throwIfAny('campaign');
  if (!yaml || !walkers || !walks) throw new Error(`${dir}: unreadable, but no problem was reported`);
  return {
    dir: root,
    ...yaml,
    walkers,
    walks,
    survey,
    passes,
    stepTruth,
    attitudeTruth,
    pathTruth,
    floorPlan: floorPlan?.path ?? null,
    wallEdges: walls ?? new Map(),
    deviceCalibrations,
    walkerCalibrations,
  };
}
