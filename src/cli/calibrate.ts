import { InputError } from '../errors.js';
import type { CalibratedSensor } from '../pipeline/calibrate-device.js';
import type { Command, ExitCode, SharedOptions } from './command.js';
import { type Io, paint } from './io.js';
import { progressLine } from './progress.js';

const SUBJECTS = ['gyro', 'accel', 'mag', 'delay', 'noise', 'walkers'] as const;

interface CalibrateOptions {
  what: (typeof SUBJECTS)[number];
  campaign: string;
  walk: string[];
  device?: string | undefined;
  fit?: 'bias' | 'scales' | 'full' | undefined;
  kind: 'overlapping-allan' | 'modified-allan' | 'overlapping-hadamard';
  plot?: string | undefined;
  recipe?: string | undefined;
  jobs?: number | undefined;
}

/** `treadline calibrate WHAT CAMPAIGN`. */
export const calibrateCommand: Command<CalibrateOptions> = {
  usage: 'calibrate <what> <campaign>',
  summary: "calibrate a device's sensors or walkers' step lengths, or tell sensors' noise",
  options: (yargs) =>
    yargs
      .positional('what', {
        choices: SUBJECTS,
        demandOption: true,
        describe:
          'gyro: still log; accel: still poses; mag, delay: rotation log or walks; noise: still log; walkers: walks of known length',
      })
      .positional('campaign', { type: 'string', demandOption: true, describe: 'campaign folder' })
      .option('walk', {
        type: 'string',
        array: true,
        default: [] as string[],
        describe: 'logs to use; default all',
      })
      .option('device', {
        type: 'string',
        requiresArg: true,
        describe: 'device name, where walks.csv has none',
      })
      .option('fit', {
        choices: ['bias', 'scales', 'full'] as const,
        describe: 'zero only (default for gyro), scales too, or angles as well (default for accel and mag)',
      })
      .option('kind', {
        choices: ['overlapping-allan', 'modified-allan', 'overlapping-hadamard'] as const,
        default: 'overlapping-allan' as const,
        describe: 'noise: the deviation',
      })
      .option('plot', {
        type: 'string',
        requiresArg: true,
        describe: 'noise: write plots to FILE-accel.svg and FILE-gyro.svg',
      })
      .option('recipe', {
        type: 'string',
        requiresArg: true,
        describe: 'walkers: recipe whose steps are used',
      })
      .option('jobs', { type: 'number', requiresArg: true, describe: 'walkers: walks at a time' }),
  examples: [
    ['treadline calibrate accel bench --walk poses', 'accelerometer from six or more still poses'],
    ['treadline calibrate noise bench --walk still', 'Allan deviations and what they say'],
    ['treadline calibrate walkers trial', "step-length constants from walks.csv's distance_m"],
  ],
  run(options, io) {
    switch (options.what) {
      case 'gyro':
      case 'accel':
      case 'mag':
        return device(options.what, options, io);
      case 'delay':
        return delay(options, io);
      case 'noise':
        return noise(options, io);
      case 'walkers':
        return walkers(options, io);
      default:
        return options.what satisfies never;
    }
  },
};

type Given = CalibrateOptions & SharedOptions;

async function device(sensor: CalibratedSensor, given: Given, io: Io): Promise<ExitCode> {
  const { calibrateDevice } = await import('../pipeline/calibrate-device.js');
  const { campaign, walk, device: name, fit: shape, json, quiet } = given;
  const found = await calibrateDevice(campaign, sensor, { walks: walk, device: name, shape });
  if (json) io.out(`${JSON.stringify(found, null, 2)}\n`);
  else {
    const { deviceFitText } = await import('./calibration-text.js');
    io.out(deviceFitText(found));
    if (!quiet) io.err(`written to ${found.path}; "run" uses it from now on\n`);
  }
  return 0;
}

async function delay({ campaign, walk, device: name, json, quiet }: Given, io: Io): Promise<ExitCode> {
  const { calibrateDelay } = await import('../pipeline/calibrate-device.js');
  const found = await calibrateDelay(campaign, { walks: walk, device: name });
  if (json) io.out(`${JSON.stringify(found, null, 2)}\n`);
  else {
    const { delayText } = await import('./calibration-text.js');
    io.out(delayText(found));
    if (!quiet) io.err(`written to ${found.path}; "run" uses it from now on\n`);
  }
  return 0;
}

async function noise({ campaign, walk, kind, plot, json, quiet }: Given, io: Io): Promise<ExitCode> {
  if (walk.length !== 1)
    throw new InputError(
      'usage',
      '--walk: calibrate noise needs the name of one log in which the device lay still',
    );
  const { noiseOfLog } = await import('../pipeline/noise-of-log.js');
  const axes = await noiseOfLog(campaign, walk[0]!, kind);
  const { noiseJson, noiseText } = await import('./calibration-text.js');
  io.out(json ? `${JSON.stringify(noiseJson(axes), null, 2)}\n` : noiseText(axes));
  if (plot !== undefined) {
    const { noisePlot } = await import('../report/noise-plot.js');
    const { writeText } = await import('../tables/write.js');
    for (const [sensor, unit] of [
      ['accel', 'm/s2'],
      ['gyro', 'rad/s'],
    ] as const) {
      const curves = axes.filter((axis) => axis.sensor === sensor);
      if (curves.length === 0) continue;
      const path = `${plot.replace(/\.svg$/, '')}-${sensor}.svg`;
      writeText(path, noisePlot(sensor, unit, curves));
      if (!quiet) io.err(`plot in ${path}\n`);
    }
  }
  return 0;
}

async function walkers({ campaign, walk, recipe, jobs, json, quiet }: Given, io: Io): Promise<ExitCode> {
  const { calibrateWalkers } = await import('../pipeline/calibrate-walkers.js');
  const progress = progressLine(io, quiet);
  let fit: Awaited<ReturnType<typeof calibrateWalkers>>;
  try {
    fit = await calibrateWalkers(campaign, {
      walks: walk,
      recipe,
      jobs,
      onWalk: ({ walk: name }, done, total) => progress.update(done, total, name),
    });
  } finally {
    progress.end();
  }
  if (json) {
    const { walkers: constants, groups, ...rest } = fit;
    io.out(
      `${JSON.stringify({ ...rest, walkers: Object.fromEntries(constants), groups: Object.fromEntries(groups) }, null, 2)}\n`,
    );
  } else {
    const { walkersFitText } = await import('./calibration-text.js');
    io.out(walkersFitText(fit));
    if (!quiet)
      io.err(
        `${paint(io, 'faint', `${fit.paths.length} files in ${campaign}/calibrations; "run" uses them from now on`)}\n`,
      );
  }
  return 0;
}
