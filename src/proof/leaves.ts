import { type BranchAxis, boxLetters, middleOf, rootBoxes } from '../search/branch.ts';

/** The boxes that a certificate says are proved. */
export interface Leaves {
  /** Lower, upper of each axis in turn; boxes beside each other in the domain follow each other. */
  readonly boxes: Float64Array<ArrayBuffer>;
  /** Where in the tree each box stands, counted from 0. */
  readonly letters: Int32Array;
}

/** The proved boxes of a tree of letters that cover the domain, or why the letters are no such tree. */
export function leavesOf(axes: readonly BranchAxis[], tree: string): Leaves | string {
  const width = 2 * axes.length;
  const roots = rootBoxes(axes);
  const rootCount = roots.length / (width + 1);
  // Letters stand level by level, so the parts of a box are the next two that no other box has.
  const firstPart = new Int32Array(tree.length);
  let told = rootCount;
  let leaves = 0;
  for (let index = 0; index < tree.length; index++) {
    if (tree[index] === boxLetters.proved) leaves++;
    else {
      firstPart[index] = told;
      told += 2;
    }
  }
  const boxes = new Float64Array(leaves * width);
  const letters = new Int32Array(leaves);
  let found = 0;
  const pending: (readonly [number, readonly number[]])[] = [];
  for (let root = rootCount - 1; root >= 0; root--)
    pending.push([root, [...roots.subarray(root * (width + 1), root * (width + 1) + width)]]);
  for (let next = pending.pop(); next !== undefined; next = pending.pop()) {
    const [index, box] = next;
    const letter = tree[index];
    if (letter === boxLetters.proved) {
      boxes.set(box, found * width);
      letters[found++] = index;
      continue;
    }
    const axis = letter === undefined ? Number.NaN : Number.parseInt(letter, 10);
    const divided = axes[axis];
    const [lower, upper] = [box[2 * axis] as number, box[2 * axis + 1] as number];
    const middle = divided && middleOf(lower, upper, divided.scale);
    if (middle === undefined) return `box ${index + 1} is neither proved nor divided`;
    const part = firstPart[index] as number;
    pending.push([part + 1, box.with(2 * axis, middle)], [part, box.with(2 * axis + 1, middle)]);
  }
  // Every box that was told of has been met; letters beyond them have not.
  return told === tree.length ? { boxes, letters } : 'it tells of more boxes than the domain has';
}
