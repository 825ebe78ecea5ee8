import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { ProblemError } from '../errors/problem.ts';
import type { ClaimFields } from '../finding/certificate.ts';
import type { Claim } from '../proof/claim.ts';
import { decideTogether } from '../proof/decide-claim.ts';
import { claimIdentity } from '../proof/search-state.ts';
import { percentText } from '../report/number-text.ts';
import { openClaimThreads } from '../run/claim-threads.ts';
import { builtFolder } from '../run/program-files.ts';
import { BoxSearch, type BranchOptions } from '../search/box-search.ts';
import type { SharedResult } from '../search/share-blocks.ts';
import { settle } from './problems.ts';
import { progressLine } from './progress.ts';
import type { ProveRequest } from './prove-request.ts';
import { readSearchState, writeSearchState, wrongState } from './search-state-file.ts';
import { onFirstSignal } from './signals.ts';
import type { Terminal } from './terminal.ts';

/** Milliseconds between states that are kept while the search goes on. */
const betweenStates = 60_000;

export interface SearchedProof {
  readonly result: SharedResult;
  /** What has been judged; see BoxSearch. */
  readonly judged: string;
  /** The status to end with, when a signal has come. */
  readonly signalStatus: number | undefined;
}

/**
 * Decides the claim of a request, going on from the state when there is one, with progress on the terminal. Every thread
 * but this one needs the built program; without it (in tests) this one does everything. A ProblemError for a state of
 * another claim.
 */
export async function searchProof(
  request: ProveRequest,
  claim: Claim,
  fields: ClaimFields,
  { state, keepTree }: { readonly state: string | undefined; readonly keepTree: boolean },
  terminal: Terminal,
): Promise<SearchedProof> {
  const { sheet, condition, folders, settings, budget, jobs } = request;
  const constraint = condition.definition.id;
  const judged = state === undefined ? '' : settle(readSearchState(state, fields, claim));
  const built = builtFolder();
  const threads =
    built === undefined
      ? undefined
      : openClaimThreads(pathToFileURL(join(built, 'worker.js')), jobs - 1, {
          ...{ folders, settings, unit: { sheet, constraint } },
          identity: claimIdentity(fields, claim),
        });
  const progress = progressLine(terminal, Date.now, 'boxes');
  const interruption = new AbortController();
  let signalStatus: number | undefined;
  const release = onFirstSignal((status) => {
    signalStatus = status;
    interruption.abort();
  });
  try {
    let kept = Number.POSITIVE_INFINITY;
    const onBoxes = (boxes: number, undecided: number) => {
      progress.report(constraint, boxes, `${percentText(undecided)} undecided`);
      if (state === undefined || Date.now() - kept < betweenStates) return;
      kept = Date.now();
      keepMeanwhile(() => writeSearchState(state, fields, claim, search.judged));
    };
    const search = openSearch(claim, { budget, keepTree, judged, onBoxes }, state);
    kept = Date.now();
    const result = await decideTogether(claim, search, { helpers: threads?.start, signal: interruption.signal });
    return { result, judged: search.judged, signalStatus };
  } finally {
    release();
    progress.end();
    await threads?.close();
  }
}

/** So that a machine that goes down costs minutes. No reason to end a search: the last state tells of its fault. */
function keepMeanwhile(write: () => void): void {
  try {
    write();
  } catch (error) {
    if (!(error instanceof ProblemError)) throw error;
  }
}

function openSearch({ axes }: Claim, options: BranchOptions, state: string | undefined): BoxSearch {
  try {
    return new BoxSearch(axes, options);
  } catch (error) {
    if (state === undefined || !(error instanceof RangeError)) throw error;
    throw new ProblemError([wrongState(state, `the state is damaged: ${error.message}`)]);
  }
}
