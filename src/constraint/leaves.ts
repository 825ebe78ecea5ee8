import { differentiate } from '../derivative/differentiate.ts';
import { expressionText } from '../expression/print.ts';
import { constant, mul, variable } from '../graph/build.ts';
import type { Graph, NodeId } from '../graph/graph.ts';
import { type Rational, rational } from '../number/rational.ts';
import { type Call, coefficientOrder, nameOf, targetOf } from './calls.ts';

/** A limit or an order of growth inside a requirement: a variable of the graph that a sequence gives its value. */
export interface Leaf {
  readonly symbol: string;
  readonly kind: 'limit' | 'order' | 'logOrder';
  readonly of: NodeId;
  readonly along: string;
  readonly target: Rational | 'infinity';
  /** As the requirement writes it. */
  readonly text: string;
}

/** A coefficient as the requirement writes it. */
export interface Coefficient {
  readonly text: string;
  readonly node: NodeId;
  readonly along: string;
  readonly order: number;
}

/** What the requirement of a swept condition needs beyond its graph; filled while the graph is built. */
export interface Leaves {
  readonly found: Leaf[];
  readonly coefficients: Coefficient[];
  /** Coordinates in which a coefficient is taken, where the formula itself may be 0/0. */
  readonly expanded: Set<string>;
}

/** The variable that stands for a limit or an order; the same one for the same text of the same function. */
export function leafOf(graph: Graph, leaves: Leaves, call: Call, of: NodeId): NodeId {
  const kind = call.name as Leaf['kind'];
  const along = nameOf(call.args[1]);
  const target = targetOf(call.args[2]);
  if (along === undefined || target === undefined) throw new RangeError(`${kind} is not checked`);
  const text = expressionText(call);
  const known = leaves.found.find((leaf) => leaf.text === text && leaf.of === of);
  const symbol = known?.symbol ?? `#${leaves.found.length}`;
  if (known === undefined) leaves.found.push({ symbol, kind, of, along, target, text });
  return variable(graph, symbol);
}

/** The Taylor coefficient (1/n!) ∂ⁿf/∂xⁿ; in p = s² the one of s^(2n), which is the same for a function of p. */
export function coefficientOf(graph: Graph, leaves: Leaves, call: Call, f: NodeId): NodeId {
  const name = nameOf(call.args[1]) as string;
  const order = coefficientOrder(call.args[2]) as number;
  const [along, times] = name === 'p' ? ['s', 2 * order] : [name, order];
  leaves.expanded.add(along);
  let node = f;
  let factorial = 1n;
  for (let k = 1; k <= times; k++) {
    node = differentiate(graph, node, along);
    factorial *= BigInt(k);
  }
  const coefficient = mul(graph, constant(graph, rational(1n, factorial)), node);
  leaves.coefficients.push({ text: expressionText(call), node: coefficient, along: name, order });
  return coefficient;
}
