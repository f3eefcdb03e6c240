import type { Attitude, Steps } from '../../tables/schemas.js';
import type { CarrySpell } from './carry-spells.js';

/**
 * Where the device points over the ground at each row, as a horizontal unit vector (east, north), by one axis for each
 * spell of a carry: the top of the screen, or the back where the phone stands up rather than lies, or the screen where it
 * stands on its head, made level at the spell's mean lie.
 *
 * One axis fixed in the device turns with the device alone. One that is chosen by the instant's lie also turns as a
 * swinging thigh raises and lowers the phone.
 *
 * @param spells - all of a walk's, in order.
 * @returns two arrays of shape (rows).
 */
export function spellDirection(
  attitude: Attitude,
  steps: Steps,
  spells: readonly CarrySpell[],
): { east: Float64Array; north: Float64Array } {
  const rows = attitude.qw.length;
  const east = new Float64Array(rows);
  const north = new Float64Array(rows);
  let i = 0;
  for (const [s, { up }] of spells.entries()) {
    const [a, b, c] = levelAxis(up);
    const next = spells[s + 1];
    const until = next ? steps.start_s[next.from]! : Number.POSITIVE_INFINITY;
    for (; i < rows && attitude.t_s[i]! < until; i++) {
      const w = attitude.qw[i]!;
      const x = attitude.qx[i]!;
      const y = attitude.qy[i]!;
      const z = attitude.qz[i]!;
      const e = (1 - 2 * (y * y + z * z)) * a + 2 * (x * y - w * z) * b + 2 * (x * z + w * y) * c;
      const n = 2 * (x * y + w * z) * a + (1 - 2 * (x * x + z * z)) * b + 2 * (y * z - w * x) * c;
      const length = Math.hypot(e, n);
      east[i] = length > 0 ? e / length : 0;
      north[i] = length > 0 ? n / length : 1;
    }
  }
  return { east, north };
}

/** A phone stands where its top is raised or lowered beyond this. */
const STANDING = Math.sin((65 * Math.PI) / 180);

/**
 * The axis in the device frame that is level at a lie, unit length.
 *
 * @param up - up in the device frame, unit length.
 */
export function levelAxis(up: readonly [number, number, number]): [number, number, number] {
  const [x, y, z] = up;
  const axis = Math.abs(y) < STANDING ? [0, 1, 0] : [0, 0, y > 0 ? -1 : 1];
  const along = axis[1]! * y + axis[2]! * z;
  const level = [-along * x, axis[1]! - along * y, axis[2]! - along * z] as const;
  const length = Math.hypot(...level);
  return [level[0] / length, level[1] / length, level[2] / length];
}
