import { type BranchAxis, boxLetters, middleOf } from './branch.ts';

/** What is known of every point of a box. */
export type BoxState = keyof typeof boxLetters;

/** A divided domain: a box of one state, or two parts that meet where one axis has the value `at`. */
export type BoxNode = BoxState | BoxCut;

export interface BoxCut {
  readonly axis: number;
  readonly at: number;
  readonly low: BoxNode;
  readonly high: BoxNode;
}

export type Bounds = readonly (readonly [lower: number, upper: number])[];
export type TreeAxis = BranchAxis;

const states = new Map(Object.entries(boxLetters).map(([state, letter]) => [letter as string, state as BoxState]));

/**
 * The boxes that the letters of a search (BranchResult) tell of; parts of one state are one box. Throws a RangeError for
 * letters that are no such tree.
 */
export function readBoxTree(axes: readonly TreeAxis[], letters: string): BoxNode {
  const roots = rootParts(axes);
  // Letters stand level by level, so the parts of a box are the next two that no other box has.
  const firstPart = new Int32Array(letters.length);
  let told = roots.length;
  for (let index = 0; index < letters.length; index++) {
    if (states.has(letters[index] as string)) continue;
    firstPart[index] = told;
    told += 2;
  }
  if (told !== letters.length) throw new RangeError(`${letters.length} letters tell of ${told} boxes`);

  const nodeAt = (index: number, bounds: Bounds): BoxNode => {
    const letter = letters[index] as string;
    const state = states.get(letter);
    if (state !== undefined) return state;
    const axis = Number(letter);
    const divided = bounds[axis];
    const at = divided && middleOf(...divided, (axes[axis] as TreeAxis).scale);
    if (divided === undefined || at === undefined) throw new RangeError(`letter ${index + 1} (${letter}) is no box`);
    const part = firstPart[index] as number;
    const low = nodeAt(part, bounds.with(axis, [divided[0], at]));
    return cutAt({ axis, at, low, high: nodeAt(part + 1, bounds.with(axis, [at, divided[1]])) });
  };
  return joinedRoots(
    axes,
    roots.map((bounds, index) => nodeAt(index, bounds)),
  );
}

/** A tree as such letters again; of more than `most` boxes the last ones are left undivided, as undecided. */
export function boxTreeLetters(axes: readonly TreeAxis[], tree: BoxNode, most: number): string {
  const letters: string[] = [];
  let level = rootParts(axes).map((bounds) => within(tree, bounds));
  let told = level.length;
  while (level.length > 0) {
    const next: BoxNode[] = [];
    for (const node of level) {
      if (typeof node === 'string') letters.push(boxLetters[node]);
      else if (told + 2 > most) letters.push(boxLetters.undecided);
      else {
        letters.push(String(node.axis));
        next.push(node.low, node.high);
        told += 2;
      }
    }
    level = next;
  }
  return letters.join('');
}

/** The cut, or the state that both of its parts have. */
export function cutAt(cut: BoxCut): BoxNode {
  return typeof cut.low === 'string' && cut.low === cut.high ? cut.low : cut;
}

/** What a tree tells of the part of its box on one side of a value. */
export function sideOf(node: BoxNode, axis: number, at: number, side: 'low' | 'high'): BoxNode {
  if (typeof node === 'string') return node;
  const isOutside = node.axis === axis && (side === 'low' ? node.at >= at : node.at <= at);
  if (isOutside) return sideOf(node[side], axis, at, side);
  return cutAt({ ...node, low: sideOf(node.low, axis, at, side), high: sideOf(node.high, axis, at, side) });
}

function within(tree: BoxNode, bounds: Bounds): BoxNode {
  return bounds.reduce(
    (node, [lower, upper], axis) => sideOf(sideOf(node, axis, upper, 'low'), axis, lower, 'high'),
    tree,
  );
}

/** The parts at the divisions of the axes, in the order of the search's first level. */
function rootParts(axes: readonly TreeAxis[]): Bounds[] {
  let parts: Bounds[] = [[]];
  for (const axis of axes) {
    const ends = [axis.lower, ...innerDivisions(axis), axis.upper];
    const own = ends.slice(1).map((end, index) => [ends[index] as number, end] as const);
    parts = parts.flatMap((part) => own.map((bounds) => [...part, bounds]));
  }
  return parts;
}

function innerDivisions({ lower, upper, divisions }: TreeAxis): number[] {
  return divisions.filter((value) => value > lower && value < upper).sort((a, b) => a - b);
}

/** The parts as one tree whose first cuts are the divisions. */
function joinedRoots(axes: readonly TreeAxis[], parts: readonly BoxNode[], axis = 0): BoxNode {
  const own = axes[axis];
  if (own === undefined) return parts[0] as BoxNode;
  const cuts = innerDivisions(own);
  const size = parts.length / (cuts.length + 1);
  const along = (index: number) => joinedRoots(axes, parts.slice(index * size, (index + 1) * size), axis + 1);
  return cuts.reduce<BoxNode>((low, at, index) => cutAt({ axis, at, low, high: along(index + 1) }), along(0));
}
