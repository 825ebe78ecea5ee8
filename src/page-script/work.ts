import type { KernelRecord } from '../page/page-data.ts';
import { type ProjectionRequest, type ProjectionResult, project } from './projection.ts';

/** To the worker: the records once, then pictures to compute, the pressing ones before the others. */
export type WorkMessage =
  | { readonly kind: 'records'; readonly records: readonly KernelRecord[] }
  | { readonly kind: 'draw'; readonly id: number; readonly rank: number; readonly request: ProjectionRequest }
  | { readonly kind: 'forget'; readonly id: number };

export interface WorkAnswer {
  readonly id: number;
  readonly result: ProjectionResult;
}

interface Job {
  readonly id: number;
  readonly rank: number;
  readonly steps: Generator<undefined, ProjectionResult>;
}

/** Computes what is asked, lowest rank first; between two parts of a picture it looks for new messages. */
export function serveWork(scope: { onmessage: unknown; postMessage(message: WorkAnswer): void }): void {
  let records: readonly KernelRecord[] = [];
  let jobs: Job[] = [];
  const pause = new MessageChannel();
  let isRunning = false;
  const run = () => {
    if (isRunning || jobs.length === 0) return;
    isRunning = true;
    pause.port2.postMessage(null);
  };
  pause.port1.onmessage = () => {
    isRunning = false;
    const job = jobs.reduce<Job | undefined>(
      (best, other) => (best === undefined || other.rank < best.rank ? other : best),
      undefined,
    );
    if (job === undefined) return;
    const until = performance.now() + 12;
    let step = job.steps.next();
    while (step.done !== true && performance.now() < until) step = job.steps.next();
    if (step.done === true) {
      jobs = jobs.filter((other) => other !== job);
      scope.postMessage({ id: job.id, result: step.value });
    }
    run();
  };
  scope.onmessage = ({ data }: { data: WorkMessage }) => {
    if (data.kind === 'records') records = data.records;
    else jobs = jobs.filter(({ id }) => id !== data.id);
    if (data.kind === 'draw') {
      const steps = project(records[data.request.kernel] as KernelRecord, data.request);
      jobs.push({ id: data.id, rank: data.rank, steps });
    }
    run();
  };
}

export interface Office {
  /** Asks for a picture; answers a number by which it can be forgotten. */
  ask(rank: number, request: ProjectionRequest, done: (result: ProjectionResult) => void): number;
  forget(id: number): void;
}

/** The worker, made from the page's own two scripts. */
export function openOffice(sources: readonly string[], records: readonly KernelRecord[]): Office {
  const address = URL.createObjectURL(new Blob([...sources], { type: 'text/javascript' }));
  const worker = new Worker(address);
  const waiting = new Map<number, (result: ProjectionResult) => void>();
  let count = 0;
  const send = (message: WorkMessage) => worker.postMessage(message);
  worker.onmessage = ({ data }: { data: WorkAnswer }) => {
    const done = waiting.get(data.id);
    waiting.delete(data.id);
    done?.(data.result);
  };
  send({ kind: 'records', records });
  return {
    ask(rank, request, done) {
      const id = ++count;
      waiting.set(id, done);
      send({ kind: 'draw', id, rank, request });
      return id;
    },
    forget(id) {
      waiting.delete(id);
      send({ kind: 'forget', id });
    },
  };
}
