/** Cells of one degree that the right angle is parted into. */
const CELLS = 90;

/** Edges are weighed piece by piece: an outer wall of a hundred metres is near in part only. */
const PIECE_M = 5;

/**
 * Which way some edges run, modulo a right angle, by length; nearer ones count for more where a place is given.
 *
 * @param edges - shape (n, 4): east and north of both ends, m.
 * @param near - weight falls as exp(-distance / reachM) from there, east and north in m; null: all alike.
 * @param reachM - m, above 0.
 * @returns 90 shares, sum 1; share i is of directions from i to i + 1 degrees clockwise from north, modulo 90. Null
 *   where there is no edge of any length.
 */
export function edgeDirections(
  edges: Float64Array,
  near: { east: number; north: number } | null,
  reachM: number,
): number[] | null {
  const lengths = new Float64Array(CELLS);
  for (let i = 0; i + 3 < edges.length; i += 4) {
    const [east, north] = [edges[i + 2]! - edges[i]!, edges[i + 3]! - edges[i + 1]!];
    const length = Math.hypot(east, north);
    if (!(length > 0)) continue;
    const cell = Math.floor(((Math.atan2(east, north) * 180) / Math.PI + 360) % CELLS) % CELLS;
    const pieces = near ? Math.ceil(length / PIECE_M) : 1;
    for (let k = 0; k < pieces; k++) {
      const share = (k + 0.5) / pieces;
      const distance = near
        ? Math.hypot(edges[i]! + share * east - near.east, edges[i + 1]! + share * north - near.north)
        : 0;
      lengths[cell]! += (length / pieces) * Math.exp(-distance / reachM);
    }
  }
  const total = lengths.reduce((sum, value) => sum + value, 0);
  return total > 0 ? Array.from(lengths, (length) => length / total) : null;
}
