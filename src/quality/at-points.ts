import type { Graph, NodeId } from '../graph/graph.ts';
import { compileKernel } from '../kernel/float64.ts';

/** Evaluates outputs at a list of points; a coordinate that a point leaves out is NaN. One array an output. */
export type AtPoints = (points: readonly Readonly<Partial<Record<string, number>>>[]) => Float64Array[];

/** The outputs in double precision as a function of points with these variables. */
export function atPoints(graph: Graph, outputs: readonly NodeId[], variables: readonly string[]): AtPoints {
  // A kernel needs one variable at least; a constant output reads none.
  const named = variables.length === 0 ? ['unused'] : variables;
  const kernel = compileKernel(graph, outputs, [{ variables: named }]);
  return (points) => {
    const columns = named.map((name) => Float64Array.from(points, (point) => point[name] ?? Number.NaN));
    const results = outputs.map(() => new Float64Array(points.length));
    kernel.evaluate([columns], results);
    return results;
  };
}
