import fc from 'fast-check';
import { add, binary, choice, constant, div, power, unary, variable } from '../../src/graph/build.ts';
import type { Graph, NodeId } from '../../src/graph/graph.ts';
import type { UnaryOperator } from '../../src/graph/operator.ts';
import { rational } from '../../src/number/rational.ts';

/** Makes the node of a random expression in the graph. */
export type Build = (graph: Graph) => NodeId;

export const variableNames = ['a', 'b', 'c'] as const;

const square = (graph: Graph, x: NodeId): NodeId => power(graph, x, rational(2));

/** Arguments brought into the domain and to moderate size, so that values stay finite and well conditioned. */
const argumentOf: Record<UnaryOperator, (graph: Graph, x: NodeId) => NodeId> = {
  neg: (_graph, x) => x,
  abs: (_graph, x) => x,
  sin: (_graph, x) => x,
  cos: (_graph, x) => x,
  tanh: (_graph, x) => x,
  asinh: (_graph, x) => x,
  atan: (_graph, x) => x,
  erf: (_graph, x) => x,
  exp: (graph, x) => unary(graph, 'sin', x),
  expm1: (graph, x) => unary(graph, 'atan', x),
  sinh: (graph, x) => unary(graph, 'sin', x),
  cosh: (graph, x) => unary(graph, 'cos', x),
  log: (graph, x) => add(graph, constant(graph, rational(3, 2)), square(graph, x)),
  log1p: (graph, x) => square(graph, x),
  lambertW: square,
};

const unaryNames = Object.keys(argumentOf) as UnaryOperator[];

/** Random expressions of the variables over every operator, of at most the given depth. */
export function arbitraryExpression(depth: number): fc.Arbitrary<Build> {
  const leaf: fc.Arbitrary<Build> = fc.oneof(
    fc.constantFrom(...variableNames).map(
      (name): Build =>
        (graph) =>
          variable(graph, name),
    ),
    fc.tuple(fc.integer({ min: -20, max: 20 }), fc.integer({ min: 1, max: 9 })).map(
      ([p, q]): Build =>
        (graph) =>
          constant(graph, rational(p, q)),
    ),
    fc.constant<Build>((graph) => graph.intern({ kind: 'pi' })),
  );
  if (depth === 0) return leaf;
  const inner = arbitraryExpression(depth - 1);
  return fc.oneof(
    { weight: 1, arbitrary: leaf },
    {
      weight: 3,
      arbitrary: fc.tuple(fc.constantFrom(...unaryNames), inner).map(
        ([op, x]): Build =>
          (graph) =>
            unary(graph, op, argumentOf[op](graph, x(graph))),
      ),
    },
    {
      weight: 4,
      arbitrary: fc.tuple(fc.constantFrom('add', 'sub', 'mul', 'div', 'min', 'max'), inner, inner).map(
        ([op, x, y]): Build =>
          (graph) => {
            const [left, right] = [x(graph), y(graph)];
            return op === 'div'
              ? div(graph, left, add(graph, constant(graph, 1), square(graph, right)))
              : binary(graph, op, left, right);
          },
      ),
    },
    {
      weight: 2,
      arbitrary: fc.tuple(fc.integer({ min: -9, max: 9 }), fc.integer({ min: 1, max: 8 }), inner).map(
        ([p, q, x]): Build =>
          (graph) =>
            power(graph, add(graph, constant(graph, rational(1, 2)), square(graph, x(graph))), rational(p, q)),
      ),
    },
    {
      weight: 1,
      arbitrary: fc.tuple(fc.constantFrom('ifLess' as const, 'ifLessEqual' as const), inner, inner, inner, inner).map(
        ([op, a, b, c, d]): Build =>
          (graph) =>
            choice(graph, op, a(graph), b(graph), c(graph), d(graph)),
      ),
    },
  );
}

/** Random points, as doubles away from zero. */
export const arbitraryPoint = fc.tuple(
  fc.double({ min: 0.1, max: 2, noNaN: true }),
  fc.double({ min: 0.1, max: 2, noNaN: true }),
  fc.double({ min: 0.1, max: 2, noNaN: true }),
);
