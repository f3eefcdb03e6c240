import type { ResultsComparison } from '../pipeline/compare-results.js';
import { fixed, printable, textTable } from './text-table.js';

/** Below this many walkers no sign-flip test can reach 0.05. */
const LEAST_WALKERS = 6;

/** A comparison for people: the verdict first, then by group, then what differs. */
export function compareText({ groups, unpaired, recipe, otherReadings, gates }: ResultsComparison): string {
  const all = groups[0]!;
  const lines = [verdict(all)];
  const number = (head: string, cells: string[]) => ({ head, cells, isNumber: true });
  lines.push(
    textTable([
      { head: 'by', cells: groups.map(({ by }) => by), isNumber: false },
      { head: 'value', cells: groups.map(({ value }) => printable(value)), isNumber: false },
      number(
        'walkers',
        groups.map(({ walkers }) => String(walkers)),
      ),
      number(
        'walks',
        groups.map(({ walks }) => String(walks)),
      ),
      number(
        'a m',
        groups.map(({ a_m }) => fixed(a_m, 2)),
      ),
      number(
        'b m',
        groups.map(({ b_m }) => fixed(b_m, 2)),
      ),
      number(
        'b - a m [95 %]',
        groups.map(({ difference_m, low_m, high_m }) =>
          Number.isFinite(low_m)
            ? `${fixed(difference_m, 2)} [${fixed(low_m, 2)}, ${fixed(high_m, 2)}]`
            : fixed(difference_m, 2),
        ),
      ),
      number(
        '%',
        groups.map(({ difference_pct }) => fixed(difference_pct, 1)),
      ),
      number(
        'better/worse',
        groups.map(({ wins, losses }) => `${wins}/${losses}`),
      ),
      number(
        'p',
        groups.map(({ p_adjusted }) => fixed(p_adjusted, 3)),
      ),
    ]).trimEnd(),
    'each walk by its mean error over the passes that both score; interval: walkers, then walks, drawn anew; p: signs flipped by walker, corrected for several groups (Holm)',
  );
  lines.push(
    recipe.length === 0
      ? 'the recipes do not differ'
      : `the recipes differ in ${recipe.map(({ key, a, b }) => `${key} (${JSON.stringify(a)} to ${JSON.stringify(b)})`).join(', ')}`,
  );
  if (otherReadings.length > 0)
    lines.push(
      `the readings differ in ${otherReadings.map(printable).join(', ')}: the difference is not of the recipes alone`,
    );
  if (unpaired.length > 0) lines.push(`not in both: ${unpaired.map(printable).join(', ')}`);
  for (const { gate, a, b, holds } of gates)
    lines.push(
      `${holds ? 'holds ' : 'fails '} ${gate.text}: ${fixed(b, 3)}${gate.kind === 'not-worse' ? ` against ${fixed(a, 3)}` : ''}`,
    );
  return `${lines.join('\n')}\n`;
}

function verdict(all: ResultsComparison['groups'][number]): string {
  const size = `${fixed(Math.abs(all.difference_m), 2)} m (${fixed(Math.abs(all.difference_pct), 1)} %)`;
  const side = all.difference_m < 0 ? 'better' : 'worse';
  if (all.walkers < LEAST_WALKERS)
    return `b is ${side} by ${size} on average; with ${all.walkers} walkers that cannot be told from luck`;
  return all.p < 0.05
    ? `b is ${side} by ${size} on average; that is hardly luck (p ${fixed(all.p, 3)})`
    : `b is ${side} by ${size} on average; that may well be luck (p ${fixed(all.p, 3)})`;
}
