import { readNumberTable, type TruthClock } from './number-table.js';

/** A dense reference trajectory in the grid. */
export interface PathTruth {
  t_s: Float64Array;
  east_m: Float64Array;
  north_m: Float64Array;
  up_m?: Float64Array;
}

/**
 * Reads a path-truth file.
 *
 * @param clock - gives times since the walk's first reading; without it they stay as written.
 * @throws InputError as of readNumberTable.
 */
export async function readPathTruth(path: string, clock: TruthClock | null = null): Promise<PathTruth> {
  return (await readNumberTable(path, ['east_m', 'north_m'], ['up_m'], clock)) as unknown as PathTruth;
}
