import { problemOf, type WalkJob, type WalkOutcome } from './outcome.js';
import { keptWalk, runWalk } from './run-walk.js';

/**
 * Runs walks, several at a time, each in a worker thread of its own; those that stand already are only looked at.
 *
 * @param jobs - the walks.
 * @param workers - how many at a time; 1 runs them here, without a thread.
 * @param onWalk - told of each walk as it ends, in the order of ending.
 * @returns outcomes in the order of the jobs.
 */
export async function runWalks(
  jobs: readonly WalkJob[],
  workers: number,
  onWalk: (outcome: WalkOutcome) => void,
): Promise<WalkOutcome[]> {
  const told = (outcome: WalkOutcome) => {
    onWalk(outcome);
    return outcome;
  };
  const outcomes = new Array<WalkOutcome>(jobs.length);
  const open: number[] = [];
  for (const [i, job] of jobs.entries()) {
    // Looking is quick, and threads take a while to start: they get only what there is to do.
    const kept = await keptWalk(job);
    if (kept) outcomes[i] = told(kept);
    else open.push(i);
  }
  const threads = Math.min(workers, open.length);
  if (threads <= 1) {
    for (const i of open) {
      outcomes[i] = told(await runWalk(jobs[i]!));
      // Lets timers and signals through between walks.
      await new Promise((resolve) => setImmediate(resolve));
    }
    return outcomes;
  }
  const { Piscina } = await import('piscina');
  // Run from source (tests, development), the worker is TypeScript too.
  const isSource = import.meta.url.endsWith('.ts');
  const pool = new Piscina({
    filename: new URL(isSource ? './worker.ts' : './worker.js', import.meta.url).href,
    minThreads: threads,
    maxThreads: threads,
    ...(isSource ? { execArgv: ['--import', import.meta.resolve('tsx')] } : {}),
  });
  try {
    await Promise.all(
      open.map(async (i) => {
        const job = jobs[i]!;
        try {
          outcomes[i] = told((await pool.run(job)) as WalkOutcome);
        } catch (error) {
          // The thread itself died, e.g. for want of memory; runWalk never throws.
          const problem = problemOf(error, 'worker');
          outcomes[i] = told({ walk: job.walk, made: [], kept: [], leftOut: [], problem, fails: [] });
        }
      }),
    );
    return outcomes;
  } finally {
    await pool.destroy();
  }
}
