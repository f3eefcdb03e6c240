import type { Command } from './command.js';
import { progressLine } from './progress.js';

interface DemoOptions {
  dir: string;
}

/** `treadline demo [DIR]`. */
export const demoCommand: Command<DemoOptions> = {
  usage: 'demo [dir]',
  summary: 'make the demo campaign, run everything on it, explain the result',
  options: (yargs) =>
    yargs.positional('dir', {
      type: 'string',
      default: 'demo-campaign',
      describe: 'folder to make it in; must be new, empty, or an earlier demo',
    }),
  examples: [['treadline demo', 'an invented trial in ./demo-campaign, run and scored']],
  async run({ dir, quiet, json }, io) {
    const { makeDemo } = await import('../demo.js');
    const progress = progressLine(io, quiet);
    let demo: Awaited<ReturnType<typeof makeDemo>>;
    try {
      demo = await makeDemo(dir, (walk, done, total) => progress.update(done, total, walk));
    } finally {
      progress.end();
    }
    const { readResults } = await import('../pipeline/read-results.js');
    const results = readResults(demo.run.resultsDir);
    const { runExitCode, problemLine } = await import('./run-summary.js');
    for (const outcome of demo.run.outcomes) {
      const line = problemLine(outcome, results.dir);
      if (line) io.err(`failed ${line}\n`);
    }
    if (json) {
      const { resultsJson } = await import('./results-json.js');
      io.out(`${JSON.stringify(resultsJson(results), null, 2)}\n`);
    } else {
      const { demoText } = await import('./demo-text.js');
      io.out(demoText(dir, demo.simulated, results));
    }
    return runExitCode(demo.run.outcomes);
  },
};
