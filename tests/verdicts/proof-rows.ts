import { existsSync, readFileSync, renameSync, writeFileSync } from 'node:fs';
import { conditionOf } from '../constraint/catalogue.ts';
import { tableFile } from './shelf.ts';

export const proofsFile = 'tests/verdicts/proofs.csv';
export const proofsHead = 'functional,constraint,verdict,outcome,boxes,deepest,proved,violated,undecided';

/** A functional, a pointwise condition that applies to it, and the verdict of the table of verdicts. */
export interface Pair {
  readonly functional: string;
  readonly constraint: string;
  readonly verdict: string;
}

/**
 * `undecided` when the budget of boxes ended, `unresolved` when boxes became too small to divide, `not provable` when
 * boxes cannot decide the condition.
 */
export const outcomes = ['proved', 'violation proved', 'undecided', 'unresolved', 'not provable'] as const;
export type Outcome = (typeof outcomes)[number];

/** What boxes have decided of a pair: shares of the domain in the coordinates that run along the axes of the search. */
export interface ProofRow extends Pair {
  readonly outcome: Outcome;
  readonly boxes: number;
  readonly deepest: number;
  readonly proved: number;
  readonly violated: number;
  readonly undecided: number;
}

export const keyOf = ({ functional, constraint }: Pair): string => `${functional}:${constraint}`;

/** The pairs of the table of verdicts whose condition is pointwise, in its order. */
export function pointwisePairs(): Pair[] {
  const kinds = new Map<string, string>();
  const kindOf = (constraint: string): string => {
    const kind = kinds.get(constraint) ?? conditionOf(constraint).kind;
    kinds.set(constraint, kind);
    return kind;
  };
  return linesOf(tableFile)
    .map((line) => {
      const [functional, constraint, verdict] = line.split(',') as [string, string, string];
      return { functional, constraint, verdict };
    })
    .filter(({ constraint }) => kindOf(constraint) === 'pointwise');
}

export function readProofs(): ProofRow[] {
  if (!existsSync(proofsFile)) return [];
  return linesOf(proofsFile).map((line) => {
    const [functional, constraint, verdict, outcome, ...numbers] = line.split(',') as [string, string, string, Outcome];
    const [boxes, deepest, proved, violated, undecided] = (numbers as string[]).map(Number) as [
      ...[number, number],
      ...[number, number, number],
    ];
    return { functional, constraint, verdict, outcome, boxes, deepest, proved, violated, undecided };
  });
}

/** Writes the rows so that a reader finds the old file or the new one, and never a part. */
export function writeProofs(rows: readonly ProofRow[]): void {
  const lines = rows.map(({ functional, constraint, verdict, outcome, boxes, deepest, ...shares }) => {
    const { proved, violated, undecided } = shares;
    const judged = [boxes, deepest, ...[proved, violated, undecided].map(shownShare)];
    return [functional, constraint, verdict, outcome, ...judged].join(',');
  });
  writeFileSync(`${proofsFile}.new`, `${[proofsHead, ...lines].join('\n')}\n`);
  renameSync(`${proofsFile}.new`, proofsFile);
}

export function shownShare(share: number): number {
  return Number(share.toPrecision(3));
}

function linesOf(file: string): string[] {
  return readFileSync(file, 'utf8').trimEnd().split('\n').slice(1);
}
