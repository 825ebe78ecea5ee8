import { argumentsOf, type Graph, type NodeId } from '../graph/graph.ts';

/**
 * The nodes of one variable through which alone that variable reaches the outputs: all that the outputs see of the
 * variable is the value of such a node, so that its place on its own range may stand for the variable's on the box, and
 * the next such node may be seen as a function of it.
 */
export function soleWays(
  graph: Graph,
  ids: readonly NodeId[],
  outputs: readonly NodeId[],
  masks: ReadonlyMap<NodeId, number>,
): Set<NodeId> {
  const maskOf = (id: NodeId) => masks.get(id) as number;
  const isSingle = (id: NodeId) => maskOf(id) !== 0 && (maskOf(id) & (maskOf(id) - 1)) === 0;
  // The last node before each through which all ways from its variable lead; none for the variable.
  const before = new Map<NodeId, NodeId | undefined>();
  const lastOf = new Map<number, NodeId>();
  for (const id of ids.filter(isSingle)) {
    const args = argumentsOf(graph.node(id)).filter((argument) => maskOf(argument) !== 0);
    before.set(id, args.length === 0 ? undefined : args.reduce(meeting));
  }
  const leave = (id: NodeId) => {
    if (!isSingle(id)) return;
    const known = lastOf.get(maskOf(id));
    lastOf.set(maskOf(id), known === undefined ? id : meeting(known, id));
  };
  for (const id of outputs) leave(id);
  for (const id of ids) if (!isSingle(id)) for (const argument of argumentsOf(graph.node(id))) leave(argument);
  const found = new Set<NodeId>();
  for (const last of lastOf.values()) {
    // The variable itself runs along its interval already.
    for (let id: NodeId | undefined = last; id !== undefined && before.get(id) !== undefined; id = before.get(id)) {
      found.add(id);
    }
  }
  return found;

  /** The last node that all ways to both lead through; the later of two nodes has the greater id. */
  function meeting(a: NodeId, b: NodeId): NodeId {
    let [first, second] = [a, b];
    while (first !== second) {
      if (first > second) first = before.get(first) as NodeId;
      else second = before.get(second) as NodeId;
    }
    return first;
  }
}
