import type { KernelRecord } from '../page/page-data.ts';
import { runKernel } from './kernel.ts';

/** A coordinate and the values it takes. */
export interface Line {
  readonly name: string;
  readonly values: Float64Array;
}

export interface ProjectionRequest {
  readonly kernel: number;
  readonly x: Line;
  readonly y: Line;
  /** Held coordinates have one value; over the others the lowest margin is taken. */
  readonly rest: readonly Line[];
}

export interface ProjectionResult {
  /** Row-major, x fastest; NaN where nothing has a value. */
  readonly margins: Float64Array;
  /** For each coordinate of the rest, where the lowest margin is taken. */
  readonly worstAt: readonly Float64Array[];
}

/** Points evaluated between two looks at the messages: some tens of milliseconds. */
const blockPoints = 2 ** 17;

/** The lowest margin over the rest, a part at a time: yields between the parts, returns the whole. */
export function* project(
  record: KernelRecord,
  { kernel, x, y, rest }: ProjectionRequest,
): Generator<undefined, ProjectionResult> {
  const [width, height] = [x.values.length, y.values.length];
  const inner = rest.reduce((product, { values }) => product * values.length, 1);
  const margins = new Float64Array(width * height).fill(Number.NaN);
  const worst = new Int32Array(width * height);
  const columns = Math.max(1, Math.min(width, Math.floor(blockPoints / inner)));
  const rows = columns < width ? 1 : Math.max(1, Math.floor(blockPoints / (inner * width)));
  for (let row = 0; row < height; row += rows) {
    for (let column = 0; column < width; column += columns) {
      const lines = new Map([
        ...rest.map((line) => [line.name, line.values] as const),
        [x.name, x.values.subarray(column, column + columns)],
        [y.name, y.values.subarray(row, row + rows)],
      ]);
      reduceBlock({ kernel, record, lines, rest, x: x.name, y: y.name, row, column, width }, margins, worst);
      yield;
    }
  }
  const worstAt = rest.map(({ values }, index) => {
    const stride = rest.slice(index + 1).reduce((product, line) => product * line.values.length, 1);
    return Float64Array.from(worst, (place) => values[Math.floor(place / stride) % values.length] as number);
  });
  return { margins, worstAt };
}

interface Block {
  readonly kernel: number;
  readonly record: KernelRecord;
  readonly lines: ReadonlyMap<string, Float64Array>;
  readonly rest: readonly Line[];
  readonly x: string;
  readonly y: string;
  readonly row: number;
  readonly column: number;
  readonly width: number;
}

function reduceBlock(
  { kernel, record, lines, rest, x, y, row, column, width }: Block,
  margins: Float64Array,
  worst: Int32Array,
): void {
  const axes = record.variables.map((name) => lines.get(name) as Float64Array);
  const out = new Float64Array(axes.reduce((size, { length }) => size * length, 1));
  runKernel(kernel, record, axes, [out]);
  // What one step along each loop moves in the picture, and in the list of the rest's places.
  const cellSteps = record.variables.map((name) => (name === x ? 1 : name === y ? width : 0));
  const restSteps = record.variables.map((name) => {
    const index = rest.findIndex((line) => line.name === name);
    return index < 0 ? 0 : rest.slice(index + 1).reduce((product, line) => product * line.values.length, 1);
  });
  const counters = axes.map(() => 0);
  let cell = row * width + column;
  let place = 0;
  const last = axes.length - 1;
  for (let index = 0; index < out.length; index++) {
    const value = out[index] as number;
    if (Number.isFinite(value) && !(value >= (margins[cell] as number))) {
      margins[cell] = value;
      worst[cell] = place;
    }
    for (let axis = last; axis >= 0; axis--) {
      cell += cellSteps[axis] as number;
      place += restSteps[axis] as number;
      const next = (counters[axis] as number) + 1;
      const length = axes[axis]?.length as number;
      if (next < length) {
        counters[axis] = next;
        break;
      }
      counters[axis] = 0;
      cell -= length * (cellSteps[axis] as number);
      place -= length * (restSteps[axis] as number);
    }
  }
}
