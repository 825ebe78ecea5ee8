import { constant, div, mul, power, sub } from '../graph/build.ts';
import type { Graph, NodeId } from '../graph/graph.ts';
import { type Rational, rational } from '../number/rational.ts';

/** A product of whole powers of nodes with a rational coefficient. */
export interface Product {
  readonly coefficient: Rational;
  readonly factors: ReadonlyMap<NodeId, number>;
}

const unit: Product = { coefficient: rational(1), factors: new Map() };

/**
 * The node as a product. Products, quotients, signs and whole powers are opened; a − b and b − a are one factor with
 * two signs; a/(a + b) stays one factor. Where the node has a value, so have all its factors, and the product is that
 * value.
 */
export function productOf(graph: Graph, id: NodeId): Product {
  const node = graph.node(id);
  switch (node.kind) {
    case 'rational':
      return { coefficient: node.value, factors: new Map() };
    case 'unary':
      if (node.op !== 'neg') return factor(id);
      return scaled(productOf(graph, node.args[0]), rational(-1));
    case 'power':
      if (node.exponent.d !== 1n || node.exponent.n > 64n) return factor(id);
      return raised(productOf(graph, node.args[0]), Number(node.exponent.s * node.exponent.n));
    case 'binary': {
      const [a, b] = node.args;
      if (node.op === 'mul') return times(productOf(graph, a), productOf(graph, b));
      if (node.op === 'div' && isShare(graph, node.args)) return factor(id);
      if (node.op === 'div') return times(productOf(graph, a), raised(productOf(graph, b), -1));
      // The sign of a difference is that of the lower id first.
      if (node.op === 'sub' && a > b) return scaled(factor(sub(graph, b, a)), rational(-1));
      return factor(id);
    }
    default:
      return factor(id);
  }
}

/** Whether a quotient is a/(a + b). */
export function isShare(graph: Graph, [top, bottom]: readonly [NodeId, NodeId]): boolean {
  const node = graph.node(bottom);
  return node.kind === 'binary' && node.op === 'add' && node.args.includes(top);
}

function factor(id: NodeId): Product {
  return { coefficient: rational(1), factors: new Map([[id, 1]]) };
}

function scaled({ coefficient, factors }: Product, by: Rational): Product {
  return { coefficient: coefficient.mul(by), factors };
}

export function times(a: Product, b: Product): Product {
  const factors = new Map(a.factors);
  for (const [id, exponent] of b.factors) {
    const sum = (factors.get(id) ?? 0) + exponent;
    if (sum === 0) factors.delete(id);
    else factors.set(id, sum);
  }
  return { coefficient: a.coefficient.mul(b.coefficient), factors };
}

export function raised({ coefficient, factors }: Product, exponent: number): Product {
  const power = exponent < 0 ? coefficient.inverse().pow(-exponent) : coefficient.pow(exponent);
  return {
    coefficient: power as Rational,
    factors: new Map([...factors].map(([id, own]) => [id, own * exponent])),
  };
}

export function quotient(a: Product, b: Product): Product {
  return times(a, raised(b, -1));
}

export function sameProduct(a: Product, b: Product): boolean {
  const { coefficient, factors } = quotient(a, b);
  return coefficient.equals(1) && factors.size === 0;
}

/** The product as a node: one quotient of two products. */
export function productNode(graph: Graph, { coefficient, factors }: Product): NodeId {
  let top = constant(graph, 1);
  let bottom = constant(graph, 1);
  // In the order of ids, so that equal products are one node.
  for (const [id, exponent] of [...factors].sort(([a], [b]) => a - b)) {
    const raisedFactor = power(graph, id, rational(Math.abs(exponent)));
    if (exponent > 0) top = mul(graph, top, raisedFactor);
    else bottom = mul(graph, bottom, raisedFactor);
  }
  return div(graph, mul(graph, constant(graph, coefficient), top), bottom);
}

export { unit as unitProduct };
