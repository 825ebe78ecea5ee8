import { type BoxNode, type BoxState, cutAt, sideOf } from './box-tree.ts';

/** A rectangle of a plane on which one thing is known. */
export interface PlanePart {
  readonly state: BoxState;
  readonly x: readonly [lower: number, upper: number];
  readonly y: readonly [lower: number, upper: number];
}

/**
 * What a tree of boxes tells of a plane through it, or of its shadow on one. An axis of the tree that is neither drawn
 * nor held at a value is at its worst: a part of the plane is proved where every box over it is, violated where one is.
 */
export function planeOf(
  tree: BoxNode,
  drawn: readonly [x: number, y: number],
  held: ReadonlyMap<number, number>,
): BoxNode {
  if (typeof tree === 'string') return tree;
  const value = held.get(tree.axis);
  if (value !== undefined) return planeOf(value <= tree.at ? tree.low : tree.high, drawn, held);
  const [low, high] = [planeOf(tree.low, drawn, held), planeOf(tree.high, drawn, held)];
  return drawn.includes(tree.axis) ? cutAt({ ...tree, low, high }) : worseOf(low, high);
}

/** Of two things known of the same box, at each point the worse: violated, then undecided, then proved. */
function worseOf(a: BoxNode, b: BoxNode): BoxNode {
  if (a === 'violated' || b === 'violated') return 'violated';
  if (a === 'proved') return b;
  if (b === 'proved') return a;
  if (a === 'undecided') return typeof b === 'string' ? b : withUndecided(b);
  if (b === 'undecided') return withUndecided(a);
  const { axis, at } = a;
  return cutAt({
    axis,
    at,
    low: worseOf(a.low, sideOf(b, axis, at, 'low')),
    high: worseOf(a.high, sideOf(b, axis, at, 'high')),
  });
}

/** What is known of a plane, with the violated parts that another tree of the same plane tells of. */
export function withViolated(plane: BoxNode, other: BoxNode): BoxNode {
  return worseOf(plane, violatedOnly(other));
}

function violatedOnly(node: BoxNode): BoxNode {
  if (typeof node === 'string') return node === 'violated' ? node : 'proved';
  return cutAt({ ...node, low: violatedOnly(node.low), high: violatedOnly(node.high) });
}

/** The tree with its axes numbered anew. */
export function renumbered(node: BoxNode, axes: readonly number[]): BoxNode {
  if (typeof node === 'string') return node;
  const { low, high, at, axis } = node;
  return { axis: axes[axis] as number, at, low: renumbered(low, axes), high: renumbered(high, axes) };
}

function withUndecided(node: BoxNode): BoxNode {
  if (node === 'violated') return node;
  if (typeof node === 'string') return 'undecided';
  return cutAt({ ...node, low: withUndecided(node.low), high: withUndecided(node.high) });
}

/** The rectangles of a plane, which cover it side by side; −1 for an axis that nothing depends on. */
export function planeParts(
  plane: BoxNode,
  [x, y]: readonly [x: number, y: number],
  bounds: Pick<PlanePart, 'x' | 'y'>,
): PlanePart[] {
  if (typeof plane === 'string') return [{ state: plane, ...bounds }];
  const { axis, at, low, high } = plane;
  const name = axis === x ? 'x' : 'y';
  const [lower, upper] = bounds[name];
  return [
    ...planeParts(low, [x, y], { ...bounds, [name]: [lower, at] }),
    ...planeParts(high, [x, y], { ...bounds, [name]: [at, upper] }),
  ];
}
