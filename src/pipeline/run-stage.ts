import type { WalkContext } from '../campaign/context.js';
import type { StageChoice } from '../campaign/recipe.js';
import { LeftOut } from '../stages/left-out.js';
import { type AnyStage, partsUsed } from '../stages/stage.js';
import { buildTable } from '../tables/build.js';
import { hashOfValue, madeTheSame, provenanceMetadata } from '../tables/provenance.js';
import { readStoredIfSound } from '../tables/read.js';
import type { AnyColumns } from '../tables/spec.js';
import { writeTable } from '../tables/write.js';
import { type OnHand, onHandFromFile } from './on-hand.js';

/** One stage with its method, settings, inputs and place, ready to run. */
export interface StageTask {
  stage: AnyStage;
  choice: StageChoice;
  inputs: ReadonlyMap<string, OnHand>;
  context: WalkContext;
  path: string;
}

/**
 * Gathers a stage's inputs.
 *
 * @param leftOut - reasons of what is not on hand, by table name.
 * @throws LeftOut where a table that the stage or its method needs is not on hand.
 */
export function stageTask(
  stage: AnyStage,
  choice: StageChoice,
  onHand: ReadonlyMap<string, OnHand>,
  leftOut: ReadonlyMap<string, string>,
  context: WalkContext,
  path: string,
): StageTask {
  const inputs = new Map<string, OnHand>();
  const method = stage.methods[choice.method]!;
  for (const name of [...stage.reads, ...(method.requires ?? [])]) {
    const table = onHand.get(name);
    if (!table) throw new LeftOut(leftOut.get(name) ?? `there is no ${name} table`);
    inputs.set(name, table);
  }
  for (const name of stage.readsIfPresent) {
    const table = onHand.get(name);
    if (table) inputs.set(name, table);
  }
  return { stage, choice, inputs, context, path };
}

/** What the stage's table says, or would say, of its making. */
export function taskMetadata({ stage, choice, inputs, context }: StageTask): Record<string, string> {
  const method = stage.methods[choice.method]!;
  const hashes: Record<string, string> = {};
  for (const [name, table] of inputs) hashes[name] = table.sha256;
  for (const part of partsUsed(method, choice.settings))
    hashes[`context.${part}`] = hashOfValue(context[part]);
  return provenanceMetadata({
    stage: stage.name,
    stageVersion: method.version,
    method: method.name,
    settings: choice.settings,
    inputs: hashes,
  });
}

/** The table that stands already, where it was made of the very same; else null. */
export function keptTable(task: StageTask, metadata: Record<string, string>): OnHand | null {
  const stored = readStoredIfSound(task.path);
  if (!stored || !madeTheSame(stored.metadata, metadata)) return null;
  return onHandFromFile(stored, task.stage.table);
}

/** Runs the stage's method in memory. */
export function computeStage({ stage, choice, inputs, context }: StageTask): AnyColumns {
  const columns: Record<string, AnyColumns> = {};
  for (const [name, table] of inputs) columns[name] = table.columns();
  const method = stage.methods[choice.method]!;
  // A method that looks at more than it says would not be run again when that changes: it finds nothing there.
  const seen = Object.fromEntries(partsUsed(method, choice.settings).map((part) => [part, context[part]]));
  return method.run(columns, choice.settings, seen as unknown as WalkContext);
}

/** Runs the stage and writes its table. */
export function makeTable(task: StageTask, metadata: Record<string, string>): OnHand {
  const columns = computeStage(task);
  const sha256 = writeTable(task.path, buildTable(task.stage.table, columns, metadata));
  return { sha256, columns: () => columns };
}
