import { differentiate, differentiateAll } from '../derivative/differentiate.ts';
import type { Graph, NodeId } from '../graph/graph.ts';
import type { Energy } from './energies.ts';

/** An energy, or a derivative of one by `by`, one name for each time. */
export interface Derivative {
  readonly symbol: string;
  readonly by: readonly string[];
  readonly node: NodeId;
}

/** Each energy with all its partial derivatives of first and second order in the variables. */
export function derivativesToSecondOrder(
  graph: Graph,
  energies: readonly Energy[],
  variables: readonly string[],
): Derivative[] {
  const values = energies.map(({ symbol, node }): Derivative => ({ symbol, node, by: [] }));
  const firsts = variables.map((name) => derivativesBy(graph, values, name));
  const seconds = variables.map((name, index) => derivativesBy(graph, firsts.slice(0, index + 1).flat(), name));
  return [...values, ...firsts.flat(), ...seconds.flat()];
}

function derivativesBy(graph: Graph, of: readonly Derivative[], name: string): Derivative[] {
  const nodes = differentiateAll(
    graph,
    of.map(({ node }) => node),
    name,
  );
  return of.map(({ symbol, by }, index) => ({ symbol, by: [...by, name], node: nodes[index] as NodeId }));
}

/** The derivatives of orders 0 to `most` of a node by one variable. */
export function derivativesAlong(graph: Graph, node: NodeId, name: string, most: number): NodeId[] {
  const derivatives = [node];
  while (derivatives.length <= most) derivatives.push(differentiate(graph, derivatives.at(-1) as NodeId, name));
  return derivatives;
}
