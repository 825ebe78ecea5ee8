import fc from 'fast-check';
import { expect, test } from 'vitest';
import type { Scale } from '../../src/search/axis.ts';
import { gridOf } from '../../src/search/grid.ts';

test('any grid rises strictly, holds its ends and pinned values exactly, and its weights sum to 1', () => {
  fc.assert(
    fc.property(
      fc.constantFrom<Scale>('linear', 'logarithmic', 'toward-upper', 'compact'),
      fc.double({ min: 0.001, max: 10, noNaN: true }),
      fc.double({ min: 0.001, max: 1000, noNaN: true }),
      fc.integer({ min: 2, max: 300 }),
      fc.array(fc.double({ min: 0, max: 1, noNaN: true }), { maxLength: 4 }),
      (scale, lower, width, count, parts) => {
        const axis = { name: 'x', lower, upper: lower + width, scale };
        const pinned = parts.map((part) => lower + part * width).filter((value) => value < axis.upper);
        const { values, weights } = gridOf(axis, count, pinned);
        expect([values[0], values.at(-1)]).toEqual([axis.lower, axis.upper]);
        expect(values.every((value, index) => index === 0 || value > (values[index - 1] as number))).toBe(true);
        expect(weights.reduce((sum, weight) => sum + weight, 0)).toBeCloseTo(1, 10);
        expect(weights.every((weight) => weight >= 0)).toBe(true);
        // Two pinned values closer than a millionth of a step may take the same grid value.
        if (pinned.length === 1) expect(values).toContain(pinned[0]);
      },
    ),
    { seed: 7, numRuns: 500 },
  );
});

test('a pinned value replaces the grid value that it differs from by rounding only', () => {
  const grid = gridOf({ name: 'rs', lower: 0.01, upper: 100, scale: 'logarithmic' }, 101, [1]);
  expect(grid.values.length).toBe(101);
  expect(grid.values[50]).toBe(1);
});

test('a grid towards ζ = 1 has the values 1 − w³ and trapezoid weights in plain ζ (by hand)', () => {
  const { values, weights } = gridOf({ name: 'zeta', lower: 0, upper: 1, scale: 'toward-upper' }, 3);
  expect([...values]).toEqual([0, 0.875, 1]);
  expect([...weights]).toEqual([0.4375, 0.5, 0.0625]);
});

test('a fixed coordinate is one value of weight 1', () => {
  const { values, weights } = gridOf({ name: 's', lower: 2, upper: 2, scale: 'linear' }, 10);
  expect([[...values], [...weights]]).toEqual([[2], [1]]);
});

test('a grid of one value over a range is refused', () => {
  expect(() => gridOf({ name: 's', lower: 0, upper: 2, scale: 'linear' }, 1)).toThrow(RangeError);
});
