import { problemOf, type WalkJob, type WalkOutcome } from './outcome.js';
import { runWalk } from './run-walk.js';

/**
 * Runs walks, several at a time, each in a worker thread of its own.
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
  const threads = Math.min(workers, jobs.length);
  if (threads <= 1) {
    const outcomes: WalkOutcome[] = [];
    for (const job of jobs) {
      outcomes.push(told(await runWalk(job)));
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
    ...(isSource ? { execArgv: ['--import', 'tsx'] } : {}),
  });
  try {
    return await Promise.all(
      jobs.map(async (job) => {
        try {
          return told((await pool.run(job)) as WalkOutcome);
        } catch (error) {
          // The thread itself died, e.g. for want of memory; runWalk never throws.
          const problem = problemOf(error, 'worker');
          return told({ walk: job.walk, made: [], kept: [], leftOut: [], problem, fails: [] });
        }
      }),
    );
  } finally {
    await pool.destroy();
  }
}
