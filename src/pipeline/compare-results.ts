import { existsSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { parse } from 'yaml';
import { InputError } from '../errors.js';
import { type Gate, gateHolds, parseGate } from '../scores/gate.js';
import { type ComparedGroup, compareWalks, type PairedWalk } from '../scores/paired-comparison.js';
import { readColumns, readStoredIfSound } from '../tables/read.js';
import { checkpointsTable } from '../tables/schemas.js';
import { walkScoresTable } from '../tables/score-schemas.js';
import { tablePath } from './on-hand.js';
import { readResults } from './read-results.js';

export interface ResultsComparison {
  groups: ComparedGroup[];
  walks: PairedWalk[];
  /** Walks that only one side could score. */
  unpaired: string[];
  /** Recipe keys whose values differ, as `stage.key`, with both values. */
  recipe: { key: string; a: unknown; b: unknown }[];
  /** Walks whose readings are not of the same bytes on both sides: the difference is then not of the recipes alone. */
  otherReadings: string[];
  gates: { gate: Gate; a: number; b: number; holds: boolean }[];
}

/**
 * Compares two results folders of one campaign, paired by walk and pass.
 *
 * @param gates - demands on the second folder's scores over all walks, see {@link parseGate}.
 * @throws InputError where a folder is none of results, no walk is scored by both, or a gate is not understood.
 */
export function compareResults(dirA: string, dirB: string, gates: readonly string[] = []): ResultsComparison {
  const wanted = gates.map(parseGate);
  const [a, b] = [readResults(dirA), readResults(dirB)];
  const scores = [dirA, dirB].map((dir) => readColumns(join(dir, 'walk-scores.arrow'), walkScoresTable));
  const walks: PairedWalk[] = [];
  const unpaired: string[] = [];
  const otherReadings: string[] = [];
  for (const [row, walk] of scores[0]!.walk.entries()) {
    const paired = pairedErrors(dirA, dirB, walk);
    if (!paired) unpaired.push(walk);
    else {
      walks.push({
        walk,
        walker: scores[0]!.walker[row]!,
        group: scores[0]!.group[row]!,
        carry: scores[0]!.carry[row]!,
        ...paired,
      });
      if (logOf(dirA, walk) !== logOf(dirB, walk)) otherReadings.push(walk);
    }
  }
  for (const walk of scores[1]!.walk) if (!scores[0]!.walk.includes(walk)) unpaired.push(walk);
  if (walks.length === 0)
    throw new InputError(
      'nothing-shared',
      `${dirA}, ${dirB}: no walk is scored by both; name two results of the same campaign`,
    );
  const all = (columns: typeof a.groupScores, statistic: string) => (columns[statistic] as Float64Array)[0]!;
  return {
    groups: compareWalks(walks),
    walks,
    unpaired,
    recipe: recipeDifferences(dirA, dirB),
    otherReadings,
    gates: wanted.map((gate) => {
      const [before, now] = [all(a.groupScores, gate.statistic), all(b.groupScores, gate.statistic)];
      return { gate, a: before, b: now, holds: gateHolds(gate, before, now) };
    }),
  };
}

/** Mean errors over the passes that both sides score: the same checkpoint at the same time. */
function pairedErrors(
  dirA: string,
  dirB: string,
  walk: string,
): Pick<PairedWalk, 'passes' | 'a_m' | 'b_m'> | null {
  const paths = [dirA, dirB].map((dir) => tablePath(dir, walk, 'checkpoints'));
  if (!paths.every(existsSync)) return null;
  const [a, b] = paths.map((path) => readColumns(path, checkpointsTable));
  const keyOf = (table: typeof a, i: number) => `${table!.checkpoint[i]} ${table!.t_s[i]!.toFixed(3)}`;
  const errors = new Map<string, number>();
  for (const [i, role] of a!.role.entries()) if (role === 'scored') errors.set(keyOf(a, i), a!.error_m[i]!);
  let [sumA, sumB, passes] = [0, 0, 0];
  for (const [i, role] of b!.role.entries()) {
    const other = errors.get(keyOf(b, i));
    if (role !== 'scored' || other === undefined) continue;
    sumA += other;
    sumB += b!.error_m[i]!;
    passes++;
  }
  return passes > 0 ? { passes, a_m: sumA / passes, b_m: sumB / passes } : null;
}

/** What the readings were made of. */
function logOf(dir: string, walk: string): string | undefined {
  return readStoredIfSound(tablePath(dir, walk, 'readings-accel'))?.metadata['treadline.inputs'];
}

function recipeDifferences(dirA: string, dirB: string): ResultsComparison['recipe'] {
  const flat = (dir: string) => {
    const out = new Map<string, unknown>();
    const recipe = parse(readFileSync(join(dir, 'recipe.yaml'), 'utf8')) as Record<string, unknown>;
    for (const [stage, choice] of Object.entries(recipe))
      if (choice !== null && typeof choice === 'object')
        for (const [key, value] of Object.entries(choice)) out.set(`${stage}.${key}`, value);
    return out;
  };
  const [a, b] = [flat(dirA), flat(dirB)];
  return [...new Set([...a.keys(), ...b.keys()])]
    .filter((key) => JSON.stringify(a.get(key)) !== JSON.stringify(b.get(key)))
    .map((key) => ({ key, a: a.get(key) ?? null, b: b.get(key) ?? null }));
}
