#!/usr/bin/env node
import { nodeIo } from './node-io.ts';
import { run } from './run.ts';

/** As for any file that cannot be read or written. */
const CANNOT_BE_WRITTEN = 3;

/** A reader that has seen enough, such as `head`, closes the pipe: no fault. */
process.stdout.on('error', (error: NodeJS.ErrnoException) => {
  if (error.code !== 'EPIPE') {
    process.stderr.write(`coneshift: cannot write the answer: ${error.message}\n`);
    process.exitCode = CANNOT_BE_WRITTEN;
    return;
  }
  process.exitCode = 0;
});
// Nobody is left to tell.
process.stderr.on('error', () => undefined);

const exitCode = await run(process.argv.slice(2), nodeIo());
process.exitCode ??= exitCode;
