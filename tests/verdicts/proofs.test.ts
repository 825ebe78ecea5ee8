import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import { keyOf, outcomes, type ProofRow, pointwisePairs, proofsFile, proofsHead, readProofs } from './proof-rows.ts';
import { proofSummary, withSummary } from './proof-summary.ts';

/** Pairs of which the scan says `holds` and boxes prove a violation, and why that is. */
const explained = new Map<string, string>([]);

const rows = readProofs();

describe('the committed table of proofs', () => {
  test('has the expected columns', () => {
    expect(readFileSync(proofsFile, 'utf8').split('\n')[0]).toBe(proofsHead);
  });

  test('has every pointwise pair of the table of verdicts, in its order, with its verdict', () => {
    const pairs = pointwisePairs();
    expect(rows.map(keyOf)).toEqual(pairs.map(keyOf));
    expect(rows.map(({ verdict }) => verdict)).toEqual(pairs.map(({ verdict }) => verdict));
  });

  test('proves no violation of what holds, unless explained', () => {
    const contradicted = rows.filter(({ verdict, violated }) => verdict === 'holds' && violated > 0).map(keyOf);
    expect(contradicted).toEqual([...explained.keys()]);
  });

  test('proves nothing that is violated', () => {
    expect(rows.filter(({ verdict, outcome }) => verdict === 'violated' && outcome === 'proved')).toEqual([]);
  });

  test('has in each row the shares of its outcome', () => {
    expect(rows.filter((row) => !isConsistent(row))).toEqual([]);
  });

  test('is summed up beside it as it is', () => {
    const readme = readFileSync('tests/verdicts/README.md', 'utf8');
    expect(readme).toBe(withSummary(readme, proofSummary(rows)));
  });
});

function isConsistent({ outcome, boxes, proved, violated, undecided }: ProofRow): boolean {
  const isOpen = outcome === 'undecided' || outcome === 'unresolved';
  return (
    outcomes.includes(outcome) &&
    // Three digits of each are kept.
    Math.abs(proved + violated + undecided - 1) <= 0.002 &&
    violated > 0 === (outcome === 'violation proved') &&
    (outcome !== 'proved' || (proved === 1 && undecided === 0)) &&
    (!isOpen || undecided > 0) &&
    boxes > 0 === (outcome !== 'not provable')
  );
}
