import type { Terminal } from './terminal.ts';

export interface ProgressLine {
  readonly report: (subject: string, points: number) => void;
  /** Takes the line away. */
  readonly end: () => void;
}

/** Nothing is shown of a run that is over before this. */
const patience = 1000;
const interval = 100;

/** One line on the error stream that tells how far a long run is; silent when nobody watches. */
export function progressLine(
  terminal: Pick<Terminal, 'writeErr' | 'watched'>,
  clock: () => number,
  things = 'points',
): ProgressLine {
  const start = clock();
  let written = start + patience - interval;
  let points = 0;
  let shown = false;
  return {
    report(subject, more) {
      points += more;
      if (!terminal.watched || clock() - written < interval) return;
      written = clock();
      shown = true;
      const seconds = Math.floor((written - start) / 1000);
      terminal.writeErr(`\r\u001b[K${subject}: ${(points / 1e6).toFixed(1)} million ${things} looked at, ${seconds} s`);
    },
    end() {
      if (shown) terminal.writeErr('\r\u001b[K');
      shown = false;
    },
  };
}
