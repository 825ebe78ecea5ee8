import { div, power } from '../graph/build.ts';
import type { Graph, NodeId } from '../graph/graph.ts';
import type { Signs } from '../graph/sign.ts';
import { rational } from '../number/rational.ts';
import { type Product, productNode, productOf, quotient, raised, times } from './product.ts';
import { mapGraph } from './simplify.ts';
import { isSum, sumOfNodes, termsOf } from './terms.ts';

/**
 * g·√(c²/(kg + b)² + …) → √((c/k)²·(kg/(kg + b))² + g²·…) for g ≥ 0: g = √g² then. Where the left-hand side has a value
 * so has the right, and nowhere else: no denominator changes. The quotient that is left lies between 0 and 1 for b ≥ 0,
 * where the two sides of the product are 0 and without end as g and b come to 0.
 */
export function joinRoots(graph: Graph, outputs: readonly NodeId[], signs: Signs): NodeId[] {
  return mapGraph(graph, outputs, (id) => {
    const node = graph.node(id);
    return node.kind === 'binary' && (node.op === 'mul' || node.op === 'div') ? (joined(graph, id, signs) ?? id) : id;
  });
}

function joined(graph: Graph, id: NodeId, signs: Signs): NodeId | undefined {
  const product = productOf(graph, id);
  for (const [factor, exponent] of product.factors) {
    const node = graph.node(factor);
    const isRoot = exponent === 1 && node.kind === 'power' && node.exponent.equals(rational(1, 2));
    if (!isRoot || !isSum(graph, node.args[0])) continue;
    const terms = termsOf(graph, node.args[0]);
    for (const part of denominatorTerms(graph, terms)) {
      const g: Product = { coefficient: rational(1), factors: part.term.factors };
      if (![...g.factors].every(([own, needed]) => needed > 0 && (product.factors.get(own) ?? 0) >= needed)) continue;
      if (!signs.isNonNegative(productNode(graph, g))) continue;
      const share = productOf(graph, div(graph, part.node, part.denominator));
      const scale = part.term.coefficient.inverse();
      const inside = terms.map((term) => {
        if (term.factors.get(part.denominator) !== -2) return times(term, raised(g, 2));
        const rest = times(term, { coefficient: scale.mul(scale), factors: new Map([[part.denominator, 2]]) });
        return times(rest, raised(share, 2));
      });
      const root = power(
        graph,
        sumOfNodes(
          graph,
          inside.map((term) => productNode(graph, term)),
        ),
        rational(1, 2),
      );
      const others = quotient(product, times(g, { coefficient: rational(1), factors: new Map([[factor, 1]]) }));
      return productNode(graph, times(others, { coefficient: rational(1), factors: new Map([[root, 1]]) }));
    }
  }
  return undefined;
}

/** Both terms of each sum whose square some term is divided by. */
function denominatorTerms(graph: Graph, terms: readonly Product[]) {
  return terms.flatMap(({ factors }) =>
    [...factors].flatMap(([denominator, exponent]) => {
      const node = graph.node(denominator);
      if (exponent !== -2 || node.kind !== 'binary' || node.op !== 'add') return [];
      return node.args.map((part) => ({ denominator, node: part, term: productOf(graph, part) }));
    }),
  );
}
