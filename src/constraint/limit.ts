import { add, constant, mul } from '../graph/build.ts';
import type { Graph, NodeId } from '../graph/graph.ts';
import { substitute } from '../graph/traverse.ts';
import { type Rational, rational } from '../number/rational.ts';

/**
 * The sequence r_s = start·4^k, k = 0 … terms − 1, along which a limit r_s → ∞ is taken. The low-density
 * expansion runs in powers of r_s^(−1/2), which halves from term to term.
 */
export interface LimitSequence {
  readonly start: Rational;
  readonly terms: number;
}

/** For float64: r_s = 10⁸ … 2.6·10¹⁰; the part left out is of the order r_s^(−5/2). */
export const limitInFloat64: LimitSequence = { start: rational(10n ** 8n), terms: 5 };
/** Two sequences for high precision, whose difference shows the error; early enough that a form like x³ log(1 + 1/x) keeps digits. */
export const limitInHighPrecision: readonly [LimitSequence, LimitSequence] = [
  { start: rational(10n ** 8n), terms: 8 },
  { start: rational(10n ** 9n), terms: 7 },
];

/**
 * lim f for r_s → ∞ as a node: Richardson extrapolation in h = r_s^(−1/2), that is the value at h = 0 of the
 * polynomial in h through the terms of the sequence. Being an expression of the other coordinates, it is
 * evaluated once for each of them on a grid.
 * Source: L. F. Richardson, J. A. Gaunt, Phil. Trans. R. Soc. A 226, 299 (1927).
 */
export function limitAtLowDensity(graph: Graph, f: NodeId, sequence: LimitSequence): NodeId {
  let sum = constant(graph, 0);
  for (let k = 0; k < sequence.terms; k++) {
    const rs = constant(graph, sequence.start.mul(4n ** BigInt(k)));
    const [term] = substitute(graph, [f], new Map([['rs', rs]])) as [NodeId];
    sum = add(graph, sum, mul(graph, constant(graph, weight(k, sequence.terms)), term));
  }
  return sum;
}

/** Lagrange weight at h = 0 of the node h_k = 2^(−k). */
function weight(k: number, terms: number): Rational {
  let product = rational(1);
  for (let j = 0; j < terms; j++) {
    if (j === k) continue;
    // h_j/(h_j − h_k) = 1/(1 − 2^(j − k))
    const ratio = j > k ? rational(2n ** BigInt(j - k)) : rational(1n, 2n ** BigInt(k - j));
    product = product.div(rational(1).sub(ratio));
  }
  return product;
}
