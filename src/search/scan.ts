import { type Block, blocksOf, defaultBlockPoints, type EvaluateBlock, placeOf } from './block.ts';
import { candidateCells } from './candidates.ts';
import { layCells } from './cells.ts';
import type { AxisGrid } from './grid.ts';
import { addRow, emptyTally, type Tally } from './tally.ts';

export interface Spot {
  readonly place: Float64Array;
  readonly value: number;
}

export type SearchStop = 'complete' | 'budget';

export interface ScanOptions {
  /** One per output; a point is violated where its value is below −tolerance. */
  readonly tolerances: readonly number[];
  /** Points that may be evaluated, each with all outputs. */
  readonly budget?: number;
  readonly blockPoints?: number;
  /** Cells kept for each output; memory is about 20 bytes a cell and 30 + 24·axes a violated cell. */
  readonly cells?: number;
  /** Starting points kept for local searches. */
  readonly candidates?: number;
  /** Called after each block with the points evaluated so far. */
  readonly progress?: (points: number) => void;
}

/** What a scan saw of one output. */
export interface ScanOutput {
  readonly points: number;
  readonly tolerance: number;
  /** Points whose value is NaN or infinite: neither good nor violated. */
  readonly withoutValue: number;
  readonly firstWithoutValue: Float64Array | undefined;
  /** The smallest value on the grid; undefined where no point has a value. */
  readonly minimum: Spot | undefined;
  readonly violatedPoints: number;
  /** Weight of the violated points over that of the points with a value (0 when there are none). */
  readonly violatedShare: number;
  readonly valuedWeight: number;
  /** Starting points for local searches, smallest first. */
  readonly candidates: readonly Spot[];
  readonly tally: Readonly<Tally>;
}

export interface Scan {
  readonly outputs: readonly ScanOutput[];
  readonly points: number;
  readonly blocks: number;
  /** `budget`: only the first points in row-major order were seen, and shares speak of these. */
  readonly stop: SearchStop;
}

/**
 * Evaluates the outputs on the product of the grids, block by block, and reduces each in place. Memory
 * depends on the block and the number of cells, not on the number of points.
 */
export function scanGrid(evaluate: EvaluateBlock, grids: readonly AxisGrid[], options: ScanOptions): Scan {
  const { tolerances, budget = Infinity, blockPoints = defaultBlockPoints, cells = 2 ** 17, candidates = 64 } = options;
  const lengths = grids.map(({ values }) => values.length);
  const layout = layCells(lengths, cells);
  const tallies = tolerances.map((tolerance) => emptyTally(layout, tolerance));
  const buffers = tolerances.map(() => new Float64Array(0));
  let points = 0;
  let blocks = 0;
  let stop: SearchStop = 'complete';
  for (const block of blocksOf(lengths, blockPoints)) {
    if (points + block.points > budget) {
      stop = 'budget';
      break;
    }
    for (const [index, buffer] of buffers.entries()) {
      if (buffer.length < block.points) buffers[index] = new Float64Array(block.points);
    }
    const out = buffers.map((buffer) => buffer.subarray(0, block.points));
    const slices = grids.map(({ values }, axis) => values.subarray(block.from[axis], block.to[axis]));
    evaluate(slices, out);
    addBlock(tallies, out, block, grids);
    points += block.points;
    blocks += 1;
    options.progress?.(points);
  }
  return { outputs: tallies.map((tally) => outputOf(tally, grids, candidates)), points, blocks, stop };
}

function addBlock(
  tallies: readonly Tally[],
  out: readonly Float64Array[],
  { from, to }: Block,
  grids: readonly AxisGrid[],
): void {
  const last = grids.length - 1;
  const lastWeights = (grids[last] as AxisGrid).weights;
  const [rowFrom, rowTo] = [from[last] as number, to[last] as number];
  const indices = from.slice(0, last);
  for (let offset = 0; ; offset += rowTo - rowFrom) {
    let weight = 1;
    for (let axis = 0; axis < last; axis += 1) {
      weight *= (grids[axis] as AxisGrid).weights[indices[axis] as number] as number;
    }
    const row = { indices, weight, from: rowFrom, to: rowTo, lastWeights };
    for (let output = 0; output < tallies.length; output += 1) {
      addRow(tallies[output] as Tally, out[output] as Float64Array, offset, row);
    }
    let axis = last - 1;
    while (axis >= 0) {
      indices[axis] = (indices[axis] as number) + 1;
      if ((indices[axis] as number) < (to[axis] as number)) break;
      indices[axis] = from[axis] as number;
      axis -= 1;
    }
    if (axis < 0) return;
  }
}

function outputOf(tally: Tally, grids: readonly AxisGrid[], candidates: number): ScanOutput {
  const spots = candidateCells(tally, candidates).map((cell) => ({
    place: placeOf(tally.minimumAt[cell] as number, grids),
    value: tally.minimum[cell] as number,
  }));
  return {
    points: tally.points,
    tolerance: -tally.level,
    withoutValue: tally.withoutValue,
    firstWithoutValue: tally.firstWithoutValue < 0 ? undefined : placeOf(tally.firstWithoutValue, grids),
    // The cell of the smallest value is smaller than its neighbours, so it is the first candidate.
    minimum: spots[0],
    violatedPoints: tally.violatedPoints,
    violatedShare: tally.valuedWeight > 0 ? tally.violatedWeight / tally.valuedWeight : 0,
    valuedWeight: tally.valuedWeight,
    candidates: spots,
    tally,
  };
}
