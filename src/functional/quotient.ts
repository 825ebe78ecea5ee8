import { add, choice, constant, div, mul, neg, sub } from '../graph/build.ts';
import type { Graph, NodeId } from '../graph/graph.ts';

/**
 * energy/unit, with the unit cancelled where the energy shows it as a factor. The unit 3k_F/(4π) is
 * positive at every density, so cancelling it is exact; without it a weighted sum of enhancement
 * factors would keep round-off from r_s.
 */
export function quotientByUnit(graph: Graph, energy: NodeId, unit: NodeId): NodeId {
  const quotients = new Map<NodeId, NodeId | undefined>();
  return cancelled(energy) ?? div(graph, energy, unit);

  function cancelled(id: NodeId): NodeId | undefined {
    if (!quotients.has(id)) quotients.set(id, cancelUnit(graph, id, unit, cancelled));
    return quotients.get(id);
  }
}

function cancelUnit(
  graph: Graph,
  id: NodeId,
  unit: NodeId,
  cancelled: (id: NodeId) => NodeId | undefined,
): NodeId | undefined {
  if (id === unit) return constant(graph, 1);
  const node = graph.node(id);
  if (node.kind === 'rational' && node.value.equals(0)) return id;
  if (node.kind === 'unary' && node.op === 'neg') return map(cancelled(node.args[0]), (x) => neg(graph, x));
  if (node.kind === 'choice') {
    const [a, b, whenTrue, whenFalse] = node.args;
    const first = cancelled(whenTrue);
    const second = cancelled(whenFalse);
    return first === undefined || second === undefined ? undefined : choice(graph, node.op, a, b, first, second);
  }
  if (node.kind !== 'binary') return undefined;
  const [left, right] = node.args;
  const first = cancelled(left);
  switch (node.op) {
    case 'mul':
      if (first !== undefined) return mul(graph, first, right);
      return map(cancelled(right), (x) => mul(graph, left, x));
    case 'div':
      return map(first, (x) => div(graph, x, right));
    case 'add':
    case 'sub': {
      const second = cancelled(right);
      if (first === undefined || second === undefined) return undefined;
      return (node.op === 'add' ? add : sub)(graph, first, second);
    }
    default:
      return undefined;
  }
}

function map(value: NodeId | undefined, change: (value: NodeId) => NodeId): NodeId | undefined {
  return value === undefined ? undefined : change(value);
}
