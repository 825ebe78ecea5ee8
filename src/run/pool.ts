import type { Order, UnitAnswer } from './answer.ts';
import { makeQueue } from './queue.ts';
import { openThread, type Reply, type Thread, unexpected } from './thread.ts';
import type { Unit } from './vetter.ts';

type Begin = Extract<Order, { kind: 'begin' }>;

/** Something that answers units, in any order; `onAnswer` is called once for each. */
export interface Pool {
  run(begin: Begin, units: readonly Unit[], listener: PoolListener): Promise<void>;
  close(): Promise<void>;
}

export interface PoolListener {
  readonly onAnswer: (unit: Unit, answer: UnitAnswer) => void;
  readonly onProgress: (subject: string, points: number) => void;
}

/** Worker threads, started when first needed and kept until closed. One that dies costs the unit it was at. */
export function openPool(script: URL, size: number): Pool {
  const idle: Thread[] = [];
  const all = new Set<Thread>();

  function start(): Thread {
    const thread = openThread(script);
    all.add(thread);
    return thread;
  }

  async function serve(
    begin: Begin,
    next: (last: Unit | undefined) => Unit | undefined,
    { onAnswer, onProgress }: PoolListener,
  ) {
    let thread: Thread | undefined;
    let last: Unit | undefined;
    for (let unit = next(last); unit !== undefined; unit = next(last)) {
      if (thread === undefined) {
        thread = idle.pop() ?? start();
        thread.tell(begin);
      }
      const reply = await thread.ask({ kind: 'unit', unit }, [], ({ subject, points }) => onProgress(subject, points));
      if (reply.kind === 'died') {
        all.delete(thread);
        thread = undefined;
      }
      onAnswer(unit, unitAnswer(reply));
      last = unit;
    }
    if (thread !== undefined) idle.push(thread);
  }

  return {
    async run(begin, units, listener) {
      const next = makeQueue(units);
      const servers = Array.from({ length: Math.min(size, units.length) }, () => serve(begin, next, listener));
      await Promise.all(servers);
    },
    async close() {
      await Promise.all([...all].map((thread) => thread.close()));
      all.clear();
      idle.length = 0;
    },
  };
}

function unitAnswer(reply: Reply): UnitAnswer {
  switch (reply.kind) {
    case 'died':
      return { kind: 'fault', message: reply.message };
    case 'ready':
    case 'judged':
    case 'rechecked':
      throw unexpected(reply);
    default:
      return reply;
  }
}
