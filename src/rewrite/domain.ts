import { rationalValue } from '../graph/build.ts';
import type { Graph, NodeId } from '../graph/graph.ts';
import { type Guard, guardsOf } from '../graph/guards.ts';
import type { Signs } from '../graph/sign.ts';
import { reachable, variablesOf } from '../graph/traverse.ts';
import { clearedSum } from './fraction.ts';
import { productOf } from './product.ts';
import { isSum } from './terms.ts';

/** Something that a form needs to have a value. */
interface Need {
  readonly kind: 'not zero' | 'not negative' | 'positive' | 'above -1' | 'above -1/e';
  readonly id: NodeId;
}

export interface DomainChange {
  /** What has become of a node of the old form. */
  readonly image?: (id: NodeId) => NodeId;
  readonly signs?: Signs;
}

/**
 * Whether all that the old form needs to have a value either is needed by the new as well or is certain by its sign:
 * then the new form has a value nowhere that the old has none. Constants are not looked at.
 */
export function keepsDomain(
  graph: Graph,
  old: NodeId,
  form: NodeId,
  { image = (id) => id, signs }: DomainChange = {},
): boolean {
  const kept = new Set(reachable(graph, [form]).flatMap((id) => needsOf(graph, id, (own) => own).map(textOf)));
  const ids = reachable(graph, [old]);
  const guards = guardsOf(graph, ids, [old]);
  return ids.every((id) => {
    const positive = guardedPositive(graph, guards.get(id) ?? new Map(), image);
    return needsOf(graph, id, image, signs).every(
      (need) => kept.has(textOf(need)) || isCertain(need, signs) || (need.kind === 'not zero' && positive.has(need.id)),
    );
  });
}

/** The images of what guards say is positive, and their factors. */
function guardedPositive(graph: Graph, guards: ReadonlyMap<string, Guard>, image: (id: NodeId) => NodeId): Set<NodeId> {
  const found = new Set<NodeId>();
  for (const { op, left, right, outcome } of guards.values()) {
    if (op !== 'ifLess' || !outcome || rationalValue(graph, left)?.equals(0) !== true) continue;
    addFactors(graph, image(right), found);
  }
  return found;
}

/** A product or a root that is not zero has no factor that is. */
function addFactors(graph: Graph, id: NodeId, into: Set<NodeId>): void {
  into.add(id);
  for (const factor of productOf(graph, id).factors.keys()) {
    const node = graph.node(factor);
    into.add(factor);
    if (node.kind === 'power') addFactors(graph, node.args[0], into);
  }
}

/** Whether the node has a value wherever the signs hold and the given nodes have theirs, by the signs alone. */
export function hasCertainValue(
  graph: Graph,
  output: NodeId,
  signs: Signs,
  given: ReadonlySet<NodeId> = new Set(),
): boolean {
  return reachable(graph, [output]).every(
    (id) => given.has(id) || needsOf(graph, id, (own) => own).every((need) => isCertain(need, signs)),
  );
}

const textOf = ({ kind, id }: Need) => `${kind} ${id}`;

function isCertain({ kind, id }: Need, signs: Signs | undefined): boolean {
  if (signs === undefined) return false;
  if (kind === 'above -1') return signs.isAboveMinusOne(id);
  return kind === 'not zero' || kind === 'positive' ? signs.isPositive(id) : signs.isNonNegative(id);
}

function needsOf(graph: Graph, id: NodeId, image: (id: NodeId) => NodeId, signs?: Signs): Need[] {
  const node = graph.node(id);
  if (node.kind === 'binary' && node.op === 'div') return denominators(graph, image(node.args[1]), signs);
  if (node.kind === 'power') {
    const base = image(node.args[0]);
    return [
      ...(node.exponent.s < 0n ? denominators(graph, base, signs) : []),
      ...(node.exponent.d % 2n === 0n ? [{ kind: 'not negative', id: base } as const] : []),
    ];
  }
  if (node.kind !== 'unary') return [];
  const kind = ({ log: 'positive', log1p: 'above -1', lambertW: 'above -1/e' } as const)[node.op as string];
  return kind === undefined ? [] : [{ kind, id: image(node.args[0]) }];
}

/**
 * What must not be zero for a denominator not to be: eˣ − 1 is zero where x is, eˣ and a reciprocal nowhere, a root where
 * its argument is, a fraction where its top is.
 */
function denominators(graph: Graph, id: NodeId, signs?: Signs): Need[] {
  return [...productOf(graph, id).factors.keys()].flatMap((factor) => {
    const node = graph.node(factor);
    if (signs?.isPositive(factor) === true || variablesOf(graph, [factor]).size === 0) return [];
    if (node.kind === 'unary' && node.op === 'exp') return [];
    if (node.kind === 'unary' && node.op === 'expm1') return denominators(graph, node.args[0], signs);
    if (node.kind === 'power') return node.exponent.s < 0n ? [] : denominators(graph, node.args[0], signs);
    const cleared = isSum(graph, factor) ? clearedSum(graph, factor) : undefined;
    if (cleared !== undefined) return denominators(graph, cleared.numerator, signs);
    return [{ kind: 'not zero', id: factor } as const];
  });
}
