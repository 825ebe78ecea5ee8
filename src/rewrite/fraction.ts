import type { Graph, NodeId } from '../graph/graph.ts';
import { rational } from '../number/rational.ts';
import { productNode, times } from './product.ts';
import { sumOfNodes, termsOf } from './terms.ts';

/**
 * A sum with a term that has the factor 1/q, as numerator/q: 1 + 1/q = (q + 1)/q. Undefined when no term has one. The
 * first such q that `isWanted`.
 */
export function clearedSum(
  graph: Graph,
  id: NodeId,
  isWanted: (q: NodeId) => boolean = () => true,
): { readonly q: NodeId; readonly numerator: NodeId } | undefined {
  const terms = termsOf(graph, id);
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
