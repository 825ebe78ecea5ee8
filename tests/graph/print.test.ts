import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { interpret } from '../../src/expression/interpret.ts';
import { parseExpression } from '../../src/expression/parse.ts';
import {
  add,
  choice,
  constant,
  decimal,
  div,
  mul,
  neg,
  pi,
  power,
  sub,
  unary,
  variable,
} from '../../src/graph/build.ts';
import { Graph, type NodeId } from '../../src/graph/graph.ts';
import { unaryOperators } from '../../src/graph/operator.ts';
import { printNode } from '../../src/graph/print.ts';
import { evaluateDecimal } from '../../src/kernel/decimal.ts';
import { exactDecimal } from '../../src/number/decimal.ts';
import { rational } from '../../src/number/rational.ts';
import { arbitraryExpression, arbitraryPoint, variableNames } from './arbitrary.ts';

const graph = new Graph();
const [x, y, z] = ['x', 'y', 'z'].map((name) => variable(graph, name)) as [NodeId, NodeId, NodeId];
const two = constant(graph, 2);

describe('printNode', () => {
  // Written by hand, in the notation of a sheet; arguments of a commutative operator in the order of their making.
  it.each([
    ['x - (y - z)', sub(graph, x, sub(graph, y, z))],
    ['x - y - z', sub(graph, sub(graph, x, y), z)],
    ['x/(y/z)', div(graph, x, div(graph, y, z))],
    ['x/(y*z)', div(graph, x, mul(graph, y, z))],
    ['z*(x + y)', mul(graph, z, add(graph, x, y))],
    ['-(x*y)', neg(graph, mul(graph, x, y))],
    ['(-x)^(1/5)', power(graph, neg(graph, x), rational(1, 5))],
    ['-x^2', neg(graph, power(graph, x, rational(2)))],
    ['(x^2)^(-2/3)', power(graph, power(graph, x, rational(2)), rational(-2, 3))],
    ['sqrt(x)', power(graph, x, rational(1, 2))],
    ['cbrt(x + y)', power(graph, add(graph, x, y), rational(1, 3))],
    ['0.21951*x', mul(graph, decimal(graph, '0.21951'), x)],
    ['-0.5*x', mul(graph, decimal(graph, '-0.5'), x)],
    ['10/81*x', mul(graph, constant(graph, rational(10, 81)), x)],
    ['min(x, 2)', graph.intern({ kind: 'binary', op: 'min', args: [x, two] })],
    ['pi*exp(-x)', mul(graph, pi(graph), unary(graph, 'exp', neg(graph, x)))],
    ['x < y ? x : z', choice(graph, 'ifLess', x, y, x, z)],
    ['2 + (x <= y ? x : z)', add(graph, choice(graph, 'ifLessEqual', x, y, x, z), two)],
  ])('%s', (expected, node) => {
    expect(printNode(graph, node)).toBe(expected);
  });

  it('names every unary operator as a sheet does', () => {
    for (const op of unaryOperators) {
      if (op !== 'neg') expect(printNode(graph, unary(graph, op, x))).toBe(`${op.toLowerCase()}(x)`);
    }
  });

  it('its text, parsed again, has the same value (random expressions over every operator, 30 digits)', () => {
    let usable = 0;
    fc.assert(
      fc.property(arbitraryExpression(3), arbitraryPoint, (build, point) => {
        const own = new Graph();
        const node = build(own);
        const text = printNode(own, node);
        const parsed = parseExpression({ text, placeAt: () => ({ file: 'test', line: 1, column: 1 }) });
        if (!parsed.ok || text.includes('…')) return;
        usable++;
        const unexpected = (): never => {
          throw new Error(`unexpected name in ${text}`);
        };
        const again = interpret(own, parsed.value, {
          name: (name) => variable(own, name),
          member: unexpected,
          call: unexpected,
          memberCall: unexpected,
        });
        const bindings = new Map(
          variableNames.map((name, index) => [name as string, exactDecimal(point[index] as number)]),
        );
        const [expected, actual] = evaluateDecimal(own, [node, again], bindings, 45);
        const close = actual
          ?.minus(expected ?? NaN)
          .abs()
          .lessThanOrEqualTo(expected?.abs().plus(1).times('1e-30') ?? NaN);
        expect(close, text).toBe(true);
      }),
      { seed: 60, numRuns: 300 },
    );
    expect(usable).toBeGreaterThan(250);
  });

  it('cuts repeated parts short instead of growing exponentially', () => {
    const deep = new Graph();
    let node = variable(deep, 'x');
    for (let count = 0; count < 60; count++) node = unary(deep, 'sin', mul(deep, node, unary(deep, 'cos', node)));
    const text = printNode(deep, node, 200);
    expect(text.length).toBeLessThanOrEqual(200);
    expect(text).toContain('…');
  });
});
