import { existsSync, readdirSync, statSync } from 'node:fs';
import { join, parse } from 'node:path';
import { InputError } from '../errors.js';
import { didYouMean, listNames } from './nearest-name.js';

/**
 * The file of a recipe given by path or by its name in the campaign's `recipes` folder.
 *
 * @throws InputError `no-recipe` naming the campaign's recipes.
 */
export function findRecipe(campaignDir: string, nameOrPath: string): string {
  if (existsSync(nameOrPath) && statSync(nameOrPath).isFile()) return nameOrPath;
  const folder = join(campaignDir, 'recipes');
  const files = existsSync(folder) ? readdirSync(folder).filter((file) => /\.ya?ml$/.test(file)) : [];
  const found = files.find((file) => parse(file).name === nameOrPath);
  if (found) return join(folder, found);
  const names = files.map((file) => parse(file).name).sort();
  throw new InputError(
    'no-recipe',
    `--recipe ${nameOrPath}: no such file, and no such recipe in ${folder}, which has ${listNames(names)}.${didYouMean(nameOrPath, names)}`,
  );
}
