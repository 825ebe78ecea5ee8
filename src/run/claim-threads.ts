import { ProblemError } from '../errors/problem.ts';
import type { Judge } from '../search/share-blocks.ts';
import type { ShelfFolders } from '../shelf/sheet-files.ts';
import type { RunSettings } from './settings.ts';
import { openThread, type Thread, unexpected } from './thread.ts';
import type { Unit } from './vetter.ts';

export interface ClaimWork {
  readonly folders: ShelfFolders;
  readonly settings: RunSettings;
  readonly unit: Unit;
  /** What the claim that the workers read must be; see claimIdentity. */
  readonly identity: string;
}

/** Worker threads that judge boxes of one claim. */
export interface ClaimThreads {
  /** Starts the threads; each promise is kept when its thread is ready, and broken when it cannot be. */
  start(): Promise<Judge>[];
  close(): Promise<void>;
}

export function openClaimThreads(script: URL, count: number, work: ClaimWork): ClaimThreads {
  const threads: Thread[] = [];
  return {
    start() {
      threads.push(...Array.from({ length: count }, () => openThread(script)));
      return threads.map((thread) => makeReady(thread, work));
    },
    async close() {
      await Promise.all(threads.map((thread) => thread.close()));
    },
  };
}

async function makeReady(thread: Thread, { folders, settings, unit, identity }: ClaimWork): Promise<Judge> {
  thread.tell({ kind: 'begin', folders, settings });
  const ready = await thread.ask({ kind: 'claim', unit, identity });
  if (ready.kind === 'problems') throw new ProblemError(ready.problems);
  if (ready.kind !== 'ready') throw unexpected(ready);
  return async (block) => {
    const reply = await thread.ask({ kind: 'boxes', block }, [block.buffer]);
    if (reply.kind !== 'judged') throw unexpected(reply);
    return reply;
  };
}
