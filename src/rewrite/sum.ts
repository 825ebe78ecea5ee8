import { add, constant, mul, sub } from '../graph/build.ts';
import type { Graph, NodeId } from '../graph/graph.ts';
import { type Rational, rational } from '../number/rational.ts';

/** A sum of nodes with rational coefficients, and a rational. */
export interface Sum {
  readonly constant: Rational;
  readonly terms: ReadonlyMap<NodeId, Rational>;
}

/** The node as a sum: sums, differences, signs and rational multiples of these are opened. */
export function sumOf(graph: Graph, id: NodeId): Sum {
  const node = graph.node(id);
  if (node.kind === 'rational') return { constant: node.value, terms: new Map() };
  if (node.kind === 'unary' && node.op === 'neg') return multiple(sumOf(graph, node.args[0]), rational(-1));
  if (node.kind === 'binary') {
    const [a, b] = node.args;
    if (node.op === 'add') return plus(sumOf(graph, a), sumOf(graph, b));
    if (node.op === 'sub') return plus(sumOf(graph, a), multiple(sumOf(graph, b), rational(-1)));
    const scale = graph.node(a);
    if (node.op === 'mul' && scale.kind === 'rational') return multiple(sumOf(graph, b), scale.value);
  }
  return { constant: rational(0), terms: new Map([[id, rational(1)]]) };
}

function multiple(sum: Sum, by: Rational): Sum {
  return {
    constant: sum.constant.mul(by),
    terms: new Map([...sum.terms].map(([id, coefficient]) => [id, coefficient.mul(by)])),
  };
}

function plus(a: Sum, b: Sum): Sum {
  const terms = new Map(a.terms);
  for (const [id, coefficient] of b.terms) {
    const total = (terms.get(id) ?? rational(0)).add(coefficient);
    if (total.equals(0)) terms.delete(id);
    else terms.set(id, total);
  }
  return { constant: a.constant.add(b.constant), terms };
}

export function sumNode(graph: Graph, { constant: rest, terms }: Sum): NodeId {
  let node = constant(graph, rest);
  for (const [id, coefficient] of terms) {
    if (coefficient.s < 0n) node = sub(graph, node, mul(graph, constant(graph, coefficient.neg()), id));
    else node = add(graph, node, mul(graph, constant(graph, coefficient), id));
  }
  return node;
}

/** How many leaves the opened sum had before equal ones were joined. */
export function leafCount(graph: Graph, id: NodeId): number {
  const node = graph.node(id);
  if (node.kind === 'unary' && node.op === 'neg') return leafCount(graph, node.args[0]);
  if (node.kind === 'binary') {
    const [a, b] = node.args;
    if (node.op === 'add' || node.op === 'sub') return leafCount(graph, a) + leafCount(graph, b);
    if (node.op === 'mul' && graph.node(a).kind === 'rational') return leafCount(graph, b);
  }
  return 1;
}
