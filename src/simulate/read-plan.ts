import { dirname, join } from 'node:path';
import { readCampaignText } from '../campaign/campaign-table.js';
import { Problems } from '../campaign/problems.js';
import { resolveInside } from '../campaign/resolve-inside.js';
import { readYaml } from '../campaign/yaml-document.js';
import { type PlanYaml, planSchema } from './plan-schema.js';

/** A checked plan with its defaults filled in, and the files it names. */
export interface SimulationPlan extends PlanYaml {
  /** As messages name it. */
  file: string;
  floorPlan: { name: string; text: string } | null;
}

/**
 * Reads a plan.
 *
 * @throws InputErrors `bad-plan` with a line for each problem, by file, line and column; InputError
 *   `unreadable-file`.
 */
export function readPlan(path: string): SimulationPlan {
  const problems = new Problems();
  const yaml = readYaml(readCampaignText(path, path), path, planSchema, problems);
  const floorPlanName = yaml?.floor_plan;
  const floorPlan =
    floorPlanName === undefined
      ? null
      : problems.attempt(() => ({
          name: floorPlanName,
          text: readCampaignText(
            resolveInside(dirname(path), floorPlanName, `${path}: floor_plan`),
            join(dirname(path), floorPlanName),
          ),
        }));
  problems.throwIfAny('bad-plan');
  if (!yaml) throw new Error(`${path}: unreadable, but no problem was reported`);
  return { ...yaml, file: path, floorPlan };
}
