import type { Graph, Node, NodeId } from '../graph/graph.ts';
import type { Signs } from '../graph/sign.ts';

/** What a quotient's divisor goes through. */
export interface Inverse {
  readonly kind: 'inverse';
}

/**
 * The least argument of a function where the argument's sign says that it is never below it, wherever it has a value;
 * undefined where the sign does not tell, or the function takes every real. An interval may then be cut there: what it holds
 * beyond are no values.
 */
export function certainLeast(node: Node | Inverse, argument: NodeId, signs: Signs | undefined): number | undefined {
  if (signs === undefined) return undefined;
  const fromZero = (isSo: boolean) => (isSo ? 0 : undefined);
  if (node.kind === 'inverse') return fromZero(signs.isPositive(argument));
  if (node.kind === 'power') {
    if (node.exponent.s < 0n) return fromZero(signs.isPositive(argument));
    return fromZero(node.exponent.d % 2n === 0n && signs.isNonNegative(argument));
  }
  if (node.kind !== 'unary') return undefined;
  if (node.op === 'log1p') return signs.isAboveMinusOne(argument) ? -1 : undefined;
  if (node.op === 'log') return fromZero(signs.isPositive(argument));
  return fromZero(node.op === 'lambertW' && signs.isNonNegative(argument));
}

/** b of a quotient a/(a + b). */
export function otherTerm(graph: Graph, top: NodeId, bottom: NodeId): NodeId | undefined {
  const node = graph.node(bottom);
  if (node.kind !== 'binary' || node.op !== 'add') return undefined;
  const index = node.args.indexOf(top);
  return index < 0 ? undefined : node.args[1 - index];
}
