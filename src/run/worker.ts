import { parentPort } from 'node:worker_threads';
import { type Answer, answerUnit, type Order } from './answer.ts';
import { Vetter } from './vetter.ts';

/** A worker thread: told the circumstances once in a run, then one unit after the other. */
let vetter: Vetter | undefined;

parentPort?.on('message', (order: Order) => {
  if (order.kind === 'begin') vetter = new Vetter(order.folders, order.settings);
  else if (vetter !== undefined) {
    const answer = answerUnit(vetter, order.unit, (subject, points) =>
      parentPort?.postMessage({ kind: 'progress', subject, points } satisfies Answer),
    );
    parentPort?.postMessage(answer);
  }
});
