import type { Graph, NodeId } from '../graph/graph.ts';
import { smoothFunctions } from '../interval/functions.ts';
import { powerFunction } from '../interval/powers.ts';
import { makeScratch, type Scratch } from '../interval/scratch.ts';
import { imageOf, lineThrough, type Smooth } from '../interval/smooth.ts';
import { productDown, productUp } from '../interval/widen.ts';
import { rational } from '../number/rational.ts';
import { generateIntervals, type IntervalOptions } from './interval-code.ts';

export type { IntervalOptions } from './interval-code.ts';

/** What an interval kernel tells of each output over a box, in this order, and then the share of each axis. */
export const outcome = { lower: 0, upper: 1, outside: 2, rest: 3, axes: 4 } as const;

/** Encloses outputs over boxes. */
export interface IntervalKernel {
  /**
   * Encloses the outputs over the box at `offset` in `boxes` (lower and upper bound of each variable in turn; infinite
   * ends allowed). Into `out`, for each output: lower and upper bound, whether it may lack a value somewhere on the
   * box (not 0), the part of the enclosure that is not linear, and the linear part that each variable contributes.
   */
  evaluate(boxes: Float64Array, offset: number, out: Float64Array): void;
  /** Numbers in `out` for each output. */
  readonly stride: number;
}

type Compiled = (
  box: Float64Array,
  offset: number,
  out: Float64Array,
  R: Scratch,
  V: Float64Array,
  images: readonly ((scratch: Scratch) => void)[],
  lines: readonly ((scratch: Scratch) => void)[],
  multiply: (scratch: Scratch) => void,
) => void;

/**
 * Compiles outputs to interval code: for every node a natural interval, and with `affine` a first-order form
 * centre + Σ coefficient·ε + error in the variables it depends on, each tightening the other. Rounding is outward
 * throughout. Throws a RangeError for a variable that is not named.
 */
export function compileIntervals(
  graph: Graph,
  outputs: readonly NodeId[],
  variables: readonly string[],
  options: IntervalOptions = { affine: true },
): IntervalKernel {
  const { parts, functions, slots } = generateIntervals(graph, outputs, variables, options);
  const compiled = parts.map(
    (part) => new Function('box', 'offset', 'out', 'R', 'V', 'images', 'lines', 'multiply', part) as Compiled,
  );
  const smooth = functions.map((name): Smooth => {
    if (typeof name === 'string') return smoothFunctions[name];
    return powerFunction(rational(name[0], name[1]));
  });
  const scratch = makeScratch();
  const images = smooth.map((f) => (registers: Scratch) => imageOf(f, registers));
  const lines = smooth.map((f) => (registers: Scratch) => lineThrough(f, registers));
  const kept = new Float64Array(slots);
  return {
    stride: outcome.axes + variables.length,
    evaluate: (boxes, offset, out) => {
      for (let part = 0; part < compiled.length; part++)
        (compiled[part] as Compiled)(boxes, offset, out, scratch, kept, images, lines, multiply);
    },
  };
}

/** The product of the intervals in registers 0, 1 and 2, 3 where the code in line does not suffice. */
function multiply(scratch: Scratch): void {
  const [al, au, bl, bu] = scratch as unknown as [number, number, number, number];
  const lower = Math.min(productDown(al, bl), productDown(al, bu), productDown(au, bl), productDown(au, bu));
  const upper = Math.max(productUp(al, bl), productUp(al, bu), productUp(au, bl), productUp(au, bu));
  const valid = lower <= upper;
  scratch[0] = valid ? lower : Number.NEGATIVE_INFINITY;
  scratch[1] = valid ? upper : Number.POSITIVE_INFINITY;
}
