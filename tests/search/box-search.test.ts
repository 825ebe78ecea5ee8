import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { BoxSearch, blockJudge, branchAndBound, type JudgeBox } from '../../src/search/box-search.ts';
import type { BranchAxis } from '../../src/search/branch.ts';
import { type Judge, searchTogether } from '../../src/search/share-blocks.ts';

const axis: BranchAxis = { lower: 0, upper: 1, scale: 'linear', divisions: [] };
const axes: readonly BranchAxis[] = [
  { ...axis, divisions: [0.3] },
  { ...axis, lower: 1e-3, scale: 'logarithmic' },
  axis,
];
const count = axes.length;

/** An invented claim: a plane parts what is right from what is wrong, and the axis to divide along is haphazard. */
function planeJudge([a, b, c, limit]: readonly [number, number, number, number]): JudgeBox {
  return (boxes, offset) => {
    let [low, high] = [0, 0];
    for (const [index, slope] of [a, b, c].entries()) {
      const ends = [slope * (boxes[offset + 2 * index] as number), slope * (boxes[offset + 2 * index + 1] as number)];
      low += Math.min(...ends);
      high += Math.max(...ends);
    }
    if (low > limit) return 'proved';
    if (high < limit) return 'violated';
    return (Math.floor(1e4 * (boxes[offset] as number) + 1e5 * (boxes[offset + 3] as number)) % (count + 1)) - 1;
  };
}

const slope = fc.double({ min: -1, max: 1, noNaN: true });
const plane = fc.tuple(slope, slope, slope, slope).map(planeJudge);
const keepTree = true;

describe('a search that is gone on with', () => {
  it('is the search that was not interrupted, wherever it was (seed 7)', () => {
    fc.assert(
      fc.property(plane, fc.integer({ min: 1, max: 4000 }), fc.nat(4000), (judge, first, more) => {
        const whole = branchAndBound(axes, judge, { budget: first + more, keepTree });
        const begun = branchAndBound(axes, judge, { budget: first, keepTree });
        const judged = begun.tree.slice(0, begun.boxes);
        expect(branchAndBound(axes, judge, { budget: first + more, keepTree, judged })).toEqual(whole);
      }),
      { seed: 7, numRuns: 40 },
    );
  });

  it('judges no box again', () => {
    const judge = planeJudge([1, 1, 1, 1]);
    const begun = branchAndBound(axes, judge, { budget: 3000, keepTree });
    let asked = 0;
    const counted: JudgeBox = (boxes, offset) => {
      asked++;
      return judge(boxes, offset);
    };
    const judged = begun.tree.slice(0, begun.boxes);
    expect(branchAndBound(axes, counted, { budget: 3500, keepTree, judged }).boxes).toBe(3500);
    expect(asked).toBe(500);
  });

  it('keeps boxes that are too small to divide undecided', () => {
    const tiny = [{ ...axis, lower: 1, upper: 1 + 4 * Number.EPSILON }];
    const judge: JudgeBox = () => -1;
    const whole = branchAndBound(tiny, judge, { budget: 100, keepTree });
    const judged = branchAndBound(tiny, judge, { budget: 5, keepTree }).tree.slice(0, 5);
    expect(branchAndBound(tiny, judge, { budget: 100, keepTree, judged })).toEqual(whole);
    expect(whole).toMatchObject({ stop: 'resolution', undecided: 1 });
  });

  it.each(['..', '9.', '...............', 'x', '0..?', '😀'])('letters of other boxes are refused: %s', (judged) => {
    expect(() => new BoxSearch([axis], { budget: 10, judged })).toThrow(RangeError);
  });
});

describe('a search with helpers', () => {
  /** Helpers that answer sooner or later, so that blocks come back in another order. */
  const helpers = (judge: JudgeBox, log: number[]) => () =>
    [1, 3].map(async (delay, index): Promise<Judge> => {
      await turns(delay);
      return async (block) => {
        await turns(delay * (block.length % 5));
        log[index] = (log[index] ?? 0) + 1;
        return { block, judgements: blockJudge(count, judge)(block) };
      };
    });
  const together = (judge: JudgeBox, budget: number, log: number[] = [], signal?: AbortSignal) =>
    searchTogether(new BoxSearch(axes, { budget, keepTree }), blockJudge(count, judge), {
      helpers: helpers(judge, log),
      patience: 0,
      signal,
    });

  it('finds what one thread finds (seed 8)', async () => {
    await fc.assert(
      fc.asyncProperty(plane, fc.integer({ min: 1, max: 60_000 }), async (judge, budget) => {
        expect(await together(judge, budget)).toEqual(branchAndBound(axes, judge, { budget, keepTree }));
      }),
      { seed: 8, numRuns: 15 },
    );
  });

  it('gives every helper something to do', async () => {
    const log: number[] = [];
    await together(planeJudge([1, 1, 1, 1]), 60_000, log);
    expect(log.length).toBe(2);
  });

  it('asks for none when the search is short', async () => {
    const log: number[] = [];
    await together(planeJudge([1, 1, 1, 1]), 1000, log);
    expect(log).toEqual([]);
  });

  it('that is interrupted is undecided, and what it has judged is kept', async () => {
    const judge = planeJudge([1, 1, 1, 1]);
    const interruption = new AbortController();
    let asked = 0;
    const counted: JudgeBox = (boxes, offset) => {
      if (++asked === 10_000) interruption.abort();
      return judge(boxes, offset);
    };
    const result = await together(counted, 1e6, [], interruption.signal);
    expect(result.stop).toBe('interrupted');
    expect(result.undecided).toBeGreaterThan(0);
    expect(result.proved).toBeLessThan(1);
    expect(result.boxes).toBeGreaterThanOrEqual(10_000);
    const budget = result.boxes + 5000;
    const judged = result.tree.slice(0, result.boxes);
    expect(branchAndBound(axes, judge, { budget, keepTree, judged })).toEqual(
      branchAndBound(axes, judge, { budget, keepTree }),
    );
  });

  it('fails when a helper does', async () => {
    const judge = planeJudge([1, 1, 1, 1]);
    const search = new BoxSearch(axes, { budget: 60_000 });
    const failing = [Promise.resolve<Judge>(() => Promise.reject(new Error('gone')))];
    const options = { helpers: () => failing, patience: 0 };
    await expect(searchTogether(search, blockJudge(count, judge), options)).rejects.toThrow('gone');
  });
});

async function turns(number: number): Promise<void> {
  for (let turn = 0; turn < number; turn++) await new Promise((resolve) => setImmediate(resolve));
}
