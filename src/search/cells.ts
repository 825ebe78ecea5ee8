/** A product grid cut into coarse cells: along each axis, runs of neighbouring grid values. */
export interface CellLayout {
  /** Grid values along each axis. */
  readonly lengths: readonly number[];
  /** Cells along each axis. */
  readonly counts: readonly number[];
  readonly strides: readonly number[];
  readonly total: number;
  /** starts[axis][cell] is the first grid index of a cell; one more entry closes the last cell. */
  readonly starts: readonly Int32Array[];
  /** cellOf[axis][grid index]. */
  readonly cellOf: readonly Int32Array[];
}

/** Runs along the last axis are read fastest: it is coarsened as if it had so many times its cells. */
const lastAxisBias = 2;

/** Cells as fine as the grid where `limit` allows it; else the axis with most cells is coarsened first, the last rather. */
export function layCells(lengths: readonly number[], limit: number): CellLayout {
  const counts = [...lengths];
  const product = () => counts.reduce((total, count) => total * count, 1);
  while (product() > limit) {
    const sizes = counts.map((count, axis) => (axis === counts.length - 1 ? lastAxisBias * count : count));
    const largest = sizes.indexOf(Math.max(...sizes));
    if (counts[largest] === 1) break;
    counts[largest] = Math.ceil((counts[largest] as number) / 2);
  }
  const starts = counts.map((count, axis) =>
    Int32Array.from({ length: count + 1 }, (_, cell) => Math.ceil((cell * (lengths[axis] as number)) / count)),
  );
  return {
    lengths,
    counts,
    strides: counts.map((_, axis) => counts.slice(axis + 1).reduce((total, count) => total * count, 1)),
    total: product(),
    starts,
    cellOf: starts.map((bounds) => {
      const cells = new Int32Array(bounds.at(-1) as number);
      for (let cell = 0; cell + 1 < bounds.length; cell += 1) cells.fill(cell, bounds[cell], bounds[cell + 1]);
      return cells;
    }),
  };
}

/**
 * Steps to neighbouring cells as −1, 0, 1 along each axis, at most `reach` of them not 0 (1: faces,
 * 2: faces and edges, …), the zero step left out.
 */
export function neighbourSteps(axes: number, reach: number): readonly (readonly number[])[] {
  let steps: number[][] = [[]];
  for (let axis = 0; axis < axes; axis += 1) {
    steps = steps.flatMap((step) => [-1, 0, 1].map((move) => [...step, move]));
    steps = steps.filter((step) => step.filter((move) => move !== 0).length <= reach);
  }
  return steps.filter((step) => step.some((move) => move !== 0));
}

/** The cell a step away, or -1 outside the grid. `position` are the cell's indices along each axis. */
export function neighbour(layout: CellLayout, position: ArrayLike<number>, step: readonly number[]): number {
  let cell = 0;
  for (let axis = 0; axis < step.length; axis += 1) {
    const index = (position[axis] as number) + (step[axis] as number);
    if (index < 0 || index >= (layout.counts[axis] as number)) return -1;
    cell += index * (layout.strides[axis] as number);
  }
  return cell;
}
