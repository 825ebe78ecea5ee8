import { runProgram } from './program.ts';
import { processTerminal } from './terminal.ts';

// A reader that has seen enough (head, less) closes the pipe; that is no fault and leaves the exit status as it is.
for (const stream of [process.stdout, process.stderr]) {
  stream.on('error', (error: NodeJS.ErrnoException) => {
    if (error.code !== 'EPIPE') throw error;
  });
}

process.exitCode = await runProgram(
  process.argv.slice(2),
  processTerminal(),
  (process.env.RUNGCHECK_TRACE ?? '') !== '',
);
