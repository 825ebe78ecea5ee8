import { add, choice, constant, div, mul, neg, pi, power, sqrt, sub, unary } from '../graph/build.ts';
import type { Graph, NodeId } from '../graph/graph.ts';
import type { BinaryOperator, UnaryOperator } from '../graph/operator.ts';
import { type Rational, rational } from '../number/rational.ts';

/** f′(x) for f(x), given x and the node of f(x) itself. */
export const unaryDerivative: Record<UnaryOperator, (graph: Graph, x: NodeId, self: NodeId) => NodeId> = {
  neg: (graph) => constant(graph, -1),
  // One-sided at the kink: the right derivative.
  abs: (graph, x) => choice(graph, 'ifLess', x, constant(graph, 0), constant(graph, -1), constant(graph, 1)),
  exp: (_graph, _x, self) => self,
  expm1: (graph, x) => unary(graph, 'exp', x),
  log: (graph, x) => div(graph, constant(graph, 1), x),
  log1p: (graph, x) => div(graph, constant(graph, 1), add(graph, constant(graph, 1), x)),
  sin: (graph, x) => unary(graph, 'cos', x),
  cos: (graph, x) => neg(graph, unary(graph, 'sin', x)),
  sinh: (graph, x) => unary(graph, 'cosh', x),
  cosh: (graph, x) => unary(graph, 'sinh', x),
  // 1/cosh² keeps its digits in the tail, where 1 − tanh² cancels.
  tanh: (graph, x) => power(graph, unary(graph, 'cosh', x), rational(-2)),
  asinh: (graph, x) => power(graph, onePlusSquare(graph, x), rational(-1, 2)),
  atan: (graph, x) => div(graph, constant(graph, 1), onePlusSquare(graph, x)),
  erf: (graph, x) =>
    div(
      graph,
      mul(graph, constant(graph, 2), unary(graph, 'exp', neg(graph, power(graph, x, rational(2))))),
      sqrt(graph, pi(graph)),
    ),
  // W′ = exp(−W)/(1 + W), finite at x = 0 where W/(x(1 + W)) is 0/0.
  lambertW: (graph, _x, self) =>
    div(graph, unary(graph, 'exp', neg(graph, self)), add(graph, constant(graph, 1), self)),
};

/** The derivative of op(a, b), given a, b, their derivatives and the node of op(a, b) itself. */
export const binaryDerivative: Record<
  BinaryOperator,
  (graph: Graph, a: NodeId, b: NodeId, da: NodeId, db: NodeId, self: NodeId) => NodeId
> = {
  add: (graph, _a, _b, da, db) => add(graph, da, db),
  sub: (graph, _a, _b, da, db) => sub(graph, da, db),
  mul: (graph, a, b, da, db) => add(graph, mul(graph, da, b), mul(graph, a, db)),
  div: (graph, _a, b, da, db, self) => div(graph, sub(graph, da, mul(graph, self, db)), b),
  min: (graph, a, b, da, db) => choice(graph, 'ifLess', b, a, db, da),
  max: (graph, a, b, da, db) => choice(graph, 'ifLess', a, b, db, da),
};

/** d(x^c)/dx = c·x^(c − 1). */
export function powerDerivative(graph: Graph, x: NodeId, exponent: Rational): NodeId {
  return mul(graph, constant(graph, exponent), power(graph, x, exponent.sub(1)));
}

function onePlusSquare(graph: Graph, x: NodeId): NodeId {
  return add(graph, constant(graph, 1), power(graph, x, rational(2)));
}
