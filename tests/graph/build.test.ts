import { describe, expect, it } from 'vitest';
import { differentiate } from '../../src/derivative/differentiate.ts';
import {
  add,
  binary,
  choice,
  constant,
  pi,
  power,
  raise,
  rationalValue,
  unary,
  variable,
} from '../../src/graph/build.ts';
import { Graph, type NodeId } from '../../src/graph/graph.ts';
import { binaryOperators, choiceOperators, unaryOperators } from '../../src/graph/operator.ts';
import { evaluateDecimal } from '../../src/kernel/decimal.ts';
import { Decimal } from '../../src/number/decimal.ts';
import { rational } from '../../src/number/rational.ts';

const points = ['-2.5', '-1', '-0.3', '0', '0.2', '1', '3.7'];

/** Operands in every shape that a simplification looks for. */
function shapes(graph: Graph): NodeId[] {
  const x = variable(graph, 'x');
  const raw = { half: constant(graph, rational(1, 2)), two: constant(graph, 2) };
  return [
    x,
    variable(graph, 'y'),
    pi(graph),
    ...[0, 1, -1, 2].map((value) => constant(graph, value)),
    constant(graph, rational(-5, 3)),
    graph.intern({ kind: 'unary', op: 'neg', args: [x] }),
    graph.intern({ kind: 'unary', op: 'exp', args: [x] }),
    graph.intern({ kind: 'binary', op: 'mul', args: [raw.half, x] }),
    graph.intern({ kind: 'binary', op: 'add', args: [constant(graph, 1), x] }),
    graph.intern({ kind: 'binary', op: 'sub', args: [constant(graph, 1), x] }),
    graph.intern({ kind: 'binary', op: 'sub', args: [x, raw.two] }),
    ...[
      rational(1, 2),
      rational(1, 3),
      rational(2, 3),
      rational(2),
      rational(3),
      rational(-1),
      rational(-2),
      rational(5, 2),
    ].map((exponent) => graph.intern({ kind: 'power', exponent, args: [x] })),
  ];
}

/** Expects equal values wherever the plain node has a finite one, and enough such points. */
function expectSame(graph: Graph, pairs: readonly (readonly [plain: NodeId, built: NodeId])[]): void {
  let usable = 0;
  for (const text of points) {
    const bindings = new Map([
      ['x', new Decimal(text)],
      ['y', new Decimal('0.7')],
    ]);
    const values = evaluateDecimal(graph, pairs.flat(), bindings, 40);
    for (let index = 0; index < values.length; index += 2) {
      const [plain, built] = [values[index], values[index + 1]] as [Decimal, Decimal];
      if (!plain.isFinite()) continue;
      usable++;
      const close = plain.minus(built).abs().lessThanOrEqualTo(plain.abs().plus(1).times('1e-35'));
      expect(close, `pair ${index / 2} at x = ${text}: ${plain} became ${built}`).toBe(true);
    }
  }
  expect(usable).toBeGreaterThan((pairs.length * points.length) / 3);
}

describe('simplifications never change a value (40-digit evaluation of the plain node)', () => {
  it.each(binaryOperators)('%s, for every pair of operand shapes', (op) => {
    const graph = new Graph();
    const operands = shapes(graph);
    const pairs = operands.flatMap((a) =>
      operands.map((b) => [graph.intern({ kind: 'binary', op, args: [a, b] }), binary(graph, op, a, b)] as const),
    );
    expectSame(graph, pairs);
  });

  it.each(unaryOperators)('%s, for every operand shape', (op) => {
    const graph = new Graph();
    expectSame(
      graph,
      shapes(graph).map((x) => [graph.intern({ kind: 'unary', op, args: [x] }), unary(graph, op, x)] as const),
    );
  });

  it('powers, for every operand shape and exponents of either sign and parity', () => {
    const graph = new Graph();
    const exponents = [
      [1, 2],
      [1, 3],
      [2, 3],
      [-1, 3],
      [4, 3],
      [2, 1],
      [3, 1],
      [-1, 1],
      [-2, 1],
      [0, 1],
      [1, 1],
      [-1, 2],
      [3, 4],
    ] as const;
    const pairs = shapes(graph).flatMap((x) =>
      exponents.map(([p, q]) => {
        const exponent = rational(p, q);
        return [graph.intern({ kind: 'power', exponent, args: [x] }), power(graph, x, exponent)] as const;
      }),
    );
    expectSame(graph, pairs);
  });

  it.each(choiceOperators)('%s, for every pair of compared shapes', (op) => {
    const graph = new Graph();
    const operands = shapes(graph);
    const [one, two] = [constant(graph, 1), constant(graph, 2)];
    const pairs = operands.flatMap((a) =>
      operands.map((b) => {
        const args = [a, b, one, two] as const;
        return [graph.intern({ kind: 'choice', op, args }), choice(graph, op, ...args)] as const;
      }),
    );
    expectSame(graph, pairs);
  });
});

describe('what simplification does', () => {
  it('interns: the same structure is the same node, in either order where the operator commutes', () => {
    const graph = new Graph();
    const [x, y] = [variable(graph, 'x'), variable(graph, 'y')];
    for (const op of ['add', 'mul', 'min', 'max'] as const) {
      expect(binary(graph, op, x, y)).toBe(binary(graph, op, y, x));
    }
    expect(binary(graph, 'sub', x, y)).not.toBe(binary(graph, 'sub', y, x));
    const count = graph.nodes.length;
    binary(graph, 'sub', x, y);
    expect(graph.nodes.length).toBe(count);
  });

  it('a variable called like a key of another node stays apart', () => {
    const graph = new Graph();
    expect(variable(graph, 'i')).not.toBe(pi(graph));
    expect(variable(graph, 'pi')).not.toBe(pi(graph));
    expect(variable(graph, '^2 0')).not.toBe(power(graph, variable(graph, 'x'), rational(2)));
  });

  it('a child is older than its parent', () => {
    const graph = new Graph();
    const nodes = shapes(graph);
    for (const a of nodes) for (const b of nodes) add(graph, a, b);
    for (const [id, node] of graph.nodes.entries()) {
      if ('args' in node) for (const argument of node.args) expect(argument).toBeLessThan(id);
    }
  });

  it('constants are folded exactly: 1/3 + 1/6 = 1/2, 2^10 = 1024, and a rational exponent is kept', () => {
    const graph = new Graph();
    const sum = add(graph, constant(graph, rational(1, 3)), constant(graph, rational(1, 6)));
    expect(rationalValue(graph, sum)?.equals(rational(1, 2))).toBe(true);
    expect(rationalValue(graph, raise(graph, constant(graph, 2), constant(graph, 10)))?.equals(1024)).toBe(true);
    const node = graph.node(raise(graph, variable(graph, 'x'), constant(graph, rational(4, 3))));
    expect(node.kind === 'power' && node.exponent.equals(rational(4, 3))).toBe(true);
  });
});

it('squares √x times a factor without the root, so that the derivative exists at x = 0', () => {
  const graph = new Graph();
  const x = variable(graph, 'x');
  const y = variable(graph, 'y');
  const root = power(graph, x, rational(1, 2));
  const squared = power(graph, binary(graph, 'div', binary(graph, 'mul', root, y), pi(graph)), rational(2));
  const slope = differentiate(graph, squared, 'x');
  const [value] = evaluateDecimal(
    graph,
    [slope],
    new Map([
      ['x', new Decimal(0)],
      ['y', new Decimal(3)],
    ]),
    20,
  );
  // 9/π²
  expect((value as Decimal).toNumber()).toBeCloseTo(9 / Math.PI ** 2, 14);
});
