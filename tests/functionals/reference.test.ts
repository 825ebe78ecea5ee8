import { describe, expect, test } from 'vitest';
import type { Functional } from '../../src/functional/functional.ts';
import { largestEnergyDeviation, missesGeneral, missesSlice } from './reference/compare.ts';
import { coarseReferences, publishedDifferences } from './reference/differences.ts';
import { evaluateGeneral, evaluateSlice } from './reference/evaluate.ts';
import { type Expectation, expectationsOf } from './reference/expected.ts';
import { sums } from './reference/sums.ts';
import { generalPoints, referenceRow, slicePoints, source } from './reference/values.ts';
import { onShelf, shelf } from './shelf.ts';

const ids = shelf.functionalIds();

describe(`every sheet equals the reference values (${source.slice(0, 12)}) to 1e-10 in energies, 1e-8 in derivatives`, () => {
  test.each(ids)('%s', (id) => {
    const functional = onShelf(id);
    const { expectations, missing } = expectationsOf(functional);
    // Without a reference row only an invented demonstration may stand on the shelf, and it must say so.
    if (!isInvented(functional)) expect(missing, 'parts without a reference row').toEqual([]);
    for (const expectation of expectations) {
      expect(missesOf(functional, expectation), `${id} ${expectation.part}, row of ${expectation.origin}`).toEqual([]);
    }
  });
});

describe('where the reference differs in a published constant, the sheet differs by no more than that constant makes', () => {
  test.each(publishedDifferences)('$functional $part: $constant', ({ functional: id, part, size }) => {
    const functional = onShelf(id);
    const expectation = expectationsOf(functional).expectations.find((one) => one.part === part) as Expectation;
    const published = evaluateGeneral(functional, part, generalPoints, {});
    expect(Number(largestEnergyDeviation(expectation.row, published).toPrecision(2))).toBe(size);
  });
});

test('every term of a listed sum has a reference row', () => {
  const terms = Object.values(sums).flatMap((parts) => Object.values(parts).flat());
  expect(terms.filter(([, id, part]) => referenceRow(id, part) === undefined)).toEqual([]);
});

function isInvented({ definition }: Functional): boolean {
  return /\binvented\b/i.test(`${definition.summary ?? ''} ${definition.notes ?? ''}`);
}

function missesOf(functional: Functional, { part, row, origin }: Expectation): string[] {
  const id = functional.definition.id;
  // A part taken from another sheet is compared where it is written, if a constant of it differs there.
  const difference = publishedDifferences.find((one) => one.functional === origin && one.part === part);
  if (difference !== undefined && origin !== id) return missesOf(onShelf(origin), { part, row, origin });
  const library = difference?.library ?? {};
  const coarse = coarseReferences.find((one) => one.functional === origin && one.part === part);
  const compared = difference?.librarySheet === undefined ? functional : onShelf(difference.librarySheet);
  return [
    ...missesGeneral(row, evaluateGeneral(compared, part, generalPoints, library)),
    ...missesSlice(row, evaluateSlice(compared, part, slicePoints, library), coarse?.atAlphaZero),
  ];
}
