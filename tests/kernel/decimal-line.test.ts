import { expect, test } from 'vitest';
import { add, choice, constant, div, mul, unary, variable } from '../../src/graph/build.ts';
import { Graph } from '../../src/graph/graph.ts';
import { evaluateDecimal } from '../../src/kernel/decimal.ts';
import { decimalLine } from '../../src/kernel/decimal-line.ts';
import { decimalContext } from '../../src/number/decimal.ts';

test('a node along a line has the values of a fresh evaluation at each point and precision', () => {
  const graph = new Graph();
  const [x, a] = [variable(graph, 'x'), variable(graph, 'a')];
  const still = unary(graph, 'exp', mul(graph, a, a));
  // A branch that is not taken at first, and has no value there.
  const branch = choice(
    graph,
    'ifLess',
    x,
    constant(graph, 1),
    still,
    div(graph, still, add(graph, x, constant(graph, -1))),
  );
  const node = add(graph, unary(graph, 'log', x), branch);
  const { from } = decimalContext(60);
  const line = decimalLine(graph, node, new Map([['a', from('0.3')]]), new Set(['x']));
  for (const digits of [20, 60]) {
    for (const at of ['0.5', '1', '2', '7.25', '0.5']) {
      const bindings = new Map([
        ['a', from('0.3')],
        ['x', from(at)],
      ]);
      const [fresh] = evaluateDecimal(graph, [node], bindings, digits);
      expect(line(new Map([['x', from(at)]]), digits).toString()).toBe(fresh?.toString());
    }
  }
});
