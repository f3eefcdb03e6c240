/** Mean of a sensor over a stretch in which the phone lay or was held still. */
export interface StillWindow {
  from_s: number;
  to_s: number;
  mean: readonly [number, number, number];
}

const WINDOW_S = 1;

/**
 * Stretches of a second in which every axis scatters by less than `limit` (standard deviation).
 *
 * @param t - times, s, ascending.
 * @param columns - three axes.
 */
export function stillWindows(
  t: Float64Array,
  columns: readonly [Float64Array, Float64Array, Float64Array],
  limit: number,
): StillWindow[] {
  const out: StillWindow[] = [];
  for (let from = 0; from < t.length; ) {
    let to = from;
    while (to < t.length && t[to]! < t[from]! + WINDOW_S) to++;
    const n = to - from;
    if (n >= 8) {
      const moments = columns.map((column) => {
        let sum = 0;
        for (let i = from; i < to; i++) sum += column[i]!;
        const mean = sum / n;
        let square = 0;
        for (let i = from; i < to; i++) square += (column[i]! - mean) ** 2;
        return { mean, sd: Math.sqrt(square / n) };
      });
      if (moments.every(({ sd }) => sd < limit))
        out.push({
          from_s: t[from]!,
          to_s: t[to - 1]!,
          mean: [moments[0]!.mean, moments[1]!.mean, moments[2]!.mean],
        });
    }
    from = Math.max(to, from + 1);
  }
  return out;
}
