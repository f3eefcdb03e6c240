import { readFileSync } from 'node:fs';
import { basename, extname } from 'node:path';
import { parseDocument, stringify } from 'yaml';
import { z } from 'zod';
import { InputError } from '../errors.js';
import type { AnyStage } from '../stages/stage.js';
import { Problems } from './problems.js';
import { readYaml } from './yaml-document.js';

/** A method and its settings for every stage, all defaults filled in. */
export interface Recipe {
  name: string;
  stages: Readonly<Record<string, StageChoice>>;
}

export interface StageChoice {
  method: string;
  settings: Readonly<Record<string, unknown>>;
}

/** The recipe that is followed where none is named: each stage's default method with its default settings. */
export function defaultRecipe(stages: readonly AnyStage[]): Recipe {
  return parseRecipe('{}', 'default.yaml', stages);
}

/**
 * Reads a recipe file.
 *
 * @throws InputError `no-file`; else as {@link parseRecipe}.
 */
export function readRecipe(path: string, stages: readonly AnyStage[]): Recipe {
  let text: string;
  try {
    text = readFileSync(path, 'utf8');
  } catch (error) {
    throw new InputError('no-file', `${path}: no such recipe file; name a YAML file`, { cause: error });
  }
  return parseRecipe(text, path, stages);
}

/**
 * Reads a recipe's text: `name`, and a key per stage with `method` and the method's settings, all optional.
 *
 * @param file - its name, for messages; without its folder and ending it is the recipe's name where the
 *   text gives none.
 * @throws InputErrors `bad-recipe` with a line per problem: unknown stage, method or key, or a value out of range.
 */
export function parseRecipe(text: string, file: string, stages: readonly AnyStage[]): Recipe {
  const problems = new Problems();
  const document = parseDocument(text);
  const shape: Record<string, z.ZodType> = { name: nameSchema(basename(file, extname(file))) };
  for (const stage of stages) shape[stage.name] = choiceSchema(stage, document.getIn([stage.name, 'method']));
  // An empty file is a recipe of defaults.
  const isEmpty = document.errors.length === 0 && document.contents === null;
  const data = readYaml(isEmpty ? '{}' : text, file, z.strictObject(shape), problems);
  problems.throwIfAny('bad-recipe');
  const { name, ...choices } = data as { name: string } & Record<string, Record<string, unknown>>;
  return {
    name,
    stages: Object.fromEntries(stages.map((stage) => [stage.name, choiceOf(choices[stage.name]!)])),
  };
}

/** A recipe as YAML, all settings written out; reading it again gives the same recipe. */
export function renderRecipe(recipe: Recipe): string {
  const entries = Object.entries(recipe.stages).map(([stage, { method, settings }]) => [
    stage,
    { method, ...settings },
  ]);
  return stringify({ name: recipe.name, ...Object.fromEntries(entries) });
}

/** A recipe's name is also its results folder. */
function nameSchema(fallback: string) {
  return z
    .string()
    .regex(/^[A-Za-z0-9][A-Za-z0-9._-]*$/, {
      error: (issue) =>
        `got ${JSON.stringify(issue.input)}; must be letters, digits, ".", "_" and "-", beginning with a letter or digit`,
    })
    .default(fallback);
}

/** What may stand under a stage's key, given the method that the recipe names there. */
function choiceSchema(stage: AnyStage, named: unknown): z.ZodType {
  const method = stage.methods[typeof named === 'string' ? named : stage.defaultMethod];
  const names = Object.keys(stage.methods) as [string, ...string[]];
  if (!method || (named !== undefined && typeof named !== 'string'))
    return z.looseObject({ method: z.enum(names) });
  const settings = method.settings as z.ZodObject;
  return settings.safeExtend({ method: z.literal(method.name).default(method.name) }).prefault({});
}

function choiceOf({ method, ...settings }: Record<string, unknown>): StageChoice {
  return { method: method as string, settings };
}
