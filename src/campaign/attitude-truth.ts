import { basename } from 'node:path';
import { InputError } from '../errors.js';
import { readNumberTable, type TruthClock } from './number-table.js';

/** A reference attitude: unit quaternions device -> east, north, up, `qw >= 0`. */
export interface AttitudeTruth {
  t_s: Float64Array;
  qw: Float64Array;
  qx: Float64Array;
  qy: Float64Array;
  qz: Float64Array;
  /** 1 where the row counts when scoring, 0 where not; absent where the file does not say. */
  moving?: Float64Array;
}

/** A norm further from 1 than this is no rounding, but something else than a quaternion in these columns. */
const NORM_SLACK = 0.01;

/**
 * Reads an attitude-truth file. Quaternions are normalised, as files round them.
 *
 * @param clock - gives times since the walk's first reading; without it they stay as written.
 * @throws InputError `not-a-rotation` where a norm is not 1 to within 0.01; or as of readNumberTable.
 */
export async function readAttitudeTruth(
  path: string,
  clock: TruthClock | null = null,
): Promise<AttitudeTruth> {
  const table = await readNumberTable(path, ['qw', 'qx', 'qy', 'qz'], ['moving'], clock);
  const { t_s, qw, qx, qy, qz, moving } = table as unknown as AttitudeTruth;
  for (let i = 0; i < t_s.length; i++) {
    const norm = Math.hypot(qw[i]!, qx[i]!, qy[i]!, qz[i]!);
    if (!(Math.abs(norm - 1) <= NORM_SLACK))
      throw new InputError(
        'not-a-rotation',
        `${basename(path)} at t_s ${t_s[i]}: qw, qx, qy, qz have the norm ${norm}; a rotation has 1`,
      );
    const scale = (qw[i]! < 0 ? -1 : 1) / norm;
    for (const column of [qw, qx, qy, qz]) column[i] = column[i]! * scale + 0;
  }
  return { t_s, qw, qx, qy, qz, ...(moving ? { moving } : {}) };
}
