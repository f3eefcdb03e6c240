import type { Io } from '../../src/cli/io.js';
import { runProgram } from '../../src/cli/program.js';

export interface CliResult {
  code: number;
  out: string;
  err: string;
}

/** Runs one command line in this process, as a pipe would see it. */
export async function runCli(...args: string[]): Promise<CliResult> {
  const result: CliResult = { code: -1, out: '', err: '' };
  const io: Io = {
    out: (text) => {
      result.out += text;
    },
    err: (text) => {
      result.err += text;
    },
    isTerminal: false,
    width: 100,
    hasColour: false,
  };
  result.code = await runProgram(args, io);
  return result;
}
