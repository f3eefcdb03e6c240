import type { Command } from './command.js';

interface SimulateOptions {
  plan: string;
  out: string;
}

/** `treadline simulate PLAN.yaml -o DIR`. */
export const simulateCommand: Command<SimulateOptions> = {
  usage: 'simulate <plan>',
  summary: 'make a campaign with exact truth from a plan',
  options: (yargs) =>
    yargs
      .positional('plan', {
        type: 'string',
        demandOption: true,
        describe: 'YAML file: places, walkers, phones, routes, walks',
      })
      .option('out', {
        alias: 'o',
        type: 'string',
        requiresArg: true,
        demandOption: true,
        describe: 'campaign folder to write; files of the same names are replaced',
      }),
  examples: [
    ['treadline simulate plan.yaml -o trial', 'logs, survey, passes and truth in the campaign form'],
  ],
  async run({ plan, out, quiet, json }, io) {
    const { readPlan } = await import('../simulate/read-plan.js');
    const { simulateCampaign } = await import('../simulate/simulate-campaign.js');
    const summary = await simulateCampaign(readPlan(plan), out);
    if (json) io.out(`${JSON.stringify(summary, null, 2)}\n`);
    else if (!quiet)
      io.out(
        `${summary.dir}: ${summary.walks} walks of ${summary.walkers} walkers, ${summary.checkpoints} checkpoints, ` +
          `${summary.steps} steps, ${(summary.distanceM / 1000).toFixed(2)} km, ` +
          `${(summary.durationS / 60).toFixed(0)} min, ${summary.rows} log rows\n`,
      );
    return 0;
  },
};
