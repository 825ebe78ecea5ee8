import fc from 'fast-check';
import { expect, test } from 'vitest';
import { blockFunction, blocksOf, indicesOf, placeOf, pointFunction } from '../../src/search/block.ts';
import { cubeGrids } from './boxes.ts';

test('blocks cover every grid point once, in row-major order, none above the limit', () => {
  fc.assert(
    fc.property(
      fc.array(fc.integer({ min: 1, max: 9 }), { minLength: 1, maxLength: 4 }),
      fc.integer({ min: 1, max: 50 }),
      (lengths, limit) => {
        const seen: number[] = [];
        for (const { from, to, points } of blocksOf(lengths, limit)) {
          expect(points).toBeLessThanOrEqual(limit);
          const sizes = from.map((start, axis) => (to[axis] as number) - start);
          for (let point = 0; point < points; point += 1) {
            const local = indicesOf(point, sizes).map((index, axis) => index + (from[axis] as number));
            seen.push(local.reduce((index, value, axis) => index * (lengths[axis] as number) + value, 0));
          }
        }
        expect(seen).toEqual(Array.from({ length: lengths.reduce((a, b) => a * b, 1) }, (_, index) => index));
      },
    ),
    { seed: 11, numRuns: 200 },
  );
});

test('a function, the block evaluator made of it and the function made of that agree', () => {
  const f = (place: Float64Array) => (place[0] as number) * 100 + (place[1] as number) * 10 + (place[2] as number);
  const grids = cubeGrids(3, 4, 0, 3);
  const out = new Float64Array(64);
  const evaluate = blockFunction(f);
  evaluate(
    grids.map(({ values }) => values),
    [out],
  );
  expect(out[27]).toBe(123);
  expect([...placeOf(27, grids)]).toEqual([1, 2, 3]);
  expect(pointFunction(evaluate, 3)(Float64Array.of(1, 2, 3))).toBe(123);
});
