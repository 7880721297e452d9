#!/usr/bin/env node
import { reportError } from './exit.ts';
import { runProgram } from './program.ts';

// A reader that has seen enough, such as `head`, closes its end of the pipe: no reason to fail.
for (const stream of [process.stdout, process.stderr]) {
  stream.on('error', (error: NodeJS.ErrnoException) => {
    if (error.code !== 'EPIPE' && error.code !== 'ERR_STREAM_DESTROYED') throw error;
  });
}
process.on('uncaughtException', (error) => process.exit(reportError(error)));

// Set, not passed to process.exit(): what is still on its way to a pipe gets there.
process.exitCode = await runProgram(process.argv.slice(2));
