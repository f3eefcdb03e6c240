import type { Command } from './command.js';

interface CompareOptions {
  a: string;
  b: string;
  gate: string[];
}

/** `treadline compare RESULTS_A RESULTS_B`. */
export const compareCommand: Command<CompareOptions> = {
  usage: 'compare <a> <b>',
  summary: 'compare two recipes on the same walks, paired',
  options: (yargs) =>
    yargs
      .positional('a', { type: 'string', demandOption: true, describe: 'results folder compared with' })
      .positional('b', { type: 'string', demandOption: true, describe: 'results folder that is judged' })
      .option('gate', {
        type: 'string',
        array: true,
        default: [] as string[],
        describe:
          "demand on b over all walks, e.g. 'p75 <= 3.0 m' or 'median not worse by 0.1 m'; exit code 1 where one fails",
      }),
  examples: [
    ['treadline compare results/default results/slow-gait', 'difference with interval and test'],
    ["treadline compare base new --gate 'median not worse by 0.1 m'", 'for continuous integration'],
  ],
  async run({ a, b, gate, json }, io) {
    const { compareResults } = await import('../pipeline/compare-results.js');
    const comparison = compareResults(a, b, gate);
    if (json)
      io.out(
        `${JSON.stringify(comparison, (_key, value) => (typeof value === 'number' && !Number.isFinite(value) ? null : value), 2)}\n`,
      );
    else {
      const { compareText } = await import('./compare-text.js');
      io.out(compareText(comparison));
    }
    return comparison.gates.every(({ holds }) => holds) ? 0 : 1;
  },
};
