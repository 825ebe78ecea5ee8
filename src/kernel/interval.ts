import type { Graph, NodeId } from '../graph/graph.ts';
import type { Signs } from '../graph/sign.ts';
import { smoothFunctions } from '../interval/functions.ts';
import { powerFunction } from '../interval/powers.ts';
import { makeScratch, type Scratch } from '../interval/scratch.ts';
import { expand, type Smooth } from '../interval/smooth.ts';
import { rational } from '../number/rational.ts';
import { makeFormOperations } from './form-operations.ts';
import { generateIntervals } from './interval-code.ts';

/** What an interval kernel tells of each output over a box, in this order, and then the share of each axis. */
export const outcome = { lower: 0, upper: 1, outside: 2, rest: 3, axes: 4 } as const;

/** Encloses outputs over boxes. */
export interface IntervalKernel {
  /**
   * Encloses the outputs over the box at `offset` in `boxes` (lower and upper bound of each variable in turn; infinite
   * ends allowed). Into `out`, for each output: lower and upper bound, whether it may lack a value somewhere on the
   * box (not 0), the error of its form, and the part of the form that each variable contributes.
   *
   * Faster for a box that shares ends with the one before: nodes of unchanged variables are not computed again.
   */
  evaluate(boxes: Float64Array, offset: number, out: Float64Array): void;
  /** Numbers in `out` for each output. */
  readonly stride: number;
}

type Part = (
  V: Float64Array,
  box: Float64Array,
  offset: number,
  changed: number,
  out: Float64Array,
  R: Scratch,
) => void;

/**
 * Compiles outputs to interval code: for every node a natural interval and a second-order form in the variables it
 * depends on, each tightening the other. Rounding is outward throughout. What `signs` calls positive is not zero, even where
 * its interval touches it. Throws a RangeError for a variable that is not named.
 */
export function compileIntervals(
  graph: Graph,
  outputs: readonly NodeId[],
  variables: readonly string[],
  signs?: Signs,
): IntervalKernel {
  const scratch = makeScratch();
  const code = generateIntervals(graph, outputs, variables, makeFormOperations(scratch), signs);
  const expansions = code.functions.map((name) => {
    const f: Smooth = typeof name === 'string' ? smoothFunctions[name] : powerFunction(rational(name[0], name[1]));
    return (registers: Scratch) => expand(f, registers);
  });
  const names = [...code.operations.map((_, index) => `f${index}`), ...expansions.map((_, index) => `e${index}`)];
  const parts = code.parts.map((text): Part => {
    const make = new Function(...names, `return (V, box, offset, changed, out, R) => {\n${text}\n};`);
    return make(...code.operations, ...expansions) as Part;
  });
  const { values } = code;
  const last = new Float64Array(2 * variables.length).fill(Number.NaN);
  return {
    stride: outcome.axes + variables.length,
    evaluate(boxes, offset, out) {
      let changed = 0;
      for (let index = 0; index < last.length; index++) {
        const end = boxes[offset + index] as number;
        // NaN differs from everything, so that the first box is all new.
        if (end === last[index]) continue;
        last[index] = end;
        changed |= 1 << (index >> 1);
      }
      for (let index = 0; index < parts.length; index++)
        (parts[index] as Part)(values, boxes, offset, changed, out, scratch);
    },
  };
}
