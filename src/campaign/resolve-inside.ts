import { realpathSync } from 'node:fs';
import { dirname, isAbsolute, join, relative, resolve, sep, win32 } from 'node:path';
import { InputError } from '../errors.js';

function isBelow(folder: string, path: string): boolean {
  const way = relative(folder, path);
  return way === '' || (way !== '..' && !way.startsWith(`..${sep}`) && !isAbsolute(way));
}

/** The real path of the deepest part of `path` that exists, with the rest as written. */
function realPathOfExisting(path: string): string {
  try {
    return realpathSync(path);
  } catch {
    const parent = dirname(path);
    return parent === path ? path : join(realPathOfExisting(parent), path.slice(parent.length));
  }
}

/**
 * Absolute path of a file that a campaign names, which must lie in the campaign's folder.
 *
 * A campaign is data from elsewhere: it may not make the program read other files of the machine.
 * The file need not exist.
 *
 * @param dir - the campaign's folder; may itself be reached through a link.
 * @param path - as written in the campaign.
 * @param what - how messages name the place where it is written, e.g. `walks.csv:4 log`.
 * @throws InputError `outside-campaign` on an absolute path, `..`, or a link that leads out.
 */
export function resolveInside(dir: string, path: string, what: string): string {
  const refuse = (reason: string) => {
    throw new InputError(
      'outside-campaign',
      `${what}: "${path}" ${reason}; use a path below the campaign folder`,
    );
  };
  if (path.includes('\0')) refuse('has a NUL character');
  if (isAbsolute(path) || win32.isAbsolute(path)) refuse('is an absolute path');
  if (path.split(/[\\/]/).includes('..')) refuse('climbs out with ".."');
  const root = resolve(dir);
  const target = resolve(root, path);
  if (!isBelow(realPathOfExisting(root), realPathOfExisting(target)))
    refuse('is a link that leads out of the campaign folder');
  return target;
}
