import { power } from '../graph/build.ts';
import type { Graph, Node, NodeId } from '../graph/graph.ts';
import { reachable, rebuild } from '../graph/traverse.ts';
import { leafCount, sumNode, sumOf } from './sum.ts';

/**
 * The outputs with equal terms of sums joined, so that 1 − (1 − x) is x, and powers of powers merged where the inner
 * base is known not to be negative: (xᵃ)ᵇ = xᵃᵇ for x ≥ 0 (x > 0 where a is negative). Both are identities of real
 * numbers wherever the left-hand side has a value.
 */
export function simplify(graph: Graph, outputs: readonly NodeId[], nonNegative: ReadonlySet<string>): NodeId[] {
  return mapGraph(graph, outputs, (id) => {
    const node = graph.node(id);
    if (node.kind === 'power') return mergedPower(graph, node, nonNegative) ?? id;
    if (node.kind !== 'binary' || (node.op !== 'add' && node.op !== 'sub')) return id;
    const sum = sumOf(graph, id);
    const joined = sum.terms.size + (sum.constant.equals(0) ? 0 : 1);
    return joined < leafCount(graph, id) ? sumNode(graph, sum) : id;
  });
}

function mergedPower(graph: Graph, node: Extract<Node, { kind: 'power' }>, nonNegative: ReadonlySet<string>) {
  const inner = graph.node(node.args[0]);
  if (inner.kind !== 'power' || !isNonNegative(graph, inner.args[0], nonNegative)) return undefined;
  return power(graph, inner.args[0], inner.exponent.mul(node.exponent));
}

function isNonNegative(graph: Graph, id: NodeId, variables: ReadonlySet<string>): boolean {
  const node = graph.node(id);
  if (node.kind === 'variable') return variables.has(node.name);
  if (node.kind === 'power') return node.exponent.n % 2n === 0n || isNonNegative(graph, node.args[0], variables);
  return node.kind === 'unary' && (node.op === 'exp' || node.op === 'abs' || node.op === 'cosh');
}

/** Rebuilds the outputs, children first; each rebuilt node is replaced by what `change` answers for it. */
export function mapGraph(graph: Graph, outputs: readonly NodeId[], change: (id: NodeId) => NodeId): NodeId[] {
  const images = imagesOf(graph, outputs, change);
  return outputs.map((id) => images.get(id) as NodeId);
}

/** What mapGraph makes of every node below the outputs. */
export function imagesOf(
  graph: Graph,
  outputs: readonly NodeId[],
  change: (id: NodeId) => NodeId,
): ReadonlyMap<NodeId, NodeId> {
  const images = new Map<NodeId, NodeId>();
  for (const id of reachable(graph, outputs)) {
    images.set(id, change(rebuild(graph, graph.node(id), id, (argument) => images.get(argument) as NodeId)));
  }
  return images;
}
