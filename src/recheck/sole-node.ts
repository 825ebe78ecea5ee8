import { argumentsOf, type Graph, type NodeId } from '../graph/graph.ts';

/**
 * Of each variable the node through which alone it reaches the output, where there is one: whatever depends on other
 * variables too sees of this one the value of that node, or sums and products of it with constants, and nothing else.
 * So a form may take the node's place on its own range for the variable's place on the box.
 */
export function soleNodes(
  graph: Graph,
  ids: readonly NodeId[],
  output: NodeId,
  axesOf: (id: NodeId) => number,
): Set<NodeId> {
  const seen = new Map<number, Set<NodeId>>();
  const look = (id: NodeId) => {
    const axis = axesOf(id);
    if (!isSingle(axis)) return;
    const nodes = seen.get(axis) ?? new Set();
    seen.set(axis, nodes.add(bareOf(id)));
  };
  look(output);
  for (const id of ids) if (!isSingle(axesOf(id))) argumentsOf(graph.node(id)).forEach(look);
  const found = new Set<NodeId>();
  for (const nodes of seen.values()) {
    const [only, second] = nodes;
    if (only !== undefined && second === undefined) found.add(only);
  }
  return found;

  /** A node without the constants that it is added to or multiplied by: forms keep these without error. */
  function bareOf(id: NodeId): NodeId {
    const node = graph.node(id);
    if (node.kind === 'unary' && node.op === 'neg') return bareOf(node.args[0]);
    if (node.kind !== 'binary' || !(node.op === 'add' || node.op === 'sub' || node.op === 'mul')) return id;
    const inner = node.args.filter((part) => axesOf(part) !== 0);
    return inner.length === 1 ? bareOf(inner[0] as NodeId) : id;
  }
}

const isSingle = (axes: number) => axes !== 0 && (axes & (axes - 1)) === 0;
