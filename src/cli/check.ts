import type { Command } from './command.js';
import { progressLine } from './progress.js';

interface CheckOptions {
  campaign: string;
  recipe?: string | undefined;
  walk: string[];
}

/** `treadline check CAMPAIGN`. */
export const checkCommand: Command<CheckOptions> = {
  usage: 'check <campaign>',
  summary: 'read every log and tell what is wrong with it; writes nothing',
  options: (yargs) =>
    yargs
      .positional('campaign', { type: 'string', demandOption: true, describe: 'campaign folder' })
      .option('recipe', {
        type: 'string',
        requiresArg: true,
        describe: 'recipe with the thresholds (its findings part)',
      })
      .option('walk', {
        type: 'string',
        array: true,
        default: [] as string[],
        describe: 'only this walk; may be given several times',
      }),
  examples: [
    ['treadline check trial', 'what to look at before evaluating'],
    ['treadline check trial --json', 'every finding for a program; exit code 1 where any is a fail'],
  ],
  async run({ campaign, recipe, walk, json, quiet }, io) {
    const { checkCampaign } = await import('../pipeline/check-campaign.js');
    const progress = progressLine(io, quiet);
    let checked: Awaited<ReturnType<typeof checkCampaign>>;
    try {
      checked = await checkCampaign(campaign, {
        recipe,
        walks: walk,
        onWalk: (name, done, total) => progress.update(done, total, name),
      });
    } finally {
      progress.end();
    }
    const { walks } = checked;
    if (json) {
      const shown = walks.map(({ problem, ...rest }) => ({ ...rest, problem: problem?.message ?? null }));
      io.out(`${JSON.stringify({ campaign: checked.campaign.name, walks: shown }, null, 2)}\n`);
    } else {
      const { checkText } = await import('./check-text.js');
      io.out(checkText(checked));
    }
    if (walks.every(({ problem }) => problem !== null)) return 2;
    const failed = walks.some(
      ({ problem, findings }) => problem !== null || findings.some(({ severity }) => severity === 'fail'),
    );
    return failed ? 1 : 0;
  },
};
