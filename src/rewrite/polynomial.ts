import { constant, mul, power } from '../graph/build.ts';
import type { Graph, NodeId } from '../graph/graph.ts';
import { type Rational, rational } from '../number/rational.ts';
import type { Product } from './product.ts';
import { type Sum, sumNode, sumOf } from './sum.ts';
import { termsOf } from './terms.ts';

/** A polynomial in nodes; each monomial by the text of its exponents. */
export interface Polynomial {
  readonly atoms: ReadonlySet<NodeId>;
  readonly monomials: ReadonlyMap<
    string,
    { readonly coefficient: Rational; readonly powers: ReadonlyMap<NodeId, number> }
  >;
}

const mostMonomials = 40;

/** A sum as a polynomial in its terms; a whole power of a node counts as that power of it. */
export function polynomialOf(graph: Graph, id: NodeId): Polynomial {
  const sum: Sum = sumOf(graph, id);
  const terms = [...sum.terms].map(([term, coefficient]) => {
    const node = graph.node(term);
    const isWhole = node.kind === 'power' && node.exponent.d === 1n && node.exponent.s > 0n && node.exponent.n < 9n;
    const powers = new Map(isWhole ? [[node.args[0], Number(node.exponent.n)]] : [[term, 1]]);
    return { coefficient, powers };
  });
  return collect([...terms, { coefficient: sum.constant, powers: new Map() }]);
}

type Monomial = { readonly coefficient: Rational; readonly powers: ReadonlyMap<NodeId, number> };

function collect(list: readonly Monomial[]): Polynomial {
  const monomials = new Map<string, Monomial>();
  for (const { coefficient, powers } of list) {
    const key = [...powers].sort(([a], [b]) => a - b).join(' ');
    const total = (monomials.get(key)?.coefficient ?? rational(0)).add(coefficient);
    if (total.equals(0)) monomials.delete(key);
    else monomials.set(key, { coefficient: total, powers });
  }
  return { atoms: new Set([...monomials.values()].flatMap(({ powers }) => [...powers.keys()])), monomials };
}

function product(a: Polynomial, b: Polynomial): Polynomial {
  return collect(
    [...a.monomials.values()].flatMap((x) =>
      [...b.monomials.values()].map((y) => {
        const powers = new Map(x.powers);
        for (const [id, exponent] of y.powers) powers.set(id, (powers.get(id) ?? 0) + exponent);
        return { coefficient: x.coefficient.mul(y.coefficient), powers };
      }),
    ),
  );
}

/** a − b multiplied out, as a node; undefined when it has no fewer monomials than the two together, or too many. */
export function polynomialDifference(graph: Graph, a: Product, b: Product): NodeId | undefined {
  const [first, second] = [expanded(graph, a), expanded(graph, b)];
  if (first === undefined || second === undefined) return undefined;
  const negative = [...second.monomials.values()].map(({ coefficient, powers }) => ({
    coefficient: coefficient.neg(),
    powers,
  }));
  const difference = collect([...first.monomials.values(), ...negative]);
  if (difference.monomials.size >= first.monomials.size + second.monomials.size) return undefined;
  return polynomialNode(graph, difference);
}

/** Some products multiplied out, sums in sums too, and added up, as a node; undefined when there are too many monomials. */
export function polynomialSum(graph: Graph, products: readonly Product[]): NodeId | undefined {
  const parts = products.map((product) => expanded(graph, product, true));
  if (parts.some((part) => part === undefined)) return undefined;
  return polynomialNode(graph, collect(parts.flatMap((part) => [...(part as Polynomial).monomials.values()])));
}

function polynomialNode(graph: Graph, { monomials }: Polynomial): NodeId {
  const terms = new Map<NodeId, Rational>();
  let rest = rational(0);
  for (const { coefficient, powers } of monomials.values()) {
    if (powers.size === 0) rest = rest.add(coefficient);
    else {
      const node = [...powers].reduce(
        (left, [id, e]) => mul(graph, left, power(graph, id, rational(e))),
        constant(graph, 1),
      );
      // Two monomials may be one node: x·y, and a term that is that product.
      terms.set(node, (terms.get(node) ?? rational(0)).add(coefficient));
    }
  }
  return sumNode(graph, { constant: rest, terms });
}

function single(id: NodeId, exponent: number): Polynomial {
  return collect([{ coefficient: rational(1), powers: new Map([[id, exponent]]) }]);
}

function expanded(graph: Graph, { coefficient, factors }: Product, isDeep = false): Polynomial | undefined {
  let result = collect([{ coefficient, powers: new Map() }]);
  for (const [id, exponent] of factors) {
    const own = exponent < 0 ? single(id, exponent) : isDeep ? deepPolynomial(graph, id) : polynomialOf(graph, id);
    if (own === undefined) return undefined;
    // A reciprocal stays one factor.
    for (let count = 0; count < Math.max(exponent, 1); count++) {
      result = product(result, own);
      if (result.monomials.size > mostMonomials) return undefined;
    }
  }
  return result;
}

function deepPolynomial(graph: Graph, id: NodeId): Polynomial | undefined {
  const sum = sumOf(graph, id);
  if (sum.terms.size === 1 && sum.terms.has(id)) return single(id, 1);
  const parts = termsOf(graph, id).map((term) => expanded(graph, term, true));
  if (parts.some((part) => part === undefined)) return undefined;
  return collect(parts.flatMap((part) => [...(part as Polynomial).monomials.values()]));
}
