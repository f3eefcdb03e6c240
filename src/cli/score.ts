import type { Command } from './command.js';

interface ScoreOptions {
  results: string;
}

/** `treadline score RESULTS`. */
export const scoreCommand: Command<ScoreOptions> = {
  usage: 'score <results>',
  summary: 'print the scores of a results folder',
  options: (yargs) =>
    yargs.positional('results', {
      type: 'string',
      demandOption: true,
      describe: 'results folder that a run wrote',
    }),
  examples: [
    ['treadline score trial/results/default', 'groups with intervals, then every walk'],
    ['treadline score trial/results/default --json', 'the same for a program'],
  ],
  async run({ results, json }, io) {
    const { readResults } = await import('../pipeline/read-results.js');
    const read = readResults(results);
    if (json) {
      const { resultsJson } = await import('./results-json.js');
      io.out(`${JSON.stringify(resultsJson(read), null, 2)}\n`);
    } else {
      const { scoreText } = await import('./score-text.js');
      io.out(scoreText(read, 'all'));
    }
    return 0;
  },
};
