import { describe, expect, test } from 'vitest';
import { randomNumbers, sampledOutside } from '../proof/sampled-outside.ts';
import { keyOf, type ProofRow, readProofs } from './proof-rows.ts';
import { provePair } from './prove-pair.ts';

const rows = readProofs();

/** So many of the rows, the same ones every time. */
function spread(among: readonly ProofRow[], count: number): ProofRow[] {
  const next = randomNumbers(7);
  const drawn = among.map((row) => ({ row, place: next() }));
  return drawn
    .sort((a, b) => a.place - b.place)
    .slice(0, count)
    .map(({ row }) => row);
}

describe('rows that few boxes decide are found again', () => {
  const fewBoxes = 400;
  const decided = ['proved', 'violation proved'];
  const cheap = rows.filter(({ outcome, boxes }) => decided.includes(outcome) && boxes < fewBoxes);
  test.each(spread(cheap, 40))('$functional $constraint', (row) => {
    const { functional, constraint, verdict } = row;
    expect(provePair({ functional, constraint, verdict }, fewBoxes)).toEqual(row);
  });
});

describe('what is proved has no sampled point outside', () => {
  const proved = rows.filter(({ outcome }) => outcome === 'proved');
  // RUNGCHECK_SAMPLES=1000000 npx vitest run tests/verdicts/reprove.test.ts samples every one of them, for minutes.
  const samples = process.env.RUNGCHECK_SAMPLES;
  const looked = samples === undefined ? spread(proved, 120) : proved;
  test.each(looked)(
    '$functional $constraint',
    (row) => {
      expect(sampledOutside(row.functional, row.constraint, Number(samples ?? 300)), keyOf(row)).toEqual([]);
    },
    3_600_000,
  );
});
