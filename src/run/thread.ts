import { type TransferListItem, Worker } from 'node:worker_threads';
import type { Answer, Order, Progress } from './answer.ts';

/** What becomes of an order: the worker's answer, or that it died. */
export type Reply = Exclude<Answer, Progress> | { readonly kind: 'died'; readonly message: string };

/** A worker thread. It answers orders in turn; of a dead one all are answered at once. */
export interface Thread {
  /** An order that is not answered. */
  tell(order: Order): void;
  /** What is in `transfer` belongs to the worker from now on. */
  ask(order: Order, transfer?: readonly TransferListItem[], onProgress?: (told: Progress) => void): Promise<Reply>;
  close(): Promise<void>;
}

export function openThread(script: URL): Thread {
  const worker = new Worker(script);
  const waiting: { readonly reply: (reply: Reply) => void; readonly onProgress: (told: Progress) => void }[] = [];
  let death: string | undefined;

  function die(message: string): void {
    death ??= message;
    for (const { reply } of waiting.splice(0)) reply({ kind: 'died', message: death });
  }

  worker.on('message', (answer: Answer) => {
    if (answer.kind === 'progress') waiting[0]?.onProgress(answer);
    else waiting.shift()?.reply(answer);
  });
  worker.on('error', (error: Error) => die(`a worker died: ${error.message}`));
  worker.on('exit', (code: number) => die(`a worker ended with status ${code}`));
  return {
    tell: (order) => worker.postMessage(order),
    ask(order, transfer = [], onProgress = () => {}) {
      return new Promise((reply) => {
        if (death !== undefined) return reply({ kind: 'died', message: death });
        waiting.push({ reply, onProgress });
        worker.postMessage(order, transfer);
      });
    },
    async close() {
      await worker.terminate();
    },
  };
}

/** The fault that a reply is where another one was asked for. */
export function unexpected(reply: Reply): Error {
  return new Error('message' in reply ? reply.message : `a worker answers with ${reply.kind}`);
}
