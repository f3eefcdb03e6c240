import type { CheckedCampaign, CheckedWalk } from '../pipeline/check-campaign.js';
import type { Finding } from '../stages/findings/finding.js';
import { printable } from './text-table.js';

/** Walks named in a line before the rest is only counted. */
const NAMED = 6;

/** A campaign's check that a person can read in a minute: the sum, then what to look at, the gravest first. */
export function checkText({ campaign, walks }: CheckedCampaign): string {
  const readable = walks.filter(({ problem }) => problem === null);
  const minutes = readable.reduce((sum, { duration_s }) => sum + duration_s, 0) / 60;
  const quiet = readable.filter(({ findings }) => findings.every(({ severity }) => severity === 'note'));
  const lines = [
    `${printable(campaign.name)}: ${walks.length} logs, ${minutes.toFixed(0)} min; ` +
      `${quiet.length} without a warning, ${readable.length - quiet.length} with, ${walks.length - readable.length} unreadable`,
  ];
  for (const { walk, problem } of walks)
    if (problem) lines.push('', `fail  unreadable: ${walk}`, `      ${problem.message}`);
  for (const severity of ['fail', 'warn'] as const)
    for (const { kind, found } of byKind(readable, severity)) {
      const first = found[0]!;
      lines.push('', `${severity}  ${kind}: ${named(found.map(({ walk }) => walk))}`);
      lines.push(`      ${first.walk}${where(first.finding)}: ${first.finding.message}`);
      if (found.length > 1) lines.push(`      and ${found.length - 1} more like it`);
    }
  const notes = byKind(readable, 'note').map(({ kind, found }) => {
    const count = new Set(found.map(({ walk }) => walk)).size;
    return `${kind} (${count === walks.length ? 'all' : count})`;
  });
  if (notes.length > 0) lines.push('', `notes, with the walks that have them: ${notes.join(', ')}`);
  return `${lines.join('\n')}\n`;
}

interface Found {
  walk: string;
  finding: Finding;
}

function byKind(
  walks: readonly CheckedWalk[],
  severity: Finding['severity'],
): { kind: string; found: Found[] }[] {
  const kinds = new Map<string, Found[]>();
  for (const { walk, findings } of walks)
    for (const finding of findings)
      if (finding.severity === severity)
        kinds.set(finding.kind, [...(kinds.get(finding.kind) ?? []), { walk, finding }]);
  return [...kinds].map(([kind, found]) => ({ kind, found })).sort((a, b) => b.found.length - a.found.length);
}

function named(walks: readonly string[]): string {
  const all = [...new Set(walks)].map(printable);
  return all.length <= NAMED
    ? all.join(', ')
    : `${all.slice(0, NAMED).join(', ')} and ${all.length - NAMED} more walks`;
}

/** Where in the walk, unless it is of all of it. */
function where({ from_s, to_s }: Finding): string {
  return from_s > 1 ? `, ${from_s.toFixed(1)} to ${to_s.toFixed(1)} s` : '';
}
