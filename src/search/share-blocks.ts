import { type Block, blockRows } from './box-blocks.ts';
import type { BoxSearch, BranchResult, JudgeBlock } from './box-search.ts';

export interface JudgedBlock {
  readonly block: Block;
  readonly judgements: Int8Array;
}

/** Someone who judges blocks. The block given is theirs until they give one with the same rows back. */
export type Judge = (block: Block) => Promise<JudgedBlock>;

export interface SharedSearchOptions {
  /** Those who help, each as soon as it is ready; asked for only when the search turns out to be a long one. */
  readonly helpers?: (() => readonly Promise<Judge>[]) | undefined;
  /** Milliseconds without help. */
  readonly patience?: number;
  /** Ends the search early; what is judged by then is kept. */
  readonly signal?: AbortSignal | undefined;
}

export interface SharedResult extends Omit<BranchResult, 'stop'> {
  readonly stop: BranchResult['stop'] | 'interrupted';
}

/** About what a thread takes to start and to read its sheets. */
const usualPatience = 1000;
/** A smaller level leaves nothing for helpers. */
const enoughForHelpers = 2 * blockRows;

/** A helper has one block at hand and one waiting, so that it need not wait for this thread. */
const blocksOfHelper = 2;

/**
 * Ends a search with the help of others. This thread judges as well; between two blocks it attends to answers and to
 * signals. The result is that of the search in this thread alone. Rejects when a helper fails.
 */
export function searchTogether(
  search: BoxSearch,
  judgeBlock: JudgeBlock,
  { helpers = () => [], patience = usualPatience, signal }: SharedSearchOptions,
): Promise<SharedResult> {
  const crew: { readonly judge: Judge; readonly atOnce: number; busy: number }[] = [];
  /** Blocks in the order in which they were taken; each is accepted once those before it are. */
  const taken: { judged?: JudgedBlock }[] = [];
  const begun = performance.now();
  let called = false;
  let ended = false;

  return new Promise((resolve, reject) => {
    const fail = (reason: unknown) => {
      ended = true;
      reject(reason);
    };
    join(ownJudge(judgeBlock), 1);

    function join(judge: Judge, atOnce: number): void {
      // Helpers come first: this thread is busy for as long as it judges.
      crew.unshift({ judge, atOnce, busy: 0 });
      handOut();
    }

    function handOut(): void {
      if (ended) return;
      if (!called && performance.now() - begun >= patience && search.waiting > enoughForHelpers) {
        called = true;
        for (const helper of helpers()) helper.then((judge) => join(judge, blocksOfHelper)).catch(fail);
      }
      for (const member of crew) {
        while (member.busy < member.atOnce) {
          const block = signal?.aborted === true ? undefined : search.take();
          if (block === undefined) break;
          give(member, block);
        }
      }
      if (taken.length > 0) return;
      ended = true;
      const result = search.result();
      resolve(result.stop === 'budget' && signal?.aborted === true ? { ...result, stop: 'interrupted' } : result);
    }

    function give(member: (typeof crew)[number], block: Block): void {
      const place: (typeof taken)[number] = {};
      taken.push(place);
      member.busy++;
      const accept = (judged: JudgedBlock) => {
        member.busy--;
        place.judged = judged;
        for (let first = taken[0]; first?.judged !== undefined; first = taken[0]) {
          taken.shift();
          search.accept(first.judged.block, first.judged.judgements);
        }
        handOut();
      };
      member.judge(block).then(accept).catch(fail);
    }
  });
}

function ownJudge(judgeBlock: JudgeBlock): Judge {
  return async (block) => {
    await new Promise((resolve) => setImmediate(resolve));
    return { block, judgements: judgeBlock(block) };
  };
}
