#!/usr/bin/env node
import { processIo } from './io.js';
import { runProgram } from './program.js';

// A reader that closes early (`| head`) is no fault.
process.stdout.on('error', (error: NodeJS.ErrnoException) => {
  if (error.code === 'EPIPE') process.exit(0);
  throw error;
});
process.exitCode = await runProgram(process.argv.slice(2), processIo());
