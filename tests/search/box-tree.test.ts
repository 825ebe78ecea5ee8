import { describe, expect, test } from 'vitest';
import { type BoxNode, boxTreeLetters, readBoxTree } from '../../src/search/box-tree.ts';
import { planeOf, planeParts } from '../../src/search/plane.ts';

const axis = (divisions: number[] = []) => ({ lower: 0, upper: 1, scale: 'linear' as const, divisions });
const nothing = new Map<number, number>();

describe('a tree of boxes from its letters (format: BranchResult)', () => {
  test('the parts of a box are the next two letters that no other box has', () => {
    expect(readBoxTree([axis(), axis()], '01.?!')).toEqual({
      axis: 0,
      at: 0.5,
      low: { axis: 1, at: 0.5, low: 'undecided', high: 'violated' },
      high: 'proved',
    });
  });

  test('divisions come before all other cuts', () => {
    expect(readBoxTree([axis([0.25])], '.!')).toEqual({ axis: 0, at: 0.25, low: 'proved', high: 'violated' });
  });

  test('parts of one state are one box', () => {
    expect(readBoxTree([axis([0.25]), axis()], '01..!!')).toEqual({
      axis: 0,
      at: 0.25,
      low: 'proved',
      high: 'violated',
    });
  });

  test.each(['', '0', '0.', '.!', '0x.', '7..'])('%j is refused', (letters) => {
    expect(() => readBoxTree([axis()], letters)).toThrow(RangeError);
  });

  test('written and read again it is the same (law); cut short it only loses to undecided', () => {
    const axes = [axis([0.3]), axis()];
    const letters = '010?1.1!.1.!?.';
    const tree = readBoxTree(axes, letters);
    const whole = boxTreeLetters(axes, tree, 1000);
    expect(readBoxTree(axes, whole)).toEqual(tree);
    for (let most = 2; most < whole.length; most++) {
      const short = boxTreeLetters(axes, tree, most);
      expect(short.length).toBeLessThanOrEqual(most);
      for (const [x, y] of places) {
        const told = stateAt(readBoxTree(axes, short), [x, y]);
        expect([stateAt(tree, [x, y]), 'undecided']).toContain(told);
      }
    }
  });
});

/** Off every cut of the trees here. */
const places = [0.07, 0.21, 0.33, 0.57, 0.71, 0.93].flatMap((x) =>
  [0.11, 0.41, 0.61, 0.87].map((y) => [x, y] as const),
);

function stateAt(node: BoxNode, place: readonly number[]): string {
  if (typeof node === 'string') return node;
  return stateAt((place[node.axis] as number) < node.at ? node.low : node.high, place);
}

describe('the shadow of boxes on a plane', () => {
  const axes = [axis(), axis(), axis()];
  // Divided along the third axis first, then along the others at random.
  const tree = readBoxTree(axes, '201110.0.?!.1!?.!');
  const depth = [0.1, 0.3, 0.6, 0.9];

  test('is violated where one box over it is, proved where all are (by its definition)', () => {
    const shadow = planeOf(tree, [0, 1], nothing);
    for (const [x, y] of places) {
      const over = depth.map((z) => stateAt(tree, [x, y, z]));
      const expected = over.includes('violated') ? 'violated' : over.includes('undecided') ? 'undecided' : 'proved';
      expect(stateAt(shadow, [x, y])).toBe(expected);
    }
  });

  test('is a slice where the other axis is held', () => {
    for (const z of depth) {
      const slice = planeOf(tree, [0, 1], new Map([[2, z]]));
      for (const [x, y] of places) expect(stateAt(slice, [x, y])).toBe(stateAt(tree, [x, y, z]));
    }
  });

  test('its rectangles cover the plane side by side: their areas sum to 1', () => {
    const whole = { x: [0, 1], y: [0, 1] } as const;
    const parts = planeParts(planeOf(tree, [0, 1], nothing), [0, 1], whole);
    expect(parts.length).toBeGreaterThan(3);
    expect(parts.reduce((sum, { x, y }) => sum + (x[1] - x[0]) * (y[1] - y[0]), 0)).toBe(1);
  });
});
