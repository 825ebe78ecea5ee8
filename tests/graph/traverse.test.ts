import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { add, constant, mul, power, variable } from '../../src/graph/build.ts';
import { argumentsOf, Graph, type NodeId } from '../../src/graph/graph.ts';
import { reachable, substitute, variablesOf } from '../../src/graph/traverse.ts';
import { evaluateDecimal } from '../../src/kernel/decimal.ts';
import { exactDecimal } from '../../src/number/decimal.ts';
import { rational } from '../../src/number/rational.ts';
import { arbitraryExpression, arbitraryPoint, variableNames } from './arbitrary.ts';

describe('reachable', () => {
  it('lists what the outputs need, children first, and nothing else', () => {
    const graph = new Graph();
    const [x, y] = [variable(graph, 'x'), variable(graph, 'y')];
    const product = mul(graph, x, constant(graph, 2));
    add(graph, product, y);
    const order = reachable(graph, [product]);
    expect(order).toContain(x);
    expect(order).not.toContain(y);
    const seen = new Set<NodeId>();
    for (const id of order) {
      for (const argument of argumentsOf(graph.node(id))) expect(seen.has(argument)).toBe(true);
      seen.add(id);
    }
    expect(reachable(graph, [])).toEqual([]);
    expect(variablesOf(graph, [product])).toEqual(new Set(['x']));
  });
});

describe('substitute', () => {
  it('equals evaluation at the substituted value (random expressions, 30 digits)', () => {
    fc.assert(
      fc.property(arbitraryExpression(3), arbitraryExpression(2), arbitraryPoint, (build, replacement, point) => {
        const graph = new Graph();
        const [output, inner] = [build(graph), replacement(graph)];
        const bindings = new Map(
          variableNames.map((name, index) => [name as string, exactDecimal(point[index] as number)]),
        );
        const [innerValue] = evaluateDecimal(graph, [inner], bindings, 50);
        if (innerValue === undefined || !innerValue.isFinite()) return;
        const [substituted] = substitute(graph, [output], new Map([['a', inner]]));
        const [actual] = evaluateDecimal(graph, [substituted as NodeId], bindings, 50);
        const [expected] = evaluateDecimal(graph, [output], new Map([...bindings, ['a', innerValue]]), 50);
        expect(
          actual
            ?.minus(expected ?? NaN)
            .abs()
            .lessThanOrEqualTo(expected?.abs().plus(1).times('1e-30') ?? NaN),
        ).toBe(true);
      }),
      { seed: 50, numRuns: 200 },
    );
  });

  it('replaces all at once, so that x and y can be swapped', () => {
    const graph = new Graph();
    const [x, y] = [variable(graph, 'x'), variable(graph, 'y')];
    const output = add(graph, power(graph, x, rational(2)), y);
    const [swapped] = substitute(
      graph,
      [output],
      new Map([
        ['x', y],
        ['y', x],
      ]),
    );
    expect(swapped).toBe(add(graph, power(graph, y, rational(2)), x));
  });
});
