import { existsSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { writeText } from '../tables/write.js';

/** `run.json` in a results folder: what the tables do not say of the run that made them. */
export interface RunRecord {
  /** The campaign's name, and its folder as seen from the results folder. */
  campaign: { dir: string; name: string };
  recipe: string;
  /** By walk, in the campaign's order. */
  walks: Record<string, WalkRecord>;
}

export interface WalkRecord {
  /** Stages that had nothing to work on, with the reason. */
  left_out: Record<string, string>;
  /** Why the walk could not be processed to its end; null where it was. */
  problem: string | null;
}

const FILE_NAME = 'run.json';

/** The record of a results folder; null where there is none or it is not readable. */
export function readRunRecord(resultsDir: string): RunRecord | null {
  const path = join(resultsDir, FILE_NAME);
  if (!existsSync(path)) return null;
  try {
    return JSON.parse(readFileSync(path, 'utf8')) as RunRecord;
  } catch {
    return null;
  }
}

export function writeRunRecord(resultsDir: string, record: RunRecord): void {
  writeText(join(resultsDir, FILE_NAME), `${JSON.stringify(record, null, 2)}\n`);
}
