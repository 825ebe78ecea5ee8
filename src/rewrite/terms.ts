import { add, constant, sub } from '../graph/build.ts';
import type { Graph, NodeId } from '../graph/graph.ts';
import { type Product, productOf } from './product.ts';
import { sumOf } from './sum.ts';

export function isSum(graph: Graph, id: NodeId): boolean {
  const node = graph.node(id);
  return node.kind === 'binary' && (node.op === 'add' || node.op === 'sub');
}

/** The terms of a sum as products, a constant last. */
export function termsOf(graph: Graph, id: NodeId): Product[] {
  const sum = sumOf(graph, id);
  const terms: Product[] = [...sum.terms].map(([term, coefficient]) => {
    const product = productOf(graph, term);
    return { ...product, coefficient: product.coefficient.mul(coefficient) };
  });
  return sum.constant.equals(0) ? terms : [...terms, { coefficient: sum.constant, factors: new Map() }];
}

/** The sum of some nodes; what is −x, or a negative number, is subtracted. */
export function sumOfNodes(graph: Graph, nodes: readonly NodeId[]): NodeId {
  return nodes.reduce((left, right) => {
    const node = graph.node(right);
    if (node.kind === 'rational' && node.value.s < 0n) return sub(graph, left, constant(graph, node.value.neg()));
    return node.kind === 'unary' && node.op === 'neg' ? sub(graph, left, node.args[0]) : add(graph, left, right);
  });
}
