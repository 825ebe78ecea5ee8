import { parentPort, type TransferListItem } from 'node:worker_threads';
import { makeRecheck } from '../proof/recheck.ts';
import type { JudgeBlock } from '../search/box-search.ts';
import { type Answer, answerUnit, type Order } from './answer.ts';
import { Vetter } from './vetter.ts';

/** A worker thread: told the circumstances once in a run, then one unit, or one block of boxes, after the other. */
let vetter: Vetter | undefined;
let judge: JudgeBlock | undefined;
let recheck: ReturnType<typeof makeRecheck> | undefined;

const answer = (told: Answer, transfer: readonly TransferListItem[] = []) => parentPort?.postMessage(told, transfer);

parentPort?.on('message', (order: Order) => {
  if (order.kind === 'begin') vetter = new Vetter(order.folders, order.settings);
  else if (order.kind === 'unit' && vetter !== undefined) {
    answer(answerUnit(vetter, order.unit, (subject, points) => answer({ kind: 'progress', subject, points })));
  } else if (order.kind === 'claim' && vetter !== undefined) {
    const found = vetter.claimJudge(order.unit, order.identity);
    if (found.ok) judge = found.value;
    answer(found.ok ? { kind: 'ready' } : { kind: 'problems', problems: found.problems });
  } else if (order.kind === 'boxes' && judge !== undefined) {
    const judgements = judge(order.block);
    answer({ kind: 'judged', block: order.block, judgements }, [order.block.buffer, judgements.buffer]);
  } else if (order.kind === 'recheck') {
    recheck = makeRecheck(order.work);
    answer({ kind: 'ready' });
  } else if (order.kind === 'leaves' && recheck !== undefined)
    answer({ kind: 'rechecked', failing: recheck(order.boxes) });
});
