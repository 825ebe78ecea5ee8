import { describe, expect, it } from 'vitest';
import { add, binary, choice, constant, div, mul, power, sub, unary, variable } from '../../src/graph/build.ts';
import { Graph, type NodeId } from '../../src/graph/graph.ts';
import { printNode } from '../../src/graph/print.ts';
import { makeSigns } from '../../src/graph/sign.ts';
import { rational } from '../../src/number/rational.ts';
import { shiftMaxima } from '../../src/rewrite/maximum.ts';
import { polynomialSum } from '../../src/rewrite/polynomial.ts';
import { productOf } from '../../src/rewrite/product.ts';
import { expectSame } from './same-value.ts';

const g = new Graph();
const [e, b, d, C, z, w] = ['e', 'b', 'd', 'C', 'z', 'w'].map((name) => variable(g, name)) as [
  NodeId,
  NodeId,
  NodeId,
  NodeId,
  NodeId,
  NodeId,
];
const number = (p: number, q = 1) => constant(g, rational(p, q));
const signs = makeSigns(g, new Set(['w']));
const square = power(g, z, rational(2));

/** e(1 + Cz²) − (1 + C)z²·mean, as in the revision of PKZB that TPSS uses. */
const revised = (energy: NodeId, mean: NodeId) =>
  sub(g, mul(g, energy, add(g, number(1), mul(g, C, square))), mul(g, mul(g, add(g, number(1), C), square), mean));

describe('maxima', () => {
  it('what both parts of a revised energy have in common is collected: e·(1 − z²)', () => {
    const up = mul(g, mul(g, number(1, 2), sub(g, number(2), w)), binary(g, 'max', e, b));
    const down = mul(g, mul(g, number(1, 2), w), binary(g, 'max', e, d));
    const old = revised(e, add(g, up, down));
    const [made] = shiftMaxima(g, [old], signs, signs) as [NodeId];
    expect(printNode(g, made)).toContain('e*(1 - z^2)');
    expect(printNode(g, made)).toContain('max(b - e, 0)');
    expectSame(g, old, made);
  });

  it('out of a branch that a zero density switches off comes what has a value there', () => {
    const energy = unary(g, 'log1p', div(g, number(1), w));
    const guarded = choice(g, 'ifLess', number(0), w, mul(g, w, binary(g, 'max', energy, div(g, b, w))), number(0));
    const old = revised(energy, guarded);
    const closed = makeSigns(g, new Set(), (id) => (id === w ? 0 : Number.NEGATIVE_INFINITY));
    const [made] = shiftMaxima(g, [old], closed, signs) as [NodeId];
    expect(printNode(g, made)).toContain('0 < w ? ');
    expectSame(g, old, made);
  });

  it('a maximum whose arguments are used nowhere else stays', () => {
    const old = mul(g, C, binary(g, 'max', e, b));
    expect(shiftMaxima(g, [old], signs, signs)).toEqual([old]);
  });
});

describe('sums of products', () => {
  it('z²·C as one term and z² times C as two factors are one monomial', () => {
    const whole = add(g, number(1), mul(g, square, C));
    const made = polynomialSum(g, [
      productOf(g, whole),
      productOf(g, mul(g, number(-1), mul(g, square, add(g, number(1), C)))),
    ]) as NodeId;
    expect(printNode(g, made)).toBe('1 - z^2');
  });
});
