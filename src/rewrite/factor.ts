import { div, neg, unary } from '../graph/build.ts';
import type { Graph, NodeId } from '../graph/graph.ts';
import type { Signs } from '../graph/sign.ts';
import { variablesOf } from '../graph/traverse.ts';
import { rational } from '../number/rational.ts';
import { keepsDomain } from './domain.ts';
import { clearedSum } from './fraction.ts';
import { type Product, productNode, productOf, quotient, times } from './product.ts';
import { imagesOf } from './simplify.ts';
import { leafCount, type Sum, sumNode, sumOf } from './sum.ts';
import { isSum, sumOfNodes, termsOf } from './terms.ts';

/**
 * a·x + a·y + z → a·(x + y) + z, anywhere in a sum, and products with what is in both their parts cancelled. Both are
 * identities of a field wherever the left-hand side has a value; an output that would gain points is left as it is.
 *
 * A derivative repeats the factors of what it is the derivative of in each of its terms, and intervals do not see that
 * they are the same: a·x + a·y is an interval at least as wide as a·(x + y).
 */
export function factorSums(graph: Graph, outputs: readonly NodeId[], signs?: Signs): NodeId[] {
  const images = factoredImages(graph, outputs);
  return outputs.map((old) => {
    const form = images.get(old) as NodeId;
    const isKept = keepsDomain(graph, old, form, { image: (id) => images.get(id) as NodeId, ...(signs && { signs }) });
    return isKept ? form : old;
  });
}

/**
 * The constant that an output is at every point where it has a value, when factoring shows it to be one; undefined else.
 * Unlike in factorSums nothing is kept of where that is.
 */
export function constantValue(graph: Graph, output: NodeId): NodeId | undefined {
  const form = factoredImages(graph, [output]).get(output) as NodeId;
  return variablesOf(graph, [form]).size === 0 ? form : undefined;
}

function factoredImages(graph: Graph, outputs: readonly NodeId[]): ReadonlyMap<NodeId, NodeId> {
  return imagesOf(graph, outputs, (id) => {
    const node = graph.node(id);
    if (isSum(graph, id)) return factored(graph, id);
    const isProduct = node.kind === 'binary' ? node.op === 'mul' || node.op === 'div' : node.kind === 'power';
    return isProduct ? cancelled(graph, id) : id;
  });
}

/** The node as one quotient of two products. */
function cancelled(graph: Graph, id: NodeId): NodeId {
  return productNode(graph, joined(graph, productOf(graph, id)));
}

function factored(graph: Graph, id: NodeId): NodeId {
  const sum = sumOf(graph, id);
  const fraction = joinedFraction(graph, id, joinedCount(sum));
  if (fraction !== undefined) return fraction;
  const found = grouped(graph, termsOf(graph, id));
  if (found === undefined)
    return joinedCount(sum) < leafCount(graph, id) || joinedCount(sum) > 2 ? inOrder(graph, sum) : id;
  return sumOfNodes(graph, found);
}

/** The terms in the order of ids, so that equal sums are one node. */
function inOrder(graph: Graph, { constant: rest, terms }: Sum): NodeId {
  return sumNode(graph, { constant: rest, terms: new Map([...terms].sort(([a], [b]) => a - b)) });
}

/** 1 + (a − b)/(a + b) → 2a/(a + b): over one denominator where the numerator becomes shorter. */
function joinedFraction(graph: Graph, id: NodeId, count: number): NodeId | undefined {
  const cleared = clearedSum(graph, id, (q) => isSum(graph, q));
  if (cleared === undefined) return undefined;
  const numerator = sumOf(graph, cleared.numerator);
  return joinedCount(numerator) < count ? div(graph, sumNode(graph, numerator), cleared.q) : undefined;
}

/** The terms with those that share the most frequent factor joined, and so on; undefined when none is shared. */
function grouped(graph: Graph, terms: readonly Product[]): NodeId[] | undefined {
  const shared = mostShared(terms);
  if (shared === undefined) return undefined;
  const has = (term: Product) => shared.sign * (term.factors.get(shared.factor) ?? 0) > 0;
  const inside = terms.filter(has);
  const outside = terms.filter((term) => !has(term));
  const common = commonFactor(inside);
  const left = inside.map((term) => quotient(term, common));
  const sum = summed(graph, grouped(graph, left) ?? left.map((term) => productNode(graph, joined(graph, term))));
  const whole = times(common, productOf(graph, sum));
  return [
    productNode(graph, joined(graph, whole)),
    ...(grouped(graph, outside) ?? outside.map((term) => productNode(graph, joined(graph, term)))),
  ];
}

/** The sum of some nodes, with equal terms inside them joined. */
function summed(graph: Graph, nodes: readonly NodeId[]): NodeId {
  const id = sumOfNodes(graph, nodes);
  const sum = sumOf(graph, id);
  return joinedCount(sum) < leafCount(graph, id) || joinedCount(sum) > 2 ? inOrder(graph, sum) : id;
}

const joinedCount = (sum: Sum) => sum.terms.size + (sum.constant.equals(0) ? 0 : 1);

function mostShared(terms: readonly Product[]): { factor: NodeId; sign: 1 | -1 } | undefined {
  const counts = new Map<string, { factor: NodeId; sign: 1 | -1; count: number }>();
  for (const { factors } of terms) {
    for (const [factor, exponent] of factors) {
      const sign = exponent > 0 ? 1 : -1;
      const known = counts.get(`${factor} ${sign}`) ?? { factor, sign, count: 0 };
      counts.set(`${factor} ${sign}`, { ...known, count: known.count + 1 });
    }
  }
  const best = [...counts.values()].reduce<{ factor: NodeId; sign: 1 | -1; count: number } | undefined>(
    (found, next) => (found === undefined || next.count > found.count ? next : found),
    undefined,
  );
  return best !== undefined && best.count > 1 ? best : undefined;
}

/** What all products have in common, with coefficient 1. */
function commonFactor(terms: readonly Product[]): Product {
  const [first, ...others] = terms as [Product, ...Product[]];
  const factors = new Map<NodeId, number>();
  for (const [factor, exponent] of first.factors) {
    const exponents = [exponent, ...others.map((term) => term.factors.get(factor) ?? 0)];
    const sign = Math.sign(exponent);
    const least = Math.min(...exponents.map((value) => value * sign));
    if (least > 0) factors.set(factor, sign * least);
  }
  return { coefficient: rational(1), factors };
}

/** The product with eˣ/(eˣ − 1) = −1/(e^(−x) − 1), and (1/q)/(1 + 1/q) = 1/(q + 1) for sums of such terms. */
function joined(graph: Graph, product: Product): Product {
  return withFractionsJoined(graph, withExponentialsJoined(graph, product));
}

function withExponentialsJoined(graph: Graph, product: Product): Product {
  let result = product;
  for (const [factor, exponent] of product.factors) {
    const node = graph.node(factor);
    if (exponent < 0 || node.kind !== 'unary' || node.op !== 'exp') continue;
    const denominator = unary(graph, 'expm1', node.args[0]);
    const count = Math.min(exponent, -(product.factors.get(denominator) ?? 0));
    if (!(count > 0)) continue;
    const mirror = unary(graph, 'expm1', neg(graph, node.args[0]));
    const change = new Map([[factor, -count] as const, [denominator, count] as const]);
    const inverse = { coefficient: rational(-1).pow(count) ?? rational(1), factors: new Map([[mirror, -count]]) };
    result = times(times(result, { coefficient: rational(1), factors: change }), inverse);
  }
  return result;
}

function withFractionsJoined(graph: Graph, product: Product): Product {
  for (const [factor, exponent] of product.factors) {
    if (exponent >= 0 || !isSum(graph, factor)) continue;
    const isBelow = (q: NodeId) => q !== factor && (product.factors.get(q) ?? 0) < 0;
    const cleared = clearedSum(graph, factor, isBelow);
    if (cleared === undefined) continue;
    const change = new Map([[factor, 1] as const, [cleared.q, 1] as const]);
    const rest = times(product, { coefficient: rational(1), factors: change });
    return withFractionsJoined(graph, quotient(rest, productOf(graph, cleared.numerator)));
  }
  return product;
}
