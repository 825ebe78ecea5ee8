import { describe, expect, it } from 'vitest';
import { branchAndBound } from '../../src/search/box-search.ts';
import { type BranchAxis, middleOf, rootBoxes } from '../../src/search/branch.ts';

const unitAxis: BranchAxis = { lower: 0, upper: 1, scale: 'linear', divisions: [] };

/** x ≥ c is right, x < c is wrong. */
const above = (limit: number) => (boxes: Float64Array, offset: number) =>
  (boxes[offset] as number) >= limit ? 'proved' : (boxes[offset + 1] as number) < limit ? 'violated' : -1;

describe('branch and bound', () => {
  it('shares are those of the domain: x ≥ 1/4 on 0…1 is proved on 3/4 and wrong on 1/4 but for a last box', () => {
    const result = branchAndBound([unitAxis], above(0.25), { budget: 1000 });
    expect(result.proved).toBe(0.75);
    expect(result.violated + result.undecided).toBeCloseTo(0.25, 12);
    expect(result.proved + result.violated + result.undecided).toBe(1);
  });

  it('a budget that ends leaves the rest undecided, never proved', () => {
    const result = branchAndBound([unitAxis, unitAxis], above(0.3), { budget: 5 });
    expect(result).toMatchObject({ stop: 'budget', boxes: 5 });
    expect(result.undecided).toBeGreaterThan(0);
  });

  it('a box that is never decided ends when it cannot be divided', () => {
    const axis = { ...unitAxis, lower: 1, upper: 1 + 4 * Number.EPSILON };
    const result = branchAndBound([axis], () => -1, { budget: 1000 });
    expect(result.stop).toBe('resolution');
    expect(result.undecided).toBe(1);
  });

  it('the tree names every box', () => {
    const judge = (boxes: Float64Array, offset: number) => ((boxes[offset] as number) > 0 ? 'proved' : -1);
    const halves = (boxes: Float64Array, offset: number) =>
      (boxes[offset + 1] as number) < 0.2 ? 'proved' : judge(boxes, offset);
    const result = branchAndBound([unitAxis], halves, { budget: 100, keepTree: true });
    expect(result).toMatchObject({ stop: 'decided', boxes: 7, tree: '00.0...' });
  });

  it('switches divide the domain first, and shares follow widths', () => {
    const rows = rootBoxes([{ ...unitAxis, upper: 5, divisions: [1] }]);
    expect([...rows]).toEqual([0, 1, 0.2, 1, 5, 0.8]);
  });

  it('an axis without end: x/(1 + x) < 0.99 is wrong only beyond 99', () => {
    const axis: BranchAxis = { lower: 0, upper: Number.POSITIVE_INFINITY, scale: 'logarithmic', divisions: [] };
    const judge = (boxes: Float64Array, offset: number) =>
      (boxes[offset + 1] as number) < 99 ? 'proved' : (boxes[offset] as number) >= 99 ? 'violated' : -1;
    const result = branchAndBound([axis], judge, { budget: 500 });
    expect(result.violatedHull[0]?.[0]).toBeCloseTo(99, 6);
    expect(result.undecided).toBeLessThan(1e-9);
  });

  it.each([
    [0.01, 100, 1],
    [0, 16, 1],
    [4, Number.POSITIVE_INFINITY, 16],
  ])('a logarithmic interval %d … %d is divided at %d', (lower, upper, middle) => {
    expect(middleOf(lower, upper, 'logarithmic')).toBeCloseTo(middle, 12);
  });
});
