import { existsSync } from 'node:fs';
import { join, resolve } from 'node:path';

/** A folder of open recordings: null, and the reason printed, where it is not there. */
export function openCampaign(name: string): string | null {
  const dir = join(
    process.env.TREADLINE_OPEN_DATA ?? resolve(import.meta.dirname, '../../../shared/campaigns'),
    name,
  );
  if (existsSync(dir)) return dir;
  console.log(`skipped: no recordings at ${dir} (TREADLINE_OPEN_DATA names another folder of them)`);
  return null;
}
