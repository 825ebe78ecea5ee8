import { countText } from '../report/number-text.ts';
import type { Terminal } from './terminal.ts';

export interface ProgressLine {
  /** `note` is shown behind the count. */
  readonly report: (subject: string, points: number, note?: string) => void;
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
    report(subject, more, note) {
      points += more;
      if (!terminal.watched || clock() - written < interval) return;
      written = clock();
      shown = true;
      const seconds = Math.floor((written - start) / 1000);
      const number = points < 1e5 ? countText(points) : `${(points / 1e6).toFixed(1)} million`;
      const count = `${number} ${things} looked at`;
      const noted = note === undefined ? '' : `, ${note}`;
      terminal.writeErr(`\r\u001b[K${subject}: ${count}${noted}, ${seconds} s`);
    },
    end() {
      if (shown) terminal.writeErr('\r\u001b[K');
      shown = false;
    },
  };
}
