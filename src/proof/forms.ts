import { constant, power, sub, variable } from '../graph/build.ts';
import type { Graph, NodeId } from '../graph/graph.ts';
import { substitute } from '../graph/traverse.ts';
import { rational } from '../number/rational.ts';
import { separateBlends } from '../rewrite/blend.ts';
import { mergeLogarithms } from '../rewrite/logarithm.ts';
import { simplify } from '../rewrite/simplify.ts';

/** The exact rewrites that a proof may use, by the names that a certificate gives them. */
export const rewriteNames = ['merge-logarithms', 'separate-blends', 'polarisation-root'] as const;
export type RewriteName = (typeof rewriteNames)[number];

/** The variable w ≥ 0 in ζ = 1 − w³. */
export const polarisationRoot = 'w';

/** An energy with blends separated and logarithms merged. */
export function decidableForm(graph: Graph, energy: NodeId): NodeId {
  const [merged] = mergeLogarithms(graph, [energy]) as [NodeId];
  return (separateBlends(graph, [merged]) as [NodeId])[0];
}

/**
 * ζ = 1 − w³, one to one from w in 0…2^(1/3) to ζ in −1…1: (1 − ζ)^(1/3) is w then, without the infinite slope at ζ = 1.
 */
export function withPolarisationRoot(graph: Graph, outputs: readonly NodeId[]): NodeId[] {
  const w = variable(graph, polarisationRoot);
  const zeta = sub(graph, constant(graph, 1), power(graph, w, rational(3)));
  const replaced = substitute(graph, outputs, new Map([['zeta', zeta]]));
  return simplify(graph, replaced, new Set([polarisationRoot, 'rs', 's', 'alpha']));
}
