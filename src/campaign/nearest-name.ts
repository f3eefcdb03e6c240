/** Edit distance with swaps of neighbours (optimal string alignment). */
function editDistance(a: string, b: string): number {
  let before: number[] = [];
  let above = Array.from({ length: b.length + 1 }, (_, j) => j);
  for (let i = 1; i <= a.length; i++) {
    const row = [i];
    for (let j = 1; j <= b.length; j++) {
      const same = a[i - 1] === b[j - 1];
      let cost = Math.min(above[j]! + 1, row[j - 1]! + 1, above[j - 1]! + (same ? 0 : 1));
      if (i > 1 && j > 1 && a[i - 1] === b[j - 2] && a[i - 2] === b[j - 1])
        cost = Math.min(cost, before[j - 2]! + 1);
      row.push(cost);
    }
    before = above;
    above = row;
  }
  return above[b.length]!;
}

const plain = (name: string) => name.toLowerCase().replaceAll(/[\s_-]/g, '');

/**
 * The known name that was probably meant, or null.
 *
 * A name that differs only in case, blanks, `_` or `-` is always near; else at most one edit in three
 * characters, the fewest edits first, the earlier name on a tie.
 */
export function nearestName(name: string, known: Iterable<string>): string | null {
  let best: string | null = null;
  let bestDistance = Number.POSITIVE_INFINITY;
  for (const candidate of known) {
    if (plain(candidate) === plain(name)) return candidate;
    if (Math.abs(candidate.length - name.length) > 8) continue;
    const distance = editDistance(name.toLowerCase(), candidate.toLowerCase());
    const allowed = Math.floor(Math.max(name.length, candidate.length) / 3);
    if (distance <= allowed && distance < bestDistance) {
      best = candidate;
      bestDistance = distance;
    }
  }
  return best;
}

/** ` Did you mean "x"?` where a known name is near, else an empty text; goes at a message's end. */
export function didYouMean(name: string, known: Iterable<string>): string {
  const near = nearestName(name, known);
  return near === null ? '' : ` Did you mean "${near}"?`;
}

/** Names as a message lists them: the first twelve, then how many more there are. */
export function listNames(names: Iterable<string | number>): string {
  const all = [...new Set(names)].filter((name) => name !== '');
  if (all.length === 0) return '(none)';
  const shown = all.slice(0, 12).join(', ');
  return all.length > 12 ? `${shown} and ${all.length - 12} more` : shown;
}
