import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { add, constant, div, mul, neg, power, sub, unary, variable } from '../../src/graph/build.ts';
import { Graph, type NodeId } from '../../src/graph/graph.ts';
import { printNode } from '../../src/graph/print.ts';
import { makeSigns } from '../../src/graph/sign.ts';
import { evaluateDecimal } from '../../src/kernel/decimal.ts';
import { exactDecimal } from '../../src/number/decimal.ts';
import { rational } from '../../src/number/rational.ts';
import { keepsDomain } from '../../src/rewrite/domain.ts';
import { constantValue, factorSums } from '../../src/rewrite/factor.ts';
import { arbitraryExpression, variableNames } from '../graph/arbitrary.ts';
import { expectSame } from './same-value.ts';

const g = new Graph();
const [a, b, c, x] = ['a', 'b', 'c', 'x'].map((name) => variable(g, name)) as [NodeId, NodeId, NodeId, NodeId];
const one = constant(g, 1);
const factored = (node: NodeId) => (factorSums(g, [node]) as [NodeId])[0];

describe('common factors', () => {
  it.each([
    ['a·b + a·c', add(g, mul(g, a, b), mul(g, a, c)), 'a*(b + c)'],
    ['what only some terms share', add(g, add(g, mul(g, a, b), mul(g, a, c)), x), 'x + a*(b + c)'],
    ['powers', sub(g, mul(g, power(g, a, rational(3)), b), power(g, a, rational(2))), '-(a^2*(1 - a*b))'],
    ['a denominator', add(g, div(g, b, a), div(g, c, a)), '(b + c)/a'],
    ['what a sum cancels', sub(g, add(g, mul(g, a, b), mul(g, a, c)), mul(g, a, b)), 'a*c'],
  ])('%s', (_name, old, text) => {
    const made = factored(old);
    expect(printNode(g, made)).toBe(text);
    expectSame(g, old, made);
  });

  it('1 + (a − b)/(a + b) is 2a/(a + b), and equal sums and products are one node whatever their order', () => {
    const ratio = add(g, one, div(g, sub(g, a, b), add(g, a, b)));
    expect(printNode(g, factored(ratio))).toBe('2*a/(a + b)');
    expectSame(g, ratio, factored(ratio));
    expect(factored(mul(g, mul(g, a, c), b))).toBe(factored(mul(g, a, mul(g, b, c))));
    const [first, second] = [power(g, a, rational(2)), unary(g, 'exp', b)];
    expect(factored(add(g, add(g, first, x), second))).toBe(factored(add(g, first, add(g, second, x))));
  });

  it('eˣ/(eˣ − 1) and (1/q)/(1 + 1/q) keep one x and one q', () => {
    const ratio = div(g, unary(g, 'exp', x), unary(g, 'expm1', x));
    expect(printNode(g, factored(ratio))).toBe('-1/expm1(-x)');
    expectSame(g, ratio, factored(ratio));
    const inverse = div(g, one, a);
    // log(1 + 1/a) keeps the pole at a = 0, which the quotient alone would lose.
    const whole = add(g, div(g, mul(g, b, inverse), add(g, one, inverse)), unary(g, 'log1p', inverse));
    expect(printNode(g, factored(whole))).toContain('b/(a + 1)');
    expectSame(g, whole, factored(whole));
  });

  it('a form that would gain points is left alone, unless a sign says that it loses none', () => {
    const old = div(g, mul(g, a, b), a);
    expect(factored(old)).toBe(old);
    expect(factorSums(g, [old], makeSigns(g, new Set(['a'])))).toEqual([b]);
  });

  it('a(x + y) = ax + ay and e^x/(e^x − 1) = −1/(e^(−x) − 1), the first exact in rational arithmetic', () => {
    for (let i = 0; i < 100; i++) {
      const [p, q, r] = [rational(i - 40, 7), rational(3 * i, 11), rational(5 - i, 1 + (i % 4))];
      expect(
        p
          .mul(q)
          .add(p.mul(r))
          .equals(p.mul(q.add(r))),
      ).toBe(true);
    }
    expectSame(g, div(g, unary(g, 'exp', x), unary(g, 'expm1', x)), neg(g, div(g, one, unary(g, 'expm1', neg(g, x)))));
  });

  it('random expressions keep their values to 30 digits wherever they have one', () => {
    fc.assert(
      fc.property(
        arbitraryExpression(4),
        fc.array(fc.double({ min: -2, max: 2, noNaN: true }), { minLength: 3, maxLength: 3 }),
        (build, place) => {
          const graph = new Graph();
          const old = build(graph);
          const [made] = factorSums(graph, [old]) as [NodeId];
          const point = new Map(
            variableNames.map((name, index) => [name, exactDecimal(place[index] as number)] as const),
          );
          const [before, after] = evaluateDecimal(graph, [old, made], point, 60);
          if (before === undefined || !before.isFinite()) return;
          expect(
            before
              .minus(after ?? Number.NaN)
              .abs()
              .lte(before.abs().plus(1).times('1e-30')),
          ).toBe(true);
        },
      ),
      { numRuns: 300, seed: 11 },
    );
  });
});

describe('constants', () => {
  it('an identity is 0 whatever its sides divide by, and what only looks like one is not', () => {
    const left = div(g, mul(g, a, add(g, b, c)), x);
    const right = add(g, div(g, mul(g, c, a), x), div(g, mul(g, b, a), x));
    expect(constantValue(g, unary(g, 'abs', sub(g, left, right)))).toBe(constant(g, 0));
    expect(constantValue(g, sub(g, left, add(g, right, a)))).toBeUndefined();
    expect(constantValue(g, sub(g, power(g, power(g, a, rational(2)), rational(1, 2)), a))).toBeUndefined();
  });
});

describe('domains', () => {
  it.each([
    ['the pole of a quotient', div(g, b, a), b, false],
    ['the argument of a logarithm', mul(g, constant(g, 2), unary(g, 'log', a)), b, false],
    ['an even root', power(g, a, rational(1, 2)), a, false],
    ['a pole that is also in the new form', div(g, mul(g, b, c), a), div(g, b, a), true],
    [
      'eˣ − 1 and e^(−x) − 1 are zero together',
      div(g, b, unary(g, 'expm1', a)),
      div(g, b, unary(g, 'expm1', neg(g, a))),
      true,
    ],
    [
      '1 + 1/a and a + 1 are zero together',
      div(g, b, add(g, one, div(g, one, a))),
      div(g, b, mul(g, a, add(g, a, one))),
      true,
    ],
  ])('%s', (_name, old, form, kept) => expect(keepsDomain(g, old, form)).toBe(kept));
});
