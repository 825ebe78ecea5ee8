import { describe, expect, it } from 'vitest';
import { add, binary, choice, constant, div, mul, power, sub, variable } from '../../src/graph/build.ts';
import { Graph, type NodeId } from '../../src/graph/graph.ts';
import { printNode } from '../../src/graph/print.ts';
import { makeSigns } from '../../src/graph/sign.ts';
import { rational } from '../../src/number/rational.ts';
import { clampBranches } from '../../src/rewrite/clamp.ts';
import { joinRoots } from '../../src/rewrite/root.ts';
import { decideSwitches } from '../../src/rewrite/switch.ts';
import { expectSame } from './same-value.ts';

const g = new Graph();
const [a, b, x] = ['a', 'b', 'x'].map((name) => variable(g, name)) as [NodeId, NodeId, NodeId];
const number = (p: number, q = 1) => constant(g, rational(p, q));
const signs = makeSigns(g, new Set(['a', 'b', 'x']));

describe('branches see no more than their part', () => {
  it('x ≤ 1 ? x² : 1/(x − 1/2) has min(x, 1) in one branch and max(x, 1) in the other', () => {
    const argument = mul(g, a, x);
    const one = number(1);
    const old = choice(
      g,
      'ifLessEqual',
      argument,
      one,
      power(g, argument, rational(2)),
      div(g, one, sub(g, argument, number(1, 2))),
    );
    const [made] = clampBranches(g, [old]) as [NodeId];
    const inside = binary(g, 'min', argument, one);
    const beyond = binary(g, 'max', argument, one);
    expect(made).toBe(
      choice(g, 'ifLessEqual', argument, one, power(g, inside, rational(2)), div(g, one, sub(g, beyond, number(1, 2)))),
    );
    expectSame(g, old, made);
  });

  it('a switch at zero and a switch on a variable stay as they are', () => {
    const atZero = choice(g, 'ifLess', number(0), mul(g, a, x), div(g, b, mul(g, a, x)), number(0));
    const onVariable = choice(g, 'ifLess', x, number(1), b, mul(g, a, x));
    expect(clampBranches(g, [atZero, onVariable])).toEqual([atZero, onVariable]);
  });
});

describe('switches that signs answer', () => {
  const cube = power(g, variable(g, 'w'), rational(3));
  const closed = makeSigns(g, new Set(['x']), (id) => (id === cube ? 0 : Number.NEGATIVE_INFINITY));

  it('0 < x is so for a positive x', () => {
    const old = choice(g, 'ifLess', number(0), x, mul(g, a, b), number(7));
    expect(decideSwitches(g, [old], closed)).toEqual([mul(g, a, b)]);
  });

  it('0 < w³ ? w³·A : 0 is w³·A, but only where A has a value at w = 0', () => {
    const plain = mul(g, cube, add(g, a, b));
    const pole = mul(g, cube, div(g, a, cube));
    const guarded = (node: NodeId) => choice(g, 'ifLess', number(0), cube, node, number(0));
    expect(decideSwitches(g, [guarded(plain), guarded(mul(g, a, b))], closed)).toEqual([plain, guarded(mul(g, a, b))]);
    const division = choice(g, 'ifLess', number(0), cube, mul(g, cube, div(g, a, variable(g, 'w'))), number(0));
    expect(decideSwitches(g, [division], closed)).toEqual([division]);
    expect(printNode(g, pole)).toContain('/');
  });
});

describe('a switch within its own branch', () => {
  it('is decided there', () => {
    const x2 = mul(g, a, x);
    const inner = (yes: NodeId, no: NodeId) => choice(g, 'ifLess', number(1), x2, yes, no);
    const old = inner(mul(g, b, inner(a, number(0))), add(g, inner(number(3), x), number(1)));
    const [made] = decideSwitches(g, [old], signs) as [NodeId];
    expect(made).toBe(inner(mul(g, b, a), add(g, x, number(1))));
    expectSame(g, old, made);
  });
});

describe('roots', () => {
  it('a·√((3/(5a + b))²/2 + 1/2), as in TPSS, has the quotient 5a/(5a + b)', () => {
    const bottom = add(g, mul(g, number(5), a), b);
    const square = power(g, div(g, number(3), bottom), rational(2));
    const old = mul(g, a, power(g, add(g, mul(g, number(1, 2), square), number(1, 2)), rational(1, 2)));
    const [made] = joinRoots(g, [old], signs) as [NodeId];
    expect(made).not.toBe(old);
    expect(printNode(g, made)).toContain('5*a/(b + 5*a)');
    expectSame(g, old, made);
  });

  it('a factor that may be negative stays outside', () => {
    const y = variable(g, 'y');
    const bottom = add(g, mul(g, number(5), y), b);
    const square = power(g, div(g, number(3), bottom), rational(2));
    const old = mul(g, y, power(g, add(g, square, number(1, 2)), rational(1, 2)));
    expect(joinRoots(g, [old], signs)).toEqual([old]);
  });
});
