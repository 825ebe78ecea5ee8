import { makeRecheck, type RecheckWork } from '../proof/recheck.ts';
import { openThread, unexpected } from './thread.ts';

/** A few tenths of a second of work. */
const usualBlock = 4096;

/** With fewer boxes threads would take longer to start than they save. */
const usuallyFew = 40_000;

export interface RecheckOptions {
  /** The built worker; without it this thread does everything. */
  readonly script: URL | undefined;
  readonly jobs: number;
  readonly onBoxes: (boxes: number) => void;
  /** Of fewer boxes this thread does everything. */
  readonly fewBoxes?: number;
  /** Boxes that are checked at a time. */
  readonly blockSize?: number;
}

/**
 * The index of the first box (rows of lower, upper of each axis in turn) that does not hold, −1 when all do; the same for
 * any number of threads.
 */
export async function recheckBoxes(work: RecheckWork, boxes: Float64Array, options: RecheckOptions): Promise<number> {
  const { script, jobs, onBoxes, fewBoxes = usuallyFew, blockSize = usualBlock } = options;
  const width = 2 * work.axes.length;
  if (width === 0) return makeRecheck(work)(new Float64Array(0));
  const count = boxes.length / width;
  const threads =
    script === undefined || jobs === 1 || count < fewBoxes
      ? []
      : Array.from({ length: jobs }, () => openThread(script));
  let begun = 0;
  let failing = -1;

  /** Takes one block after the other; none behind a box that does not hold. */
  async function serve(check: (block: Float64Array<ArrayBuffer>) => Promise<number>): Promise<void> {
    while (begun < count && failing < 0) {
      const first = begun;
      begun = Math.min(count, first + blockSize);
      const size = begun - first;
      const found = await check(boxes.slice(first * width, begun * width));
      if (found >= 0 && (failing < 0 || first + found < failing)) failing = first + found;
      onBoxes(size);
    }
  }

  try {
    if (threads.length === 0) {
      const recheck = makeRecheck(work);
      await serve(async (block) => recheck(block));
    } else {
      await Promise.all(
        threads.map(async (thread) => {
          const ready = await thread.ask({ kind: 'recheck', work });
          if (ready.kind !== 'ready') throw unexpected(ready);
          await serve(async (block) => {
            const reply = await thread.ask({ kind: 'leaves', boxes: block }, [block.buffer]);
            if (reply.kind !== 'rechecked') throw unexpected(reply);
            return reply.failing;
          });
        }),
      );
    }
  } finally {
    await Promise.all(threads.map((thread) => thread.close()));
  }
  return failing;
}
