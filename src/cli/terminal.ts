import type { Readable } from 'node:stream';

/** What a command may know of the world around it, so that a test can stand in for it. */
export interface Terminal {
  readonly writeOut: (text: string) => void;
  readonly writeErr: (text: string) => void;
  readonly readInput: () => Promise<string>;
  /** Columns of a line of output. */
  readonly width: number;
  readonly colour: boolean;
  /** Whether a person watches the error stream. */
  readonly watched: boolean;
}

/** Width of output that goes to a file or a pipe. */
export const plainWidth = 100;
const narrowest = 40;

type Environment = Readonly<Record<string, string | undefined>>;
type Stream = Pick<NodeJS.WriteStream, 'isTTY' | 'columns'>;

export function processTerminal(): Terminal {
  const { stdout, stderr, stdin, env } = process;
  return {
    writeOut: (text) => void stdout.write(text),
    writeErr: (text) => void stderr.write(text),
    readInput: () => readAll(stdin),
    width: widthOf(stdout, env),
    colour: coloursIn(stdout, env),
    watched: stderr.isTTY === true && env.TERM !== 'dumb',
  };
}

/** The columns of a terminal; COLUMNS, or 100, when there is none. */
export function widthOf(stream: Stream, environment: Environment): number {
  const columns = stream.isTTY === true ? stream.columns : Number(environment.COLUMNS);
  return Number.isInteger(columns) && columns >= narrowest ? columns : plainWidth;
}

/** NO_COLOR (not empty) forbids colour, FORCE_COLOR (not 0) asks for it, else a terminal decides. */
export function coloursIn(stream: Stream, environment: Environment): boolean {
  const { NO_COLOR, FORCE_COLOR, TERM } = environment;
  if (NO_COLOR !== undefined && NO_COLOR !== '') return false;
  if (FORCE_COLOR !== undefined) return FORCE_COLOR !== '0' && FORCE_COLOR !== 'false';
  return stream.isTTY === true && TERM !== 'dumb';
}

async function readAll(stream: Readable): Promise<string> {
  const chunks: Buffer[] = [];
  for await (const chunk of stream) chunks.push(Buffer.from(chunk));
  return Buffer.concat(chunks).toString('utf8');
}
