import { writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import yargs, { type CommandModule } from 'yargs';
import { didYouMean } from '../campaign/nearest-name.js';
import { InputError } from '../errors.js';
import { VERSION } from '../version.js';
import { calibrateCommand } from './calibrate.js';
import { checkCommand } from './check.js';
import { type Command, commandModule, type ExitCode, type SharedOptions } from './command.js';
import { compareCommand } from './compare.js';
import { demoCommand } from './demo.js';
import type { Io } from './io.js';
import { runCommand } from './run.js';
import { scoreCommand } from './score.js';
import { showCommand } from './show.js';
import { simulateCommand } from './simulate.js';

/** Every command, in the order of the help. */
// biome-ignore lint/suspicious/noExplicitAny: each command has options of its own
const COMMANDS: readonly Command<any>[] = [
  demoCommand,
  checkCommand,
  runCommand,
  scoreCommand,
  compareCommand,
  showCommand,
  calibrateCommand,
  simulateCommand,
];

/**
 * Runs one command line.
 *
 * @param args - what follows `treadline`.
 * @returns the exit code: 0 done; 1 done, but something asked about failed; 2 wrong usage or unusable input.
 */
export async function runProgram(args: readonly string[], io: Io): Promise<ExitCode> {
  let code: ExitCode = 0;
  const parser = yargs([...args])
    .scriptName('treadline')
    .usage('$0 <command>\n\nFrom phone sensor logs of indoor-navigation trials to scored pedestrian paths.')
    .option('json', { type: 'boolean', default: false, describe: 'print results as JSON, nothing else' })
    .option('quiet', { type: 'boolean', default: false, describe: 'no progress and no notes' })
    .version(VERSION)
    .help()
    .wrap(Math.min(io.width, 110))
    .strict()
    .demandCommand(1, 'Name a command; "treadline --help" lists them.')
    .exitProcess(false)
    // A message of its own for what yargs says in two.
    .fail((message, error) => {
      throw error ?? new InputError('usage', message);
    });
  for (const command of COMMANDS)
    parser.command(
      commandModule(command, io, (result) => {
        code = result;
      }) as unknown as CommandModule<SharedOptions, SharedOptions>,
    );
  try {
    await parser.parseAsync([...args], {}, (_error, _argv, output) => {
      if (output) io.out(`${output}\n`);
    });
    return code;
  } catch (error) {
    return told(error, io, args);
  }
}

/** One line of what went wrong, and the exit code. */
function told(error: unknown, io: Io, args: readonly string[]): ExitCode {
  if (error instanceof InputError) {
    io.err(`${error.code === 'usage' ? usageLine(error.message, args) : error.message}\n`);
    return 2;
  }
  const { code, path, syscall } = error as NodeJS.ErrnoException;
  if (code && syscall) {
    io.err(`${path ?? syscall}: ${SYSTEM_FAULTS[code] ?? code}\n`);
    return 2;
  }
  const details = error instanceof Error ? (error.stack ?? error.message) : String(error);
  const file = join(tmpdir(), `treadline-fault-${process.pid}.txt`);
  writeFileSync(file, `treadline ${VERSION}, node ${process.version}\n${args.join(' ')}\n${details}\n`);
  io.err(
    `A fault of treadline itself, not of your data; details are in ${file}. Please report it with that file.\n`,
  );
  return 2;
}

const SYSTEM_FAULTS: Readonly<Record<string, string>> = {
  EACCES: 'permission denied; change its rights or name another place',
  EPERM: 'not permitted; change its rights or name another place',
  EROFS: 'the file system is read-only; name another place',
  ENOSPC: 'the disk is full; free some space and run again: what is done is kept',
  ENOENT: 'no such file or folder',
  ENOTDIR: 'not a folder',
  EISDIR: 'is a folder, must be a file',
  EMFILE: 'too many open files; use fewer --jobs',
};

/** yargs' message with a near name where an option is unknown. */
function usageLine(message: string, args: readonly string[]): string {
  const unknown = /^Unknown arguments?: (.*)$/.exec(message)?.[1]?.split(', ')[0];
  if (unknown === undefined) return message.replaceAll('\n', ' ');
  const names = COMMANDS.map(({ usage }) => usage.split(' ')[0]!);
  if (!names.includes(args.find((arg) => !arg.startsWith('-')) ?? ''))
    return `${unknown}: no such command; must be one of ${names.join(', ')}.${didYouMean(unknown, names)}`;
  const options = optionNames(args);
  return `--${unknown}: no such option here; "treadline ${args[0]} --help" lists them.${didYouMean(unknown, options)}`;
}

/** The options of the command that a command line names. */
function optionNames(args: readonly string[]): string[] {
  const command = COMMANDS.find(({ usage }) => args.includes(usage.split(' ')[0]!));
  const built = command?.options(yargs() as never) as
    | { getOptions?: () => { key: Record<string, unknown> } }
    | undefined;
  return ['json', 'quiet', ...Object.keys(built?.getOptions?.().key ?? {})];
}
