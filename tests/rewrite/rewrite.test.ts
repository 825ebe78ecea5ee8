import { describe, expect, it } from 'vitest';
import { add, constant, div, mul, neg, power, sub, unary, variable } from '../../src/graph/build.ts';
import { Graph, type NodeId } from '../../src/graph/graph.ts';
import { printNode } from '../../src/graph/print.ts';
import { type Rational, rational } from '../../src/number/rational.ts';
import { separateBlends } from '../../src/rewrite/blend.ts';
import { mergeLogarithms } from '../../src/rewrite/logarithm.ts';
import { simplify } from '../../src/rewrite/simplify.ts';
import { expectSame } from './same-value.ts';

const g = new Graph();
const [a, b, f, c, t, w] = ['a', 'b', 'f', 'c', 't', 'w'].map((name) => variable(g, name)) as [
  NodeId,
  NodeId,
  NodeId,
  NodeId,
  NodeId,
  NodeId,
];
const number = (p: number, q = 1) => constant(g, rational(p, q));

describe('blends', () => {
  it('a + f·(b − a) becomes a·(1 − f) + f·b', () => {
    const old = add(g, a, mul(g, f, sub(g, b, a)));
    const [made] = separateBlends(g, [old]) as [NodeId];
    expect(printNode(g, made)).toBe('a*(1 - f) + b*f');
    expectSame(g, old, made);
  });

  it('is found inside a longer sum, and with the difference the other way round', () => {
    const old = sub(g, add(g, a, c), mul(g, f, mul(g, t, sub(g, a, b))));
    const [made] = separateBlends(g, [old]) as [NodeId];
    expect(made).not.toBe(old);
    expectSame(g, old, made);
  });

  it('the identity is exact in rational arithmetic', () => {
    for (let i = 0; i < 200; i++) {
      const [x, y, z] = [rational(i * 7 - 300, 11), rational(13 - i, 1 + (i % 9)), rational(i, 17)] as [
        Rational,
        Rational,
        Rational,
      ];
      const left = x.add(z.mul(y.sub(x)));
      const right = x.mul(rational(1).sub(z)).add(z.mul(y));
      expect(left.equals(right)).toBe(true);
    }
  });
});

describe('logarithms', () => {
  /** c + k·log(1 + (e^(−c/k) − 1)·q) */
  const joined = (k: NodeId, q: (e: NodeId) => NodeId) => {
    const e = unary(g, 'expm1', div(g, neg(g, c), k));
    return add(g, c, mul(g, k, unary(g, 'log', add(g, number(1), q(e)))));
  };

  it.each([
    [
      '1 − g of SCAN',
      number(3, 10),
      (e: NodeId) => mul(g, e, sub(g, number(1), power(g, add(g, number(1), t), rational(-1, 4)))),
    ],
    [
      '(1 + y)/(1 + y + y²) of PBE, with y = β/(γ·(e^(−c/k) − 1))·t² hidden in A·t²',
      mul(g, a, power(g, b, rational(3))),
      (e: NodeId) => {
        const y = mul(g, div(g, f, e), power(g, t, rational(2)));
        const bottom = add(g, add(g, number(1), y), power(g, y, rational(2)));
        return div(g, mul(g, mul(g, f, power(g, t, rational(2))), add(g, number(1), y)), bottom);
      },
    ],
  ] as const)('%s: the two terms become one logarithm', (_name, k, q) => {
    const old = joined(k, q);
    const [made] = mergeLogarithms(g, [old]) as [NodeId];
    expect(made).not.toBe(old);
    expect(g.node(made)).toMatchObject({ kind: 'binary', op: 'mul' });
    expectSame(g, old, made, { c: -1 });
  });

  it('another exponent than −c/k is left alone', () => {
    const e = unary(g, 'expm1', div(g, c, number(3)));
    const old = add(g, c, mul(g, number(3), unary(g, 'log1p', mul(g, e, sub(g, number(1), t)))));
    expect(mergeLogarithms(g, [old])).toEqual([old]);
  });

  it('(D − y(1 + y))/D = 1/D for D = 1 + y + y², exact in rational arithmetic', () => {
    for (let i = 1; i < 200; i++) {
      const y = rational(i, 1 + (i % 13));
      const bottom = rational(1).add(y).add(y.mul(y));
      const q = y.mul(rational(1).add(y)).div(bottom);
      expect(rational(1).sub(q).equals(bottom.inverse())).toBe(true);
    }
  });
});

describe('sums and powers', () => {
  it('1 − (1 − w³) is w³, and its cube root w where w ≥ 0', () => {
    const cube = power(g, w, rational(3));
    const old = power(g, sub(g, number(1), sub(g, number(1), cube)), rational(1, 3));
    expect(simplify(g, [old], new Set(['w']))).toEqual([w]);
    expect(simplify(g, [old], new Set())).not.toEqual([w]);
  });
});
