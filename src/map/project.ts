import type { PictureAxis } from '../finding/margin-map.ts';
import type { Graph, NodeId } from '../graph/graph.ts';
import { compileKernel } from '../kernel/float64.ts';
import type { AxisGrid } from '../search/grid.ts';

export interface Projection {
  /** Row-major, x fastest: the smallest value over the rest; NaN where there is none. */
  readonly margins: Float64Array;
  /** For each axis of the rest, where it is taken. */
  readonly worstAt: readonly Float64Array[];
  readonly points: number;
}

/** Points evaluated in one go: memory, and the grain of the progress. */
const blockPoints = 2 ** 18;

/**
 * The smallest value of a node over some coordinates, on a grid of two others. A coordinate that the node does not
 * depend on changes nothing and costs nothing.
 */
export function projectWorst(
  graph: Graph,
  node: NodeId,
  variables: readonly string[],
  axes: { readonly x: PictureAxis; readonly y: PictureAxis; readonly rest: readonly AxisGrid[] },
  onPoints: (points: number) => void,
): Projection {
  const { x, y, rest } = axes;
  const [width, height] = [x.values.length, y.values.length];
  const margins = new Float64Array(width * height).fill(Number.NaN);
  const worstAt = rest.map(() => new Float64Array(width * height).fill(Number.NaN));
  const restLengths = rest.map(({ values }) => values.length);
  const inner = restLengths.reduce((product, length) => product * length, 1);
  const xs = variables.includes(x.name) ? Float64Array.from(x.values) : Float64Array.of(x.values[0] as number);
  const ys = variables.includes(y.name) ? Float64Array.from(y.values) : Float64Array.of(y.values[0] as number);
  const kernel = compileKernel(
    graph,
    [node],
    [y.name, x.name, ...rest.map(({ axis }) => axis.name)].map((name) => ({ variables: [name] })),
    [ys.length, xs.length, ...restLengths],
  );
  const columns = Math.max(1, Math.min(xs.length, Math.floor(blockPoints / inner)));
  const rows = columns < xs.length ? 1 : Math.max(1, Math.floor(blockPoints / (inner * xs.length)));
  for (let row = 0; row < ys.length; row += rows) {
    for (let column = 0; column < xs.length; column += columns) {
      const someY = ys.subarray(row, row + rows);
      const someX = xs.subarray(column, column + columns);
      const out = new Float64Array(someY.length * someX.length * inner);
      kernel.evaluate([[someY], [someX], ...rest.map(({ values }) => [values])], [out]);
      for (let cell = 0; cell < someY.length * someX.length; cell++) {
        const lowest = lowestIn(out, cell * inner, inner);
        if (lowest < 0) continue;
        const target = (row + Math.floor(cell / someX.length)) * width + column + (cell % someX.length);
        margins[target] = out[cell * inner + lowest] as number;
        let index = lowest;
        for (let axis = rest.length - 1; axis >= 0; axis--) {
          const length = restLengths[axis] as number;
          (worstAt[axis] as Float64Array)[target] = rest[axis]?.values[index % length] as number;
          index = Math.floor(index / length);
        }
      }
      onPoints(out.length);
    }
  }
  for (const table of [margins, ...worstAt]) spread(table, width, height, xs.length, ys.length);
  return { margins, worstAt, points: xs.length * ys.length * inner };
}

/** The index of the smallest finite value from `start`, counted from there; −1 where there is none. */
export function lowestIn(values: Float64Array, start: number, count: number): number {
  let lowest = -1;
  let least = Number.POSITIVE_INFINITY;
  for (let index = 0; index < count; index++) {
    const value = values[start + index] as number;
    if (value < least && value > Number.NEGATIVE_INFINITY) {
      least = value;
      lowest = index;
    }
  }
  return lowest;
}

/** Repeats the one column or row that was evaluated along an axis that nothing depends on. */
function spread(table: Float64Array, width: number, height: number, columns: number, rows: number): void {
  for (let row = 0; row < height; row++) {
    for (let column = 0; column < width; column++) {
      const source = (rows === 1 ? 0 : row) * width + (columns === 1 ? 0 : column);
      table[row * width + column] = table[source] as number;
    }
  }
}
