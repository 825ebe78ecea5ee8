import { argumentsOf, type Graph, type NodeId } from '../graph/graph.ts';
import { reachable } from '../graph/traverse.ts';
import type { Decimal } from '../number/decimal.ts';
import { evaluateInto } from './decimal.ts';

/** The value of one node while some variables move and all others stay. */
export type LineFunction = (moving: ReadonlyMap<string, Decimal>, digits: number) => Decimal;

/**
 * A node along a line: what does not depend on the moving variables is evaluated once for each number of digits.
 * Infinities and NaN as in `evaluateDecimal`.
 */
export function decimalLine(
  graph: Graph,
  node: NodeId,
  still: ReadonlyMap<string, Decimal>,
  moving: ReadonlySet<string>,
): LineFunction {
  const moved = dependents(graph, node, moving);
  const settledFor = new Map<number, Map<NodeId, Decimal>>();
  return (values, digits) => {
    const settled = settledFor.get(digits) ?? new Map<NodeId, Decimal>();
    settledFor.set(digits, settled);
    const known = new Map(settled);
    const [result] = evaluateInto(known, graph, [node], new Map([...still, ...values]), digits);
    for (const [id, value] of known) if (!moved.has(id)) settled.set(id, value);
    return result as Decimal;
  };
}

function dependents(graph: Graph, output: NodeId, variables: ReadonlySet<string>): Set<NodeId> {
  const found = new Set<NodeId>();
  for (const id of reachable(graph, [output])) {
    const node = graph.node(id);
    const depends =
      node.kind === 'variable' ? variables.has(node.name) : argumentsOf(node).some((argument) => found.has(argument));
    if (depends) found.add(id);
  }
  return found;
}
