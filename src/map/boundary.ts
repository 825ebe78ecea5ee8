import { contours } from 'd3-contour';
import type { PictureAxis } from '../finding/margin-map.ts';
import type { Graph, NodeId } from '../graph/graph.ts';
import { compileKernel } from '../kernel/float64.ts';
import { axisValue } from '../search/axis.ts';
import type { AxisGrid } from '../search/grid.ts';
import { lowestIn } from './project.ts';

/** A closed ring of places (x, y) on the picture. */
export type Ring = readonly (readonly [x: number, y: number])[];

/** Each cell that the boundary runs through is cut into so many along each axis. */
const finer = 4;
/** Points evaluated in one go. */
const blockPoints = 2 ** 18;

interface Picture {
  readonly x: PictureAxis;
  readonly y: PictureAxis;
  readonly rest: readonly AxisGrid[];
}

/**
 * The region below −tolerance as rings (holes among them): marching squares on a grid four times as fine, whose
 * values are computed in the cells that the boundary runs through. Without that a margin that is zero on one side
 * would give stairs.
 */
export function violatedRegion(
  graph: Graph,
  node: NodeId,
  margins: ArrayLike<number>,
  picture: Picture,
  tolerance: number,
  onPoints: (points: number) => void,
): { readonly rings: Ring[]; readonly points: number } {
  const { x, y } = picture;
  const [width, height] = [x.values.length, y.values.length];
  const fineWidth = (width - 1) * finer + 1;
  const fineHeight = (height - 1) * finer + 1;
  // Positive where violated; a place without a value is not.
  const depth = (margin: number) => (Number.isFinite(margin) ? -tolerance - margin : -1);
  const at = (column: number, row: number) => depth(margins[row * width + column] as number);
  const field = new Float64Array(fineWidth * fineHeight);
  const asked = new Set<number>();
  for (let row = 0; row < height - 1; row++) {
    for (let column = 0; column < width - 1; column++) {
      const corners = [at(column, row), at(column + 1, row), at(column, row + 1), at(column + 1, row + 1)] as const;
      const crossed = corners.some((corner) => corner > 0) && !corners.every((corner) => corner > 0);
      for (let v = 0; v <= finer; v++) {
        for (let u = 0; u <= finer; u++) {
          const index = (row * finer + v) * fineWidth + column * finer + u;
          if (!asked.has(index)) field[index] = between(corners, u / finer, v / finer);
          if (crossed) asked.add(index);
        }
      }
    }
  }
  const points = evaluateAt(
    graph,
    node,
    picture,
    [...asked],
    fineWidth,
    (index, margin) => {
      field[index] = depth(margin);
    },
    onPoints,
  );
  const found = contours().size([fineWidth, fineHeight]).smooth(true).thresholds([Number.MIN_VALUE])([...field]);
  const coordinate = (axis: PictureAxis, grid: number, count: number) =>
    axisValue(ends(axis), Math.min(1, Math.max(0, (grid - 0.5) / (count - 1))));
  const rings = found.flatMap(({ coordinates }) =>
    coordinates.flatMap((polygon) =>
      polygon.map((ring) =>
        ring.map(([gx = 0, gy = 0]) => [coordinate(x, gx, fineWidth), coordinate(y, gy, fineHeight)] as const),
      ),
    ),
  );
  return { rings, points };
}

function between([a, b, c, d]: readonly [number, number, number, number], u: number, v: number): number {
  return (1 - v) * ((1 - u) * a + u * b) + v * ((1 - u) * c + u * d);
}

export function ends({ name, scale, values }: PictureAxis) {
  return { name, scale, lower: values[0] as number, upper: values.at(-1) as number };
}

function evaluateAt(
  graph: Graph,
  node: NodeId,
  { x, y, rest }: Picture,
  indices: readonly number[],
  fineWidth: number,
  set: (index: number, margin: number) => void,
  onPoints: (points: number) => void,
): number {
  const inner = rest.reduce((product, { values }) => product * values.length, 1);
  const fine = (axis: PictureAxis, step: number) => axisValue(ends(axis), step / ((axis.values.length - 1) * finer));
  const kernel = compileKernel(
    graph,
    [node],
    [{ variables: [x.name, y.name] }, ...rest.map(({ axis }) => ({ variables: [axis.name] }))],
  );
  const run = Math.max(1, Math.floor(blockPoints / inner));
  for (let start = 0; start < indices.length; start += run) {
    const some = indices.slice(start, start + run);
    const xs = Float64Array.from(some, (index) => fine(x, index % fineWidth));
    const ys = Float64Array.from(some, (index) => fine(y, Math.floor(index / fineWidth)));
    const out = new Float64Array(some.length * inner);
    kernel.evaluate([[xs, ys], ...rest.map(({ values }) => [values])], [out]);
    some.forEach((index, k) => {
      const lowest = lowestIn(out, k * inner, inner);
      set(index, lowest < 0 ? Number.NaN : (out[k * inner + lowest] as number));
    });
    onPoints(out.length);
  }
  return indices.length * inner;
}
