import type { PassContext, StartContext } from '../../campaign/context.js';

/**
 * True walking direction at each pass: straight from the checkpoint before (for the first pass, the
 * start) to this one.
 *
 * Where that is no distance (the start's own pass, or the same checkpoint twice), the direction before
 * holds; where there is none before, the next one.
 *
 * @returns shape (passes), radians clockwise from grid north; NaN where no two places differ.
 */
export function directionsOfTravel(passes: readonly PassContext[], start: StartContext | null): Float64Array {
  const out = new Float64Array(passes.length).fill(Number.NaN);
  let before: { east_m: number; north_m: number } | null = start;
  let held = Number.NaN;
  for (const [i, pass] of passes.entries()) {
    if (before) {
      const east = pass.east_m - before.east_m;
      const north = pass.north_m - before.north_m;
      if (east !== 0 || north !== 0) held = Math.atan2(east, north);
    }
    out[i] = held;
    before = pass;
  }
  for (let i = out.length - 2; i >= 0; i--) if (Number.isNaN(out[i]!)) out[i] = out[i + 1]!;
  return out;
}
