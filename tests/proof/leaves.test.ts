import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { leavesOf } from '../../src/proof/leaves.ts';
import { type BranchAxis, rootBoxes } from '../../src/search/branch.ts';

const axes: readonly BranchAxis[] = [
  { lower: 0, upper: 4, scale: 'linear', divisions: [1] },
  { lower: 0, upper: 2, scale: 'linear', divisions: [] },
];

/** Letters of a tree in which a box is divided while the choices say so; level by level. */
function treeOf(choices: readonly number[]): string {
  const letters: string[] = [];
  let level = rootBoxes(axes).length / 5;
  let used = 0;
  while (level > 0) {
    let next = 0;
    for (let box = 0; box < level; box++) {
      const choice = choices[used++] ?? 2;
      letters.push(choice === 2 ? '.' : String(choice));
      if (choice !== 2) next += 2;
    }
    level = next;
  }
  return letters.join('');
}

describe('the boxes of a certificate', () => {
  it('cover the domain and do not overlap, whatever the tree', () => {
    fc.assert(
      fc.property(fc.array(fc.integer({ min: 0, max: 2 }), { maxLength: 60 }), (choices) => {
        const tree = treeOf(choices);
        const leaves = leavesOf(axes, tree);
        if (typeof leaves === 'string') throw new Error(leaves);
        const { boxes, letters } = leaves;
        let area = 0;
        for (let at = 0; at < boxes.length; at += 4) {
          const [a, b, c, d] = boxes.subarray(at, at + 4) as unknown as [number, number, number, number];
          area += (b - a) * (d - c);
        }
        // Halves of dyadic numbers: exact.
        expect(area).toBe(8);
        expect([...letters].every((letter) => tree[letter] === '.')).toBe(true);
        expect(new Set(letters).size).toBe([...tree].filter((letter) => letter === '.').length);
      }),
      { numRuns: 300, seed: 3 },
    );
  });

  it('one letter less, one more, one undecided or an axis that does not exist is refused', () => {
    const tree = '01....';
    expect(leavesOf(axes, tree)).toMatchObject({ letters: { length: 4 } });
    expect(leavesOf(axes, tree.slice(0, -1))).toMatch(/box 6 is neither proved nor divided/);
    expect(leavesOf(axes, `${tree}.`)).toMatch(/more boxes than the domain has/);
    for (const letter of ['?', '!', '2', ' ']) expect(leavesOf(axes, `01...${letter}`)).toMatch(/box 6 is neither/);
  });
});
