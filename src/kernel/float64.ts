import type { Graph, NodeId } from '../graph/graph.ts';
import { type Generated, generate } from './generate.ts';
import { type AxisGroup, planKernel } from './plan.ts';
import { erf, lambertW } from './special.ts';

export type { AxisGroup } from './plan.ts';

export interface Kernel {
  /**
   * Fills out[k] with output k over the product of the axes: row-major over the axes as given, the
   * last fastest. `values[axis][variable]` are the coordinates along each axis. Besides its arguments
   * it allocates tables of at most the product of the lengths of a proper subset of the axes.
   * Throws a RangeError for arrays whose number or lengths do not fit.
   */
  evaluate(values: readonly (readonly Float64Array[])[], out: readonly Float64Array[]): void;
  /** The generated JavaScript. */
  readonly source: string;
  /** Axis indices from the outermost loop to the innermost. */
  readonly loopOrder: readonly number[];
  /** How many operations are done for each point of which axes. */
  readonly operations: readonly { readonly axes: readonly number[]; readonly count: number }[];
}

type Compiled = (
  values: readonly (readonly Float64Array[])[],
  out: readonly Float64Array[],
  tables: readonly Float64Array[],
  ...functions: readonly ((x: number) => number)[]
) => void;

/**
 * Compiles the outputs to double-precision code for grids that are products of the axes. A
 * subexpression is evaluated once for each point of only those axes it depends on; the results are
 * those of a point-by-point evaluation, bit for bit. `lengths`, the expected axis lengths, guide the
 * order of the loops. Throws a RangeError for a variable that is on no axis.
 */
export function compileKernel(
  graph: Graph,
  outputs: readonly NodeId[],
  axes: readonly AxisGroup[],
  lengths?: readonly number[],
): Kernel {
  const plan = planKernel(graph, outputs, axes, lengths);
  const generated = generate(plan);
  const compiled = compile(generated.source);
  return {
    source: generated.source,
    loopOrder: plan.order,
    operations: [...plan.groups].map(([mask, ids]) => ({
      axes: axes.flatMap((_, axis) => (mask & (1 << axis) ? [axis] : [])),
      count: ids.length,
    })),
    evaluate(values, out) {
      const actual = checkedLengths(axes, outputs.length, values, out);
      compiled(values, out, allocateTables(generated, actual), erf, lambertW);
    },
  };
}

/**
 * One output as a function of a point, for searches that ask for one value at a time; the point has one value per
 * variable, in their order. The function keeps its own buffers, so it is not re-entrant.
 */
export function compilePoint(
  graph: Graph,
  output: NodeId,
  variables: readonly string[],
): (point: Float64Array) => number {
  // A kernel needs one variable at least; a constant output reads none.
  const plan = planKernel(graph, [output], [{ variables: variables.length === 0 ? ['unused'] : variables }]);
  const compiled = compile(generate(plan).source);
  const columns = (variables.length === 0 ? ['unused'] : variables).map(() => new Float64Array(1));
  const values = [columns];
  const result = new Float64Array(1);
  const out = [result];
  return (point) => {
    for (let index = 0; index < point.length; index++) (columns[index] as Float64Array)[0] = point[index] as number;
    compiled(values, out, [], erf, lambertW);
    return result[0] as number;
  };
}

function compile(source: string): Compiled {
  allowLargeFunctions();
  return new Function('values', 'out', 'tables', 'erf', 'lambertW', source) as Compiled;
}

function allocateTables({ tables }: Generated, lengths: readonly number[]): Float64Array[] {
  return tables.map(
    ({ axes, width }) => new Float64Array(axes.reduce((size, axis) => size * (lengths[axis] as number), width)),
  );
}

function checkedLengths(
  axes: readonly AxisGroup[],
  outputCount: number,
  values: readonly (readonly Float64Array[])[],
  out: readonly Float64Array[],
): number[] {
  if (values.length !== axes.length) throw new RangeError(`${values.length} axes of values for ${axes.length} axes`);
  const lengths = axes.map(({ variables }, axis) => {
    const arrays = values[axis] as readonly Float64Array[];
    const length = arrays[0]?.length ?? 0;
    if (arrays.length !== variables.length || arrays.some((array) => array.length !== length)) {
      throw new RangeError(`axis ${axis} needs ${variables.length} arrays of one length`);
    }
    return length;
  });
  const points = lengths.reduce((product, length) => product * length, 1);
  if (out.length !== outputCount || out.some((array) => array.length !== points)) {
    throw new RangeError(`${outputCount} output arrays of ${points} points are needed`);
  }
  return lengths;
}

/**
 * V8 leaves functions above 60 kB of bytecode to its interpreter, 20 to 40 times slower. Elsewhere
 * there is no such limit to lift. Setting the flag again changes nothing.
 */
function allowLargeFunctions(): void {
  const v8 = globalThis.process?.getBuiltinModule?.('node:v8');
  v8?.setFlagsFromString('--max-optimized-bytecode-size=10000000');
}
