import { choice, constant, mul, rationalValue } from '../graph/build.ts';
import type { Graph, Node, NodeId } from '../graph/graph.ts';
import { reachable } from '../graph/traverse.ts';
import { binaryDerivative, powerDerivative, unaryDerivative } from './rules.ts';

/**
 * The derivatives of several nodes with respect to one variable, as nodes of the same graph; common
 * parts are shared. At a kink (abs, min, max, a choice) the result is the one-sided derivative of the
 * branch that the operator itself takes there.
 */
export function differentiateAll(graph: Graph, outputs: readonly NodeId[], variable: string): NodeId[] {
  const zero = constant(graph, 0);
  const derivatives = new Map<NodeId, NodeId>();
  for (const id of reachable(graph, outputs)) {
    const node = graph.node(id);
    derivatives.set(
      id,
      derivativeOf(graph, node, id, variable, zero, (argument) => derivatives.get(argument) as NodeId),
    );
  }
  return outputs.map((id) => derivatives.get(id) as NodeId);
}

/** The derivative of one node with respect to a variable. */
export function differentiate(graph: Graph, output: NodeId, variable: string): NodeId {
  return differentiateAll(graph, [output], variable)[0] as NodeId;
}

function derivativeOf(
  graph: Graph,
  node: Node,
  self: NodeId,
  variable: string,
  zero: NodeId,
  derivative: (argument: NodeId) => NodeId,
): NodeId {
  switch (node.kind) {
    case 'rational':
    case 'pi':
      return zero;
    case 'variable':
      return node.name === variable ? constant(graph, 1) : zero;
    case 'unary': {
      const [x] = node.args;
      return chain(graph, derivative(x), () => unaryDerivative[node.op](graph, x, self));
    }
    case 'power': {
      const [x] = node.args;
      return chain(graph, derivative(x), () => powerDerivative(graph, x, node.exponent));
    }
    case 'binary': {
      const [a, b] = node.args;
      const da = derivative(a);
      const db = derivative(b);
      if (isZero(graph, da) && isZero(graph, db)) return zero;
      return binaryDerivative[node.op](graph, a, b, da, db, self);
    }
    case 'choice': {
      const [a, b, whenTrue, whenFalse] = node.args;
      return choice(graph, node.op, a, b, derivative(whenTrue), derivative(whenFalse));
    }
  }
}

/** Outer derivative times inner; the outer one is not even built where the inner is zero. */
function chain(graph: Graph, inner: NodeId, outer: () => NodeId): NodeId {
  return isZero(graph, inner) ? inner : mul(graph, outer(), inner);
}

function isZero(graph: Graph, id: NodeId): boolean {
  return rationalValue(graph, id)?.equals(0) ?? false;
}
