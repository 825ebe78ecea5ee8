import { argumentsOf, type Graph, type NodeId } from '../graph/graph.ts';

/** The axes that each node depends on, as bits. Throws a RangeError for a variable that is not named. */
export function axesOfNodes(graph: Graph, ids: readonly NodeId[], variables: readonly string[]): Map<NodeId, number> {
  const masks = new Map<NodeId, number>();
  for (const id of ids) {
    const node = graph.node(id);
    if (node.kind !== 'variable') {
      const mask = argumentsOf(node).reduce((all, argument) => all | (masks.get(argument) as number), 0);
      masks.set(id, mask);
      continue;
    }
    const axis = variables.indexOf(node.name);
    if (axis < 0) throw new RangeError(`the variable ${node.name} has no axis`);
    masks.set(id, 1 << axis);
  }
  return masks;
}
