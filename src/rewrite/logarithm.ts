import { constant, div, mul, sub, unary } from '../graph/build.ts';
import type { Graph, NodeId } from '../graph/graph.ts';
import { reachable } from '../graph/traverse.ts';
import { keepsDomain } from './domain.ts';
import { polynomialDifference, polynomialOf } from './polynomial.ts';
import { type Product, productNode, productOf, quotient, sameProduct, unitProduct } from './product.ts';
import { mapGraph } from './simplify.ts';
import { isSum } from './terms.ts';

/**
 * c + k·log(1 + (e^(−c/k) − 1)·q) → k·log(1 + (e^(c/k) − 1)·(1 − q)), anywhere in a sum.
 *
 * Proof: c = k·log e^(c/k), so the left-hand side is k·log(e^(c/k) + (1 − e^(c/k))·q)
 * = k·log(1 + (e^(c/k) − 1)·(1 − q)). The argument of the new logarithm is e^(c/k) > 0 times that of the old, so both
 * have a value or neither. The left-hand side is a difference of two nearly equal terms where q is near 1.
 *
 * Only applied where every denominator, root and logarithm of the old form but the logarithm itself is still part of
 * the new, so that the new form has a value nowhere that the old has none.
 */
export function mergeLogarithms(graph: Graph, outputs: readonly NodeId[]): NodeId[] {
  return mapGraph(graph, outputs, (id) => {
    const node = graph.node(id);
    if (node.kind !== 'binary' || (node.op !== 'add' && node.op !== 'sub')) return id;
    const [left, right] = node.args;
    const sign = node.op === 'add' ? 1 : -1;
    return merged(graph, left, right, sign) ?? (sign === 1 ? merged(graph, right, left, 1) : undefined) ?? id;
  });
}

/** c + sign·term in one logarithm. */
function merged(graph: Graph, c: NodeId, term: NodeId, sign: 1 | -1): NodeId | undefined {
  const product = productOf(graph, term);
  for (const [factor, exponent] of product.factors) {
    const node = graph.node(factor);
    if (exponent !== 1 || node.kind !== 'unary' || node.op !== 'log1p') continue;
    const k = quotient(
      { ...product, coefficient: product.coefficient.mul(sign) },
      { coefficient: unitProduct.coefficient, factors: new Map([[factor, 1]]) },
    );
    const found = mergedWith(graph, c, k, node.args[0]);
    if (found !== undefined) return found;
  }
  return undefined;
}

function mergedWith(graph: Graph, c: NodeId, k: Product, argument: NodeId): NodeId | undefined {
  const ratio = quotient(productOf(graph, c), k);
  const wanted = { ...ratio, coefficient: ratio.coefficient.neg() };
  for (const id of reachable(graph, [argument])) {
    const node = graph.node(id);
    if (node.kind !== 'unary' || node.op !== 'expm1') continue;
    if (!sameProduct(productOf(graph, node.args[0]), wanted)) continue;
    const rest = complement(graph, quotient(productOf(graph, argument), productOf(graph, id)));
    if (rest === undefined) continue;
    const kNode = productNode(graph, k);
    const exponential = unary(graph, 'expm1', div(graph, c, kNode));
    const form = mul(graph, kNode, unary(graph, 'log1p', mul(graph, exponential, rest)));
    if (keepsDomain(graph, argument, form)) return form;
  }
  return undefined;
}

/** 1 − q, with what cancels between numerator and denominator cancelled; undefined when nothing does. */
function complement(graph: Graph, q: Product): NodeId | undefined {
  const sums = [...q.factors.keys()].filter((id) => isSum(graph, id));
  const atoms = new Set(sums.flatMap((id) => [...polynomialOf(graph, id).atoms]));
  for (const shape of [q, ...[...atoms].map((atom) => withFactor(graph, q, atom, sums))]) {
    if (shape === undefined) continue;
    const others = [...shape.factors].filter(([id]) => !sums.includes(id) && !atoms.has(id));
    if (others.length > 0) continue;
    const part = (sign: 1 | -1): Product => ({
      coefficient: sign === 1 ? shape.coefficient : unitProduct.coefficient,
      factors: new Map(
        [...shape.factors].filter(([, exponent]) => exponent * sign > 0).map(([id, e]) => [id, e * sign]),
      ),
    });
    const [top, bottom] = [part(1), part(-1)];
    const difference = polynomialDifference(graph, bottom, top);
    if (difference === undefined) continue;
    return div(graph, difference, productNode(graph, bottom));
  }
  const single = productNode(graph, q);
  return sums.length === 0 && q.factors.size <= 1 ? sub(graph, constant(graph, 1), single) : undefined;
}

/** q with the product of which an atom is made replaced by the atom, when nothing but sums is left then. */
function withFactor(graph: Graph, q: Product, atom: NodeId, sums: readonly NodeId[]): Product | undefined {
  const left = quotient(q, productOf(graph, atom));
  if ([...left.factors.keys()].some((id) => !sums.includes(id))) return undefined;
  return { coefficient: left.coefficient, factors: new Map([...left.factors, [atom, 1]]) };
}
