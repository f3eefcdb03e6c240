import type { Command } from './command.js';
import { paint } from './io.js';
import { progressLine } from './progress.js';

interface RunOptions {
  campaign: string;
  recipe?: string | undefined;
  out?: string | undefined;
  walk: string[];
  upto?: string | undefined;
  jobs?: number | undefined;
  again: boolean;
}

/** `treadline run CAMPAIGN`. */
export const runCommand: Command<RunOptions> = {
  usage: 'run <campaign>',
  summary: 'take the walks of a campaign through all stages and score them',
  options: (yargs) =>
    yargs
      .positional('campaign', { type: 'string', demandOption: true, describe: 'campaign folder' })
      .option('recipe', {
        type: 'string',
        requiresArg: true,
        describe:
          "recipe file, or its name in the campaign's recipes folder; default: every stage's own default",
      })
      .option('out', {
        type: 'string',
        requiresArg: true,
        describe: 'results folder; default CAMPAIGN/results/RECIPE',
      })
      .option('walk', {
        type: 'string',
        array: true,
        default: [] as string[],
        describe: 'only this walk; may be given several times',
      })
      .option('upto', { type: 'string', requiresArg: true, describe: 'last stage to run' })
      .option('jobs', {
        type: 'number',
        requiresArg: true,
        describe: 'walks at a time; default: one a core',
      })
      .option('again', {
        type: 'boolean',
        default: false,
        describe: 'run everything anew, also what has not changed',
      }),
  examples: [
    ['treadline run trial', 'all walks with the default recipe'],
    ['treadline run trial --recipe slow-gait --walk w03 w07 --upto steps', 'two walks, steps only'],
  ],
  async run({ campaign, walk, quiet, json, ...options }, io) {
    const { runCampaign } = await import('../pipeline.js');
    const { problemLine, runExitCode } = await import('./run-summary.js');
    const progress = progressLine(io, quiet);
    let result: Awaited<ReturnType<typeof runCampaign>>;
    try {
      result = await runCampaign(campaign, {
        ...options,
        walks: walk,
        onWalk: ({ walk: name }, done, total) => progress.update(done, total, name),
      });
    } finally {
      progress.end();
    }
    const { outcomes, resultsDir } = result;
    for (const outcome of outcomes) {
      const line = problemLine(outcome, resultsDir);
      if (line) io.err(`${paint(io, 'red', 'failed')} ${line}\n`);
      for (const fail of outcome.fails) io.err(`${paint(io, 'red', 'fail')} ${outcome.walk}: ${fail}\n`);
    }
    const { leftOutLines, madeLine } = await import('./run-summary.js');
    if (!quiet) {
      for (const line of leftOutLines(outcomes)) io.err(`${line}\n`);
      if (result.campaign.grid.origin === null && result.campaign.grid.declinationDeg === null)
        io.err(
          'note: grid north is taken to be magnetic north; give grid.declination_deg, or grid.origin and grid.date, in campaign.yaml\n',
        );
    }
    const { readResults } = await import('../pipeline/read-results.js');
    const results = readResults(resultsDir);
    if (json) {
      const { resultsJson } = await import('./results-json.js');
      io.out(`${JSON.stringify(resultsJson(results), null, 2)}\n`);
    } else {
      const { scoreText } = await import('./score-text.js');
      if (outcomes.some(({ problem }) => problem === null)) io.out(scoreText(results, 'groups'));
      if (!quiet) io.err(`${madeLine(outcomes, resultsDir)}\n`);
    }
    return runExitCode(outcomes);
  },
};
