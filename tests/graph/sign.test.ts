import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { add, choice, constant, div, mul, neg, power, sub, unary, variable } from '../../src/graph/build.ts';
import { Graph, type NodeId } from '../../src/graph/graph.ts';
import { makeSigns } from '../../src/graph/sign.ts';
import { compilePoint } from '../../src/kernel/float64.ts';
import { rational } from '../../src/number/rational.ts';
import { arbitraryExpression, variableNames } from './arbitrary.ts';

const g = new Graph();
const [x, y] = ['x', 'y'].map((name) => variable(g, name)) as [NodeId, NodeId];
const signs = makeSigns(g, new Set(['x']));

describe('signs', () => {
  it.each([
    ['x', x, true, true],
    ['y, of which nothing is known', y, false, false],
    ['y²', power(g, y, rational(2)), false, true],
    ['1/y², where it has a value', power(g, y, rational(-2)), true, true],
    ['√y, where it has a value', power(g, y, rational(1, 2)), false, true],
    ['x + y²', add(g, x, power(g, y, rational(2))), true, true],
    ['x − 1', sub(g, x, constant(g, 1)), false, false],
    [
      '(1 + y)^(2/3) + (1 − y)^(2/3)',
      add(g, power(g, add(g, constant(g, 1), y), rational(2, 3)), power(g, sub(g, constant(g, 1), y), rational(2, 3))),
      true,
      true,
    ],
    ['−x', neg(g, x), false, false],
    ['−(−x·eʸ)', neg(g, mul(g, neg(g, x), unary(g, 'exp', y))), true, true],
    ['(−x)³·(−x)', mul(g, power(g, neg(g, x), rational(3)), neg(g, x)), true, true],
    ['1/(−x)²', power(g, neg(g, x), rational(-2)), true, true],
    ['log(1 + y²/x)', unary(g, 'log1p', div(g, power(g, y, rational(2)), x)), false, true],
    ['eʸ·x', mul(g, unary(g, 'exp', y), x), true, true],
    ['one branch of unknown sign', choice(g, 'ifLess', x, y, x, y), false, false],
  ])('%s', (_name, node, isPositive, isNonNegative) => {
    expect([signs.isPositive(node), signs.isNonNegative(node)]).toEqual([isPositive, isNonNegative]);
  });

  it('(eʸ − 1)/(1 + x) exceeds −1, (eʸ − 1)·x need not', () => {
    const step = unary(g, 'expm1', y);
    expect(signs.isAboveMinusOne(div(g, step, add(g, constant(g, 1), x)))).toBe(true);
    expect(signs.isAboveMinusOne(mul(g, step, power(g, add(g, x, constant(g, 1)), rational(-1, 4))))).toBe(true);
    expect(signs.isAboveMinusOne(mul(g, step, x))).toBe(false);
    expect(signs.isAboveMinusOne(div(g, step, x))).toBe(false);
  });

  it('a lower bound answers where the form does not', () => {
    const known = makeSigns(g, new Set(), (id) => (id === y ? 0 : 1));
    expect([known.isPositive(y), known.isNonNegative(y), known.isPositive(x)]).toEqual([false, true, true]);
  });

  it('what is called positive or not negative is so at random points of random expressions', () => {
    fc.assert(
      fc.property(
        arbitraryExpression(4),
        fc.array(fc.double({ min: 0.01, max: 3, noNaN: true }), { minLength: 3, maxLength: 3 }),
        (build, place) => {
          const graph = new Graph();
          const node = build(graph);
          const known = makeSigns(graph, new Set(variableNames));
          const value = compilePoint(graph, node, variableNames)(Float64Array.from(place));
          if (Number.isNaN(value)) return;
          if (known.isNonNegative(node)) expect(value).toBeGreaterThanOrEqual(0);
          if (known.isAboveMinusOne(node)) expect(value).toBeGreaterThanOrEqual(-1);
          // A double may underflow to 0.
          if (known.isPositive(node) && Math.abs(value) < 1e-300) expect(value).toBeGreaterThanOrEqual(0);
        },
      ),
      { numRuns: 500, seed: 3 },
    );
  });
});
