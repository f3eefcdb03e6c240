import { existsSync, statSync } from 'node:fs';
import { join } from 'node:path';
import { type RunRecord, readRunRecord } from '../campaign/run-record.js';
import { InputError } from '../errors.js';
import { anyColumnsOf, readStored } from '../tables/read.js';
import type { AnyColumns } from '../tables/spec.js';

/** What a run left in its results folder, for the campaign as a whole. */
export interface Results {
  dir: string;
  record: RunRecord;
  walkScores: AnyColumns;
  groupScores: AnyColumns;
  /** Null where no walk has labelled steps. */
  stepScores: AnyColumns | null;
}

/**
 * Opens a results folder.
 *
 * @throws InputError `no-results` where it is none.
 */
export function readResults(dir: string): Results {
  const record = existsSync(dir) && statSync(dir).isDirectory() ? readRunRecord(dir) : null;
  if (!record)
    throw new InputError(
      'no-results',
      `${dir}: not a results folder (it has no run.json); name one that "treadline run" wrote`,
    );
  return {
    dir,
    record,
    walkScores: tableIn(dir, 'walk-scores')!,
    groupScores: tableIn(dir, 'group-scores')!,
    stepScores: tableIn(dir, 'step-scores', true),
  };
}

function tableIn(dir: string, name: string, isOptional = false): AnyColumns | null {
  const path = join(dir, `${name}.arrow`);
  if (isOptional && !existsSync(path)) return null;
  return anyColumnsOf(readStored(path).table, path).columns;
}
