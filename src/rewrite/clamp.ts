import { binary, choice, rationalValue } from '../graph/build.ts';
import type { Graph, NodeId } from '../graph/graph.ts';
import { reachable, rebuild } from '../graph/traverse.ts';
import { mapGraph } from './simplify.ts';

/**
 * (x ≤ c ? A(x) : B(x)) → (x ≤ c ? A(min(x, c)) : B(max(x, c))) for a constant c that is not zero, and so for x < c and
 * with the sides changed. Each branch counts only where its argument is what it was, so that values and domain stay.
 * On a box that c divides, intervals see no more of a branch than the part where it counts.
 */
export function clampBranches(graph: Graph, outputs: readonly NodeId[]): NodeId[] {
  return mapGraph(graph, outputs, (id) => {
    const node = graph.node(id);
    if (node.kind !== 'choice') return id;
    const [left, right, whenTrue, whenFalse] = node.args;
    const isBelow = isSwitch(graph, right) && !isConstant(graph, left);
    const isAbove = isSwitch(graph, left) && !isConstant(graph, right);
    if (!isBelow && !isAbove) return id;
    const [x, c] = isBelow ? [left, right] : [right, left];
    if (graph.node(x).kind === 'variable') return id;
    const [first, second] = isBelow ? (['min', 'max'] as const) : (['max', 'min'] as const);
    const replaced = (branch: NodeId, op: 'min' | 'max') => withNode(graph, branch, x, binary(graph, op, x, c));
    return choice(graph, node.op, left, right, replaced(whenTrue, first), replaced(whenFalse, second));
  });
}

function isConstant(graph: Graph, id: NodeId): boolean {
  return rationalValue(graph, id) !== undefined;
}

/** A comparison with zero says that something is not zero, which the branches need as it stands. */
function isSwitch(graph: Graph, id: NodeId): boolean {
  const value = rationalValue(graph, id);
  return value !== undefined && !value.equals(0);
}

/** A node with one node below it replaced by another, which may contain it. */
function withNode(graph: Graph, output: NodeId, old: NodeId, by: NodeId): NodeId {
  const images = new Map<NodeId, NodeId>();
  for (const id of reachable(graph, [output])) {
    if (id === old) images.set(id, by);
    else
      images.set(
        id,
        rebuild(graph, graph.node(id), id, (argument) => images.get(argument) as NodeId),
      );
  }
  return images.get(output) as NodeId;
}
