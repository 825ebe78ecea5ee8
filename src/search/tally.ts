import type { CellLayout } from './cells.ts';

/**
 * What one output of a scan is reduced to. Its size depends on the number of cells, never on the
 * number of points. Grid points are named by their row-major index.
 */
export interface Tally {
  readonly layout: CellLayout;
  readonly level: number;
  points: number;
  withoutValue: number;
  firstWithoutValue: number;
  valuedWeight: number;
  violatedPoints: number;
  violatedWeight: number;
  /** The smallest value of each cell and its grid point (-1: none). */
  readonly minimum: Float64Array;
  readonly minimumAt: Float64Array;
  /** The violated cells' records; `slotOf` is -1 for a cell that is not violated. */
  readonly slotOf: Int32Array;
  violated: ViolatedCells;
}

/** Records of violated cells, one slot each, in the order they were met. */
interface ViolatedCells {
  length: number;
  readonly cell: Int32Array;
  readonly points: Float64Array;
  readonly weight: Float64Array;
  /** Entry (slot·axes + axis)·2 is the grid index of the lowest violated coordinate, the next the highest. */
  readonly extreme: Int32Array;
  /** The grid points where these are met. */
  readonly extremeAt: Float64Array;
}

export function emptyTally(layout: CellLayout, tolerance: number): Tally {
  return {
    layout,
    level: -tolerance,
    points: 0,
    withoutValue: 0,
    firstWithoutValue: -1,
    valuedWeight: 0,
    violatedPoints: 0,
    violatedWeight: 0,
    minimum: new Float64Array(layout.total).fill(Infinity),
    minimumAt: new Float64Array(layout.total).fill(-1),
    slotOf: new Int32Array(layout.total).fill(-1),
    violated: room(16, layout.lengths.length),
  };
}

/** A run of points along the last axis whose other indices are fixed. */
export interface Row {
  /** Grid indices along all axes but the last. */
  readonly indices: readonly number[];
  readonly weight: number;
  readonly from: number;
  readonly to: number;
  readonly lastWeights: Float64Array;
}

/** Adds the values margins[offset…] of a row. */
export function addRow(tally: Tally, margins: Float64Array, offset: number, row: Row): void {
  const { layout, level } = tally;
  const last = layout.lengths.length - 1;
  const starts = layout.starts[last] as Int32Array;
  const cellOf = layout.cellOf[last] as Int32Array;
  const shift = offset - row.from;
  let rowStart = 0;
  let rowCell = 0;
  for (let axis = 0; axis < last; axis += 1) {
    const index = row.indices[axis] as number;
    rowStart = (rowStart + index) * (layout.lengths[axis + 1] as number);
    rowCell += ((layout.cellOf[axis] as Int32Array)[index] as number) * (layout.strides[axis] as number);
  }
  for (let start = row.from; start < row.to; ) {
    const lastCell = cellOf[start] as number;
    const end = Math.min(row.to, starts[lastCell + 1] as number);
    const cell = rowCell + lastCell;
    let low = tally.minimum[cell] as number;
    let lowAt = -1;
    let violated = 0;
    let violatedWeight = 0;
    let first = -1;
    let final = -1;
    let weight = 0;
    for (let index = start; index < end; index += 1) {
      const margin = margins[index + shift] as number;
      const pointWeight = row.lastWeights[index] as number;
      // An overflow is no more a value than NaN is.
      if (margin - margin !== 0) {
        tally.withoutValue += 1;
        if (tally.firstWithoutValue < 0) tally.firstWithoutValue = rowStart + index;
        continue;
      }
      if (margin < low) {
        low = margin;
        lowAt = index;
      }
      if (margin >= level) weight += pointWeight;
      else {
        violated += 1;
        violatedWeight += pointWeight;
        if (first < 0) first = index;
        final = index;
      }
    }
    if (lowAt >= 0) {
      tally.minimum[cell] = low;
      tally.minimumAt[cell] = rowStart + lowAt;
    }
    tally.valuedWeight += row.weight * (weight + violatedWeight);
    if (violated > 0) {
      tally.violatedPoints += violated;
      tally.violatedWeight += row.weight * violatedWeight;
      addViolated(tally, cell, violated, row.weight * violatedWeight, row.indices, rowStart, first, final);
    }
    start = end;
  }
  tally.points += row.to - row.from;
}

function addViolated(
  tally: Tally,
  cell: number,
  points: number,
  weight: number,
  indices: readonly number[],
  rowStart: number,
  first: number,
  final: number,
): void {
  const axes = indices.length + 1;
  let slot = tally.slotOf[cell] as number;
  const isNew = slot < 0;
  if (isNew) {
    slot = tally.violated.length;
    tally.slotOf[cell] = slot;
    if (slot === tally.violated.cell.length) tally.violated = doubled(tally.violated, axes);
    tally.violated.length += 1;
    tally.violated.cell[slot] = cell;
  }
  const records = tally.violated;
  records.points[slot] = (records.points[slot] as number) + points;
  records.weight[slot] = (records.weight[slot] as number) + weight;
  for (let axis = 0; axis < axes; axis += 1) {
    const entry = (slot * axes + axis) * 2;
    const low = axis < axes - 1 ? (indices[axis] as number) : first;
    const high = axis < axes - 1 ? low : final;
    if (isNew || low < (records.extreme[entry] as number)) {
      records.extreme[entry] = low;
      records.extremeAt[entry] = rowStart + first;
    }
    if (isNew || high > (records.extreme[entry + 1] as number)) {
      records.extreme[entry + 1] = high;
      records.extremeAt[entry + 1] = rowStart + final;
    }
  }
}

function room(slots: number, axes: number): ViolatedCells {
  return {
    length: 0,
    cell: new Int32Array(slots),
    points: new Float64Array(slots),
    weight: new Float64Array(slots),
    extreme: new Int32Array(slots * axes * 2),
    extremeAt: new Float64Array(slots * axes * 2),
  };
}

function doubled(records: ViolatedCells, axes: number): ViolatedCells {
  const larger = room(records.cell.length * 2, axes);
  larger.length = records.length;
  larger.cell.set(records.cell);
  larger.points.set(records.points);
  larger.weight.set(records.weight);
  larger.extreme.set(records.extreme);
  larger.extremeAt.set(records.extremeAt);
  return larger;
}
