import type { AxisGrid } from './grid.ts';

/**
 * Fills out[k] with output k over the product of the slices: row-major, the last axis fastest. Every
 * out array has exactly the product of the slice lengths.
 */
export type EvaluateBlock = (axisSlices: readonly Float64Array[], out: readonly Float64Array[]) => void;

/** A box of grid indices: along each axis from `from` (included) to `to` (excluded). */
export interface Block {
  readonly from: readonly number[];
  readonly to: readonly number[];
  readonly points: number;
}

export const defaultBlockPoints = 2 ** 16;

/**
 * Cuts a product grid into blocks of at most `limit` points, in row-major order: whole inner axes, a
 * run along one axis, single values of the axes before it.
 */
export function* blocksOf(lengths: readonly number[], limit = defaultBlockPoints): Generator<Block> {
  let split = lengths.length - 1;
  let inner = 1;
  while (split > 0 && inner * (lengths[split] as number) <= limit) {
    inner *= lengths[split] as number;
    split -= 1;
  }
  const run = Math.max(1, Math.floor(limit / inner));
  const outer = lengths.slice(0, split);
  const outerPoints = outer.reduce((product, length) => product * length, 1);
  const splitLength = lengths[split] as number;
  for (let index = 0; index < outerPoints; index += 1) {
    const prefix = indicesOf(index, outer);
    for (let start = 0; start < splitLength; start += run) {
      const end = Math.min(start + run, splitLength);
      yield {
        from: [...prefix, start, ...lengths.slice(split + 1).map(() => 0)],
        to: [...prefix.map((value) => value + 1), end, ...lengths.slice(split + 1)],
        points: (end - start) * inner,
      };
    }
  }
}

/** The indices along each axis of a row-major index. */
export function indicesOf(index: number, lengths: readonly number[]): number[] {
  const indices = new Array<number>(lengths.length).fill(0);
  let rest = index;
  for (let axis = lengths.length - 1; axis >= 0; axis -= 1) {
    const length = lengths[axis] as number;
    indices[axis] = rest % length;
    rest = Math.floor(rest / length);
  }
  return indices;
}

/** The place of a row-major grid index, one value per axis. */
export function placeOf(index: number, grids: readonly AxisGrid[]): Float64Array {
  const indices = indicesOf(
    index,
    grids.map(({ values }) => values.length),
  );
  return Float64Array.from(grids, ({ values }, axis) => values[indices[axis] as number] as number);
}

/** One output of a block evaluator as a function of one place (the array is read, not kept). */
export function pointFunction(evaluate: EvaluateBlock, axes: number, output = 0, outputs = 1): PointFunction {
  const slices = Array.from({ length: axes }, () => new Float64Array(1));
  const out = Array.from({ length: outputs }, () => new Float64Array(1));
  return (place) => {
    for (const [axis, slice] of slices.entries()) slice[0] = place[axis] as number;
    evaluate(slices, out);
    return (out[output] as Float64Array)[0] as number;
  };
}

export type PointFunction = (place: Float64Array) => number;

/** A block evaluator of one output that asks a function point by point. */
export function blockFunction(f: PointFunction): EvaluateBlock {
  return (slices, [out]) => {
    const lengths = slices.map(({ length }) => length);
    const place = new Float64Array(slices.length);
    for (const point of (out as Float64Array).keys()) {
      let rest = point;
      for (let axis = slices.length - 1; axis >= 0; axis -= 1) {
        const length = lengths[axis] as number;
        place[axis] = (slices[axis] as Float64Array)[rest % length] as number;
        rest = Math.floor(rest / length);
      }
      (out as Float64Array)[point] = f(place);
    }
  };
}
