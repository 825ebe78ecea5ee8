import { fileFault } from '../errors/file-fault.ts';
import { runProgram } from './program.ts';
import { exitStatus } from './status.ts';
import { processTerminal } from './terminal.ts';

// A reader that has seen enough (head, less) closes the pipe; that is no fault and leaves the exit status as it is.
// Any other fault of a stream (a full disk) ends the program.
for (const stream of [process.stdout, process.stderr]) {
  stream.on('error', (error: NodeJS.ErrnoException) => {
    if (error.code === 'EPIPE') return;
    if (stream === process.stdout) {
      process.stderr.write(`standard output: cannot write: ${fileFault(error)} [output-unwritable]\n`);
    }
    process.exit(exitStatus.faultyRequest);
  });
}

process.exitCode = await runProgram(
  process.argv.slice(2),
  processTerminal(),
  (process.env.RUNGCHECK_TRACE ?? '') !== '',
);
