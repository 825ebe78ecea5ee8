import type { Condition } from '../../src/constraint/condition.ts';
import { boxJudge } from '../../src/proof/judge-box.ts';
import { provableClaim } from '../../src/proof/prove.ts';
import { BoxSearch, blockJudge } from '../../src/search/box-search.ts';
import { conditionOf, functionalOf, standardSettings } from '../constraint/catalogue.ts';
import { type Outcome, type Pair, type ProofRow, shownShare } from './proof-rows.ts';

/** Boxes after which a proved violation ends a search: the line between the regions would take every budget. */
const enoughForViolation = 10_000;

/** Boxes after which a search that has decided nothing ends: as the identities on the seven axes of spin space. */
const enoughForNothing = 100_000;

/** Whether a search with so many boxes would end with the same row. */
export function isFinal({ outcome, boxes, proved, violated, undecided }: ProofRow, budget: number): boolean {
  if (boxes >= budget) return true;
  if (outcome === 'violation proved') return undecided === 0 || boxes >= enoughForViolation;
  return outcome !== 'undecided' || (proved + violated === 0 && boxes >= enoughForNothing);
}

/** Searches for a proof on the standard domain, in this thread: the same row for the same budget. */
export function provePair(pair: Pair, budget: number): ProofRow {
  const condition = conditionOf(pair.constraint) as Condition;
  const claim = provableClaim(condition, functionalOf(pair.functional), standardSettings);
  if (typeof claim === 'string')
    return { ...pair, outcome: 'not provable', boxes: 0, deepest: 0, proved: 0, violated: 0, undecided: 1 };
  let judged = 0;
  let isViolated = false;
  let isProved = false;
  const search = new BoxSearch(claim.axes, {
    budget,
    onBoxes: (more) => {
      judged += more;
    },
  });
  const judgeBox = boxJudge(claim);
  const judge = blockJudge(claim.axes.length, (boxes, offset) => {
    const judgement = judgeBox(boxes, offset);
    isViolated ||= judgement === 'violated';
    isProved ||= judgement === 'proved';
    return judgement;
  });
  for (let block = search.take(); block !== undefined; block = search.take()) {
    search.accept(block, judge(block));
    const enough = isViolated ? enoughForViolation : isProved ? budget : enoughForNothing;
    if (judged >= enough) break;
  }
  const { stop, boxes, deepest, proved, violated, undecided } = search.result();
  const open: Outcome = stop === 'resolution' ? 'unresolved' : 'undecided';
  const outcome = isViolated ? 'violation proved' : stop === 'decided' ? 'proved' : open;
  const shares = { proved: shownShare(proved), violated: shownShare(violated), undecided: shownShare(undecided) };
  return { ...pair, outcome, boxes, deepest, ...shares };
}
