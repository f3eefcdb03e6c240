import type { WalkOutcome } from '../pipeline/outcome.js';
import { faultFile } from '../pipeline.js';
import type { ExitCode } from './command.js';
import { printable } from './text-table.js';

/** 2 where no walk could be processed, 1 where some could not or a finding of the log check is a fail, else 0. */
export function runExitCode(outcomes: readonly WalkOutcome[]): ExitCode {
  if (outcomes.length > 0 && outcomes.every(({ problem }) => problem !== null)) return 2;
  return outcomes.some(({ problem, fails }) => problem !== null || fails.length > 0) ? 1 : 0;
}

/** Why a walk failed, by name; null where it did not. */
export function problemLine({ walk, problem }: WalkOutcome, resultsDir: string): string | null {
  if (!problem) return null;
  if (problem.kind === 'input') return `${walk}: ${problem.message}`;
  return `${walk}: ${problem.stage}: a fault of treadline itself (${problem.message}); details are in ${faultFile(resultsDir, walk)}`;
}

/** What was left out and why, one line for all walks that share a reason. */
export function leftOutLines(outcomes: readonly WalkOutcome[]): string[] {
  const byReason = new Map<string, { stages: Set<string>; walks: Set<string> }>();
  for (const { walk, leftOut } of outcomes)
    for (const { stage, reason } of leftOut) {
      const entry = byReason.get(reason) ?? { stages: new Set(), walks: new Set() };
      entry.stages.add(stage);
      entry.walks.add(walk);
      byReason.set(reason, entry);
    }
  return [...byReason].map(([reason, { stages, walks }]) => {
    const names = [...walks].slice(0, 6).map(printable).join(', ');
    const who =
      walks.size === outcomes.length && walks.size > 1
        ? `all ${walks.size} walks`
        : walks.size > 6
          ? `${names} and ${walks.size - 6} more`
          : names;
    return `left out ${[...stages].join(', ')} (${who}): ${reason}`;
  });
}

/** What the run did, in one line. */
export function madeLine(outcomes: readonly WalkOutcome[], resultsDir: string): string {
  const made = outcomes.reduce((sum, outcome) => sum + outcome.made.length, 0);
  const kept = outcomes.reduce((sum, outcome) => sum + outcome.kept.length, 0);
  return `${outcomes.length} walks, ${made} tables written, ${kept} up to date, in ${resultsDir}`;
}
