import { add, binary, choice, constant, mul, rationalValue, sub } from '../graph/build.ts';
import { argumentsOf, type Graph, type NodeId } from '../graph/graph.ts';
import type { Signs } from '../graph/sign.ts';
import { reachable } from '../graph/traverse.ts';
import { rational } from '../number/rational.ts';
import { hasCertainValue, keepsDomain } from './domain.ts';
import { polynomialSum } from './polynomial.ts';
import { type Product, productNode, productOf, quotient, times } from './product.ts';
import { mapGraph } from './simplify.ts';
import { sumOf } from './sum.ts';
import { isSum, sumOfNodes, termsOf } from './terms.ts';

/**
 * max(a, b) → a + max(b − a, 0), where a is also used elsewhere, and sums then collected by a: as in revisions of a
 * correlation energy by the larger of it and another, a(1 + Cz) − (1 + C)z(p·max(a, b) + (1 − p)·max(a, c)) becomes
 * a(1 − z) − (1 + C)z(p·max(b − a, 0) + (1 − p)·max(c − a, 0)). Identities of a field and of the order of reals. Out of
 * (0 < x ? x·(a + m) : 0) the part x·a is taken where a has a value at x = 0 too, or all depends on its value anyway.
 */
export function shiftMaxima(graph: Graph, outputs: readonly NodeId[], closed: Signs, signs: Signs): NodeId[] {
  const bases = sharedArguments(graph, outputs);
  if (bases.length === 0) return [...outputs];
  const moved = mapGraph(graph, outputs, (id) => {
    const node = graph.node(id);
    return node.kind === 'binary' && node.op === 'max' ? (shifted(graph, node.args, bases) ?? id) : id;
  });
  const needed = neededAlways(graph, moved);
  const opened = mapGraph(graph, moved, (id) => split(graph, id, closed, needed) ?? id);
  const joined = mapGraph(graph, opened, (id) => (isSum(graph, id) ? collected(graph, id, bases) : id));
  return joined.map((form, index) => {
    const old = outputs[index] as NodeId;
    return keepsDomain(graph, moved[index] as NodeId, form, { signs }) ? form : old;
  });
}

/** Nodes without whose value the outputs have none: those to which a way leads that is no branch. */
function neededAlways(graph: Graph, outputs: readonly NodeId[]): Set<NodeId> {
  const found = new Set<NodeId>(outputs);
  for (const id of [...reachable(graph, outputs)].reverse()) {
    if (!found.has(id)) continue;
    const node = graph.node(id);
    const always = node.kind === 'choice' ? node.args.slice(0, 2) : argumentsOf(node);
    for (const argument of always) found.add(argument);
  }
  return found;
}

/** The arguments of maxima that something else uses too, the one in most maxima first. */
function sharedArguments(graph: Graph, outputs: readonly NodeId[]): NodeId[] {
  const compared = new Map<NodeId, number>();
  const other = new Set<NodeId>();
  for (const id of reachable(graph, outputs)) {
    const node = graph.node(id);
    const isMaximum = node.kind === 'binary' && node.op === 'max';
    for (const argument of argumentsOf(node)) {
      if (isMaximum) compared.set(argument, (compared.get(argument) ?? 0) + 1);
      else other.add(argument);
    }
  }
  return [...compared.keys()]
    .filter((id) => other.has(id) && rationalValue(graph, id) === undefined)
    .sort((a, b) => (compared.get(b) as number) - (compared.get(a) as number) || a - b);
}

function shifted(graph: Graph, [a, b]: readonly [NodeId, NodeId], bases: readonly NodeId[]): NodeId | undefined {
  const base = bases.find((id) => id === a || id === b);
  if (base === undefined) return undefined;
  const rest = base === a ? b : a;
  return add(graph, base, binary(graph, 'max', sub(graph, rest, base), constant(graph, 0)));
}

/** (0 < x ? x·F·(a + m) : 0) → x·F·a + (0 < x ? x·F·m : 0). */
function split(graph: Graph, id: NodeId, closed: Signs, needed: ReadonlySet<NodeId>): NodeId | undefined {
  const node = graph.node(id);
  if (node.kind !== 'choice' || node.op !== 'ifLess') return undefined;
  const [zero, x, whenTrue, whenFalse] = node.args;
  const isZero = (part: NodeId) => rationalValue(graph, part)?.equals(0) === true;
  if (!isZero(zero) || !isZero(whenFalse) || !closed.isNonNegative(x)) return undefined;
  const product = productOf(graph, whenTrue);
  const ofX = productOf(graph, x).factors;
  if (![...ofX].every(([factor, exponent]) => (product.factors.get(factor) ?? 0) >= exponent)) return undefined;
  for (const [factor, exponent] of product.factors) {
    if (exponent !== 1 || !isSum(graph, factor)) continue;
    const rest = quotient(product, productOf(graph, factor));
    const terms = [...sumOf(graph, factor).terms].map(([term, coefficient]) =>
      mul(graph, constant(graph, coefficient), mul(graph, productNode(graph, rest), term)),
    );
    const certain = terms.filter((term) => hasCertainValue(graph, term, closed, needed));
    const others = terms.filter((term) => !certain.includes(term));
    if (certain.length === 0 || others.length === 0) continue;
    return add(
      graph,
      sumOfNodes(graph, certain),
      choice(graph, 'ifLess', zero, x, sumOfNodes(graph, others), whenFalse),
    );
  }
  return undefined;
}

/** A sum with what multiplies one of the bases joined, where that leaves fewer monomials. */
function collected(graph: Graph, id: NodeId, bases: readonly NodeId[]): NodeId {
  for (const base of bases) {
    const { coefficients, others } = byBase(graph, { coefficient: rational(1), factors: new Map([[id, 1]]) }, base);
    if (coefficients.length < 2) continue;
    const factor = polynomialSum(graph, coefficients);
    if (factor === undefined || sumOf(graph, factor).terms.size >= coefficients.length + 1) continue;
    return sumOfNodes(graph, [mul(graph, base, factor), ...others.map((term) => productNode(graph, term))]);
  }
  return id;
}

interface ByBase {
  /** What multiplies the base, and the terms without it. */
  readonly coefficients: readonly Product[];
  readonly others: readonly Product[];
}

/** A product with its sums opened as far as the base is a term of them. */
function byBase(graph: Graph, product: Product, base: NodeId): ByBase {
  const whole = productOf(graph, base);
  const has = [...whole.factors].every(
    ([factor, exponent]) => exponent * (product.factors.get(factor) ?? 0) >= exponent * exponent,
  );
  if (has) return { coefficients: [quotient(product, whole)], others: [] };
  for (const [factor, exponent] of product.factors) {
    if (exponent !== 1 || !isSum(graph, factor)) continue;
    const rest = quotient(product, { coefficient: rational(1), factors: new Map([[factor, 1]]) });
    const parts = termsOf(graph, factor).map((term) => byBase(graph, term, base));
    if (!parts.some(({ coefficients }) => coefficients.length > 0)) continue;
    return {
      coefficients: parts.flatMap((part) => part.coefficients.map((term) => times(rest, term))),
      others: parts.flatMap((part) => part.others).map((term) => times(rest, term)),
    };
  }
  return { coefficients: [], others: [product] };
}
