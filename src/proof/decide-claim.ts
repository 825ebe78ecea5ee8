import {
  type BoxSearch,
  type BranchOptions,
  type BranchResult,
  blockJudge,
  branchAndBound,
  type JudgeBlock,
} from '../search/box-search.ts';
import { type SharedResult, type SharedSearchOptions, searchTogether } from '../search/share-blocks.ts';
import type { Claim } from './claim.ts';
import { boxJudge } from './judge-box.ts';

/** Tries to decide a claim by branch and bound in this thread; see BranchResult. */
export function decideClaim(claim: Claim, options: BranchOptions): BranchResult {
  return branchAndBound(claim.axes, boxJudge(claim), options);
}

/** Ends a search for a claim with the help of other threads, or early at a signal. */
export function decideTogether(claim: Claim, search: BoxSearch, sharing: SharedSearchOptions): Promise<SharedResult> {
  return searchTogether(search, claimJudge(claim), sharing);
}

/** Judges blocks of boxes of a claim. */
export function claimJudge(claim: Claim): JudgeBlock {
  return blockJudge(claim.axes.length, boxJudge(claim));
}
