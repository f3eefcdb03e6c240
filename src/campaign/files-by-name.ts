import { readdirSync } from 'node:fs';
import { join } from 'node:path';
import type { Problems } from './problems.js';
import { resolveInside } from './resolve-inside.js';

/**
 * The files of a campaign's subfolder that are named `<prefix><name><ending>`, by name, absolute.
 *
 * Other files are passed over. Two files of one name (plain and `.gz`) are a problem.
 *
 * @returns empty where there is no such folder.
 */
export function filesByName(
  dir: string,
  folder: string,
  prefix: string,
  endings: readonly string[],
  problems: Problems,
): Map<string, string> {
  const found = new Map<string, string>();
  let files: string[];
  try {
    files = readdirSync(join(dir, folder)).sort();
  } catch {
    return found;
  }
  for (const file of files) {
    const ending = endings.find((each) => file.endsWith(each));
    if (ending === undefined || !file.startsWith(prefix)) continue;
    const name = file.slice(prefix.length, file.length - ending.length);
    if (name === '') continue;
    const relative = `${folder}/${file}`;
    const path = problems.attempt(() => resolveInside(dir, relative, relative));
    if (path === null) continue;
    if (found.has(name))
      problems.add(`${relative}: there is another file for "${name}" in ${folder}/; keep one of them`);
    else found.set(name, path);
  }
  return found;
}
