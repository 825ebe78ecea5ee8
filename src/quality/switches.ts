import type { SliceName } from '../functional/variable-place.ts';
import { sub } from '../graph/build.ts';
import type { Graph, NodeId } from '../graph/graph.ts';
import { reachable, variablesOf } from '../graph/traverse.ts';
import { atPoints } from './at-points.ts';
import { insidePlace } from './edges.ts';

/** A place where a formula goes over from one branch to another, met along one axis. */
export interface Join {
  readonly axis: SliceName;
  readonly at: number;
  /** Zero at the join, of opposite signs on its two sides. */
  readonly difference: NodeId;
  /** The other coordinates. */
  readonly base: Readonly<Partial<Record<SliceName, number>>>;
  /** Whether the join lies at the same value whatever the other coordinates are. */
  readonly isFixed: boolean;
}

/** Where joins are looked for along each axis. */
const ranges: Readonly<Record<SliceName, readonly [number, number]>> = {
  rs: [0.011, 97],
  // A little beyond 0, where |ζ| turns; the rest of ζ < 0 mirrors ζ > 0.
  zeta: [-0.051, 0.998],
  s: [0.0013, 4.99],
  alpha: [0.0013, 4.99],
  q: [-4.98, 4.99],
};
const steps = 400;

const bases: readonly Record<SliceName, number>[] = [
  insidePlace,
  { rs: 3.1, zeta: 0.7, s: 1.6, alpha: 2.2, q: -0.4 },
  { rs: 0.23, zeta: 0.9, s: 0.35, alpha: 0.2, q: 0.9 },
];

/** What each choice, abs, min and max that the outputs depend on compares, as a difference. */
export function switchesOf(graph: Graph, outputs: readonly NodeId[]): NodeId[] {
  const differences = reachable(graph, outputs).flatMap((id) => {
    const node = graph.node(id);
    if (node.kind === 'choice') return [sub(graph, node.args[0], node.args[1])];
    if (node.kind === 'unary' && node.op === 'abs') return [node.args[0]];
    const isExtreme = node.kind === 'binary' && (node.op === 'min' || node.op === 'max');
    return isExtreme ? [sub(graph, node.args[0], node.args[1])] : [];
  });
  return [...new Set(differences)].filter((id) => variablesOf(graph, [id]).size > 0);
}

/** The joins that lines along each axis meet inside the domain; of equal ones at most two. */
export function findJoins(graph: Graph, switches: readonly NodeId[], variables: readonly SliceName[]): Join[] {
  if (switches.length === 0) return [];
  const evaluate = atPoints(graph, switches, variables);
  const found = variables.flatMap((axis) =>
    bases.flatMap((whole): Join[] => {
      const base = Object.fromEntries(variables.map((name) => [name, whole[name]]));
      const grid = Array.from({ length: steps + 1 }, (_, index) => gridValue(axis, index / steps));
      const values = evaluate(grid.map((value) => ({ ...base, [axis]: value })));
      return switches.flatMap((difference, index) => {
        const one = (at: number) => (evaluate([{ ...base, [axis]: at }])[index] as Float64Array)[0] as number;
        return crossings(grid, values[index] as Float64Array).map(([low, high]): Join => {
          const at = bisect(one, low, high);
          const isFixed = variablesOf(graph, [difference]).size === 1;
          return { axis, at, difference, base, isFixed };
        });
      });
    }),
  );
  return fewOfEach(found);
}

function gridValue(axis: SliceName, unit: number): number {
  const [lower, upper] = ranges[axis];
  return axis === 'rs' ? lower * (upper / lower) ** unit : lower + unit * (upper - lower);
}

function crossings(grid: readonly number[], values: Float64Array): [number, number][] {
  return grid.slice(1).flatMap((high, index): [number, number][] => {
    const [a, b] = [values[index] as number, values[index + 1] as number];
    return a * b < 0 || (b === 0 && a !== 0)
      ? [[grid[index] as number, b === 0 ? (grid[index + 2] ?? high) : high]]
      : [];
  });
}

/** The zero between two values of opposite sign; a short decimal where that is one. */
function bisect(f: (at: number) => number, low: number, high: number): number {
  let [left, right] = [low, high];
  const sign = Math.sign(f(left));
  for (let count = 0; count < 60; count += 1) {
    const middle = (left + right) / 2;
    if (Math.sign(f(middle)) === sign) left = middle;
    else right = middle;
  }
  const short = Number(right.toPrecision(9));
  return f(short) === 0 ? short : right;
}

/** A join at a fixed value is kept with two bases; one that moves, once for each axis; different switches at one place once. */
function fewOfEach(joins: readonly Join[]): Join[] {
  const counts = new Map<string, number>();
  return joins.filter(({ axis, at, isFixed, difference }) => {
    const key = isFixed ? `${axis} ${at.toPrecision(9)}` : `${axis} ${difference}`;
    const count = counts.get(key) ?? 0;
    counts.set(key, count + 1);
    return count < (isFixed ? 2 : 1);
  });
}
