import type { Argv, CommandModule } from 'yargs';
import type { Io } from './io.js';

/** What every command takes. */
export interface SharedOptions {
  json: boolean;
  quiet: boolean;
}

/** Exit codes, as the README lists them. */
export type ExitCode = 0 | 1 | 2;

/** One command: its words, its options, and what it does; heavy modules are loaded only when it runs. */
export interface Command<Options extends object> {
  /** The name and its positional arguments. */
  usage: string;
  /** One line for the list of commands. */
  summary: string;
  options(yargs: Argv<SharedOptions>): Argv<Options & SharedOptions>;
  /** Command lines with what they do. */
  examples: readonly (readonly [string, string])[];
  run(options: Options & SharedOptions, io: Io): Promise<ExitCode>;
}

/** Ties a command into yargs; its exit code goes to `done`. */
export function commandModule<Options extends object>(
  command: Command<Options>,
  io: Io,
  done: (code: ExitCode) => void,
): CommandModule<SharedOptions, Options & SharedOptions> {
  return {
    command: command.usage,
    describe: command.summary,
    builder: (yargs) => {
      const built = command.options(yargs);
      for (const [line, what] of command.examples) built.example(line, what);
      return built;
    },
    handler: async (argv) => {
      done(await command.run(argv as unknown as Options & SharedOptions, io));
    },
  };
}
