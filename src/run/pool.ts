import { Worker } from 'node:worker_threads';
import type { Answer, Order, UnitAnswer } from './answer.ts';
import { makeQueue } from './queue.ts';
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
  const idle: Worker[] = [];
  const all = new Set<Worker>();

  function start(): Worker {
    const worker = new Worker(script);
    all.add(worker);
    return worker;
  }

  async function serve(begin: Begin, next: (last: Unit | undefined) => Unit | undefined, listener: PoolListener) {
    let worker: Worker | undefined;
    let last: Unit | undefined;
    for (let unit = next(last); unit !== undefined; unit = next(last)) {
      if (worker === undefined) {
        worker = idle.pop() ?? start();
        worker.postMessage(begin);
      }
      const answer = await ask(worker, unit, listener.onProgress);
      if (answer.kind === 'fault' && answer.died) {
        all.delete(worker);
        worker = undefined;
      }
      listener.onAnswer(unit, answer);
      last = unit;
    }
    if (worker !== undefined) idle.push(worker);
  }

  return {
    async run(begin, units, listener) {
      const next = makeQueue(units);
      const servers = Array.from({ length: Math.min(size, units.length) }, () => serve(begin, next, listener));
      await Promise.all(servers);
    },
    async close() {
      await Promise.all([...all].map((worker) => worker.terminate()));
      all.clear();
      idle.length = 0;
    },
  };
}

type PoolAnswer = Exclude<UnitAnswer, { kind: 'fault' }> | (Extract<UnitAnswer, { kind: 'fault' }> & { died?: true });

function ask(worker: Worker, unit: Unit, onProgress: PoolListener['onProgress']): Promise<PoolAnswer> {
  return new Promise((resolve) => {
    const finish = (answer: PoolAnswer) => {
      worker.off('message', onMessage).off('error', onError).off('exit', onExit);
      resolve(answer);
    };
    const onMessage = (answer: Answer) => {
      if (answer.kind === 'progress') onProgress(answer.subject, answer.points);
      else finish(answer);
    };
    const onError = (error: Error) => finish({ kind: 'fault', message: `a worker died: ${error.message}`, died: true });
    const onExit = (code: number) =>
      finish({ kind: 'fault', message: `a worker ended with status ${code}`, died: true });
    worker.on('message', onMessage).once('error', onError).once('exit', onExit);
    worker.postMessage({ kind: 'unit', unit } satisfies Order);
  });
}
