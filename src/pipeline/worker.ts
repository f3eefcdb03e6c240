import type { WalkJob, WalkOutcome } from './outcome.js';
import { runWalk } from './run-walk.js';

/** What a worker thread does with one walk. */
export default function work(job: WalkJob): Promise<WalkOutcome> {
  return runWalk(job);
}
