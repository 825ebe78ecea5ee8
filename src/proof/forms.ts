import { constant, power, sub, variable } from '../graph/build.ts';
import type { Graph, NodeId } from '../graph/graph.ts';
import type { Signs } from '../graph/sign.ts';
import { substitute, variablesOf } from '../graph/traverse.ts';
import { rational } from '../number/rational.ts';
import { separateBlends } from '../rewrite/blend.ts';
import { clampBranches } from '../rewrite/clamp.ts';
import { constantValue, factorSums } from '../rewrite/factor.ts';
import { mergeLogarithms } from '../rewrite/logarithm.ts';
import { shiftMaxima } from '../rewrite/maximum.ts';
import { joinRoots } from '../rewrite/root.ts';
import { simplify } from '../rewrite/simplify.ts';
import { decideSwitches } from '../rewrite/switch.ts';

/** The exact rewrites that a proof may use, by the names that a certificate gives them. */
export const rewriteNames = [
  'merge-logarithms',
  'separate-blends',
  'polarisation-root',
  'decide-switches',
  'shift-maxima',
  'clamp-branches',
  'join-roots',
  'factor-sums',
] as const;
export type RewriteName = (typeof rewriteNames)[number];

/** The variable w ≥ 0 in ζ = 1 − w³. */
export const polarisationRoot = 'w';

export const coordinatesNotNegative: ReadonlySet<string> = new Set([polarisationRoot, 'rs', 's', 'alpha']);

/** An energy with blends separated and logarithms merged. */
export function decidableForm(graph: Graph, energy: NodeId): NodeId {
  const [merged] = mergeLogarithms(graph, [energy]) as [NodeId];
  return (separateBlends(graph, [merged]) as [NodeId])[0];
}

/**
 * ζ = 1 − w³, one to one from w in 0…2^(1/3) to ζ in −1…1: (1 − ζ)^(1/3) is w then, without the infinite slope at ζ = 1.
 */
function withPolarisationRoot(graph: Graph, outputs: readonly NodeId[]): NodeId[] {
  if (!variablesOf(graph, outputs).has('zeta')) return [...outputs];
  const w = variable(graph, polarisationRoot);
  const zeta = sub(graph, constant(graph, 1), power(graph, w, rational(3)));
  const replaced = substitute(graph, outputs, new Map([['zeta', zeta]]));
  return simplify(graph, replaced, coordinatesNotNegative);
}

export interface RewrittenForm {
  readonly node: NodeId;
  /** The rewrites that changed something. */
  readonly rewrites: readonly RewriteName[];
}

/** Signs on the domain: inside it, where coordinates are positive, and with its edges. */
export interface DomainSigns {
  readonly inside: Signs;
  readonly closed: Signs;
}

/** A margin after those of the allowed rewrites that are for margins, in their order. */
export function rewriteMargin(
  graph: Graph,
  margin: NodeId,
  allowed: readonly RewriteName[],
  { inside, closed }: DomainSigns,
): RewrittenForm {
  const steps: readonly (readonly [RewriteName, (outputs: NodeId[]) => NodeId[]])[] = [
    ['polarisation-root', (outputs) => withPolarisationRoot(graph, outputs)],
    ['decide-switches', (outputs) => decideSwitches(graph, outputs, closed)],
    ['shift-maxima', (outputs) => shiftMaxima(graph, outputs, closed, inside)],
    ['clamp-branches', (outputs) => clampBranches(graph, outputs)],
    ['join-roots', (outputs) => joinRoots(graph, outputs, inside)],
    ['factor-sums', (outputs) => factoredForm(graph, outputs, inside)],
  ];
  let node = margin;
  const rewrites: RewriteName[] = [];
  for (const [name, step] of steps) {
    if (!allowed.includes(name)) continue;
    const [made] = step([node]) as [NodeId];
    if (made !== node) rewrites.push(name);
    node = made;
  }
  return { node, rewrites };
}

/** A margin that is a constant wherever it has a value, as that of an identity whose sides are one expression. */
export function constantMargin(
  graph: Graph,
  margin: NodeId,
  allowed: readonly RewriteName[],
  signs: DomainSigns,
): RewrittenForm | undefined {
  if (!allowed.includes('factor-sums')) return undefined;
  const others = allowed.filter((name) => name !== 'factor-sums' && name !== 'polarisation-root');
  const { node, rewrites } = rewriteMargin(graph, margin, others, signs);
  const value = constantValue(graph, node);
  return value === undefined ? undefined : { node: value, rewrites: [...rewrites, 'factor-sums'] };
}

/** Sums with their common factors taken out, and once more where powers of powers met in the first pass. */
function factoredForm(graph: Graph, outputs: readonly NodeId[], signs: Signs): NodeId[] {
  const once = factorSums(graph, outputs, signs);
  const merged = simplify(graph, once, coordinatesNotNegative);
  return merged.every((form, index) => form === once[index]) ? once : factorSums(graph, merged, signs);
}
