import { add, constant, sub } from '../graph/build.ts';
import type { Graph, NodeId } from '../graph/graph.ts';
import { rational } from '../number/rational.ts';
import { type Product, productNode, productOf, times } from './product.ts';
import { sumOf } from './sum.ts';

export function isSum(graph: Graph, id: NodeId): boolean {
  const node = graph.node(id);
  return node.kind === 'binary' && (node.op === 'add' || node.op === 'sub');
}

/**
 * A sum with a term that has the factor 1/q, as numerator/q: 1 + 1/q = (q + 1)/q. Undefined when no term has one. The
 * first such q that `isWanted`.
 */
export function clearedSum(
  graph: Graph,
  id: NodeId,
  isWanted: (q: NodeId) => boolean = () => true,
): { readonly q: NodeId; readonly numerator: NodeId } | undefined {
  const sum = sumOf(graph, id);
  const terms: Product[] = [...sum.terms].map(([term, coefficient]) => {
    const product = productOf(graph, term);
    return { ...product, coefficient: product.coefficient.mul(coefficient) };
  });
  if (!sum.constant.equals(0)) terms.push({ coefficient: sum.constant, factors: new Map() });
  const q = terms
    .flatMap(({ factors }) => [...factors])
    .find(([factor, exponent]) => exponent === -1 && isWanted(factor))?.[0];
  if (q === undefined) return undefined;
  const by = { coefficient: rational(1), factors: new Map([[q, 1]]) };
  const numerator = sumOfNodes(
    graph,
    terms.map((term) => productNode(graph, times(term, by))),
  );
  return { q, numerator };
}

/** The sum of some nodes; what is −x, or a negative number, is subtracted. */
export function sumOfNodes(graph: Graph, nodes: readonly NodeId[]): NodeId {
  return nodes.reduce((left, right) => {
    const node = graph.node(right);
    if (node.kind === 'rational' && node.value.s < 0n) return sub(graph, left, constant(graph, node.value.neg()));
    return node.kind === 'unary' && node.op === 'neg' ? sub(graph, left, node.args[0]) : add(graph, left, right);
  });
}
