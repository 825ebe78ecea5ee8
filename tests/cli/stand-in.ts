import { runProgram } from '../../src/cli/program.ts';
import type { Terminal } from '../../src/cli/terminal.ts';

export interface Ran {
  readonly status: number;
  readonly out: string;
  readonly err: string;
}

/** Runs the program in this process, with the given text as standard input. */
export async function run(args: readonly string[], input = ''): Promise<Ran> {
  let out = '';
  let err = '';
  const terminal: Terminal = {
    writeOut: (text) => {
      out += text;
    },
    writeErr: (text) => {
      err += text;
    },
    readInput: async () => input,
    width: 100,
    colour: false,
    watched: false,
  };
  return { status: await runProgram(args, terminal), out, err };
}
