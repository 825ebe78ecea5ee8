import fc from 'fast-check';
import { describe, expect, it, vi } from 'vitest';
import { choice, constant, div, mul, power, sub, unary, variable } from '../../src/graph/build.ts';
import { Graph, type NodeId } from '../../src/graph/graph.ts';
import { evaluateDecimal } from '../../src/kernel/decimal.ts';
import { rational } from '../../src/number/rational.ts';
import { arrange } from '../../src/recheck/program.ts';
import { smoothFunctions } from '../../src/recheck/smooth.ts';
import { arbitraryExpression } from '../graph/arbitrary.ts';
import { arbitraryBox, arbitraryPlaces, boundsOf, expectInside, pointAt } from './boxes.ts';

/** True values in 40 digits at points of random boxes lie inside; where the evaluator says that there is one, there is. */
function checkRandomGraphs(numRuns: number, seed = 7): void {
  fc.assert(
    fc.property(arbitraryExpression(4), arbitraryBox(-2, 2), arbitraryPlaces, (build, box, places) => {
      const graph = new Graph();
      const node = build(graph);
      const bounds = boundsOf(graph, node, box);
      const { lower, upper, defined } = bounds;
      expect(lower.isNaN() || upper.isNaN()).toBe(false);
      for (const place of places) {
        const value = evaluateDecimal(graph, [node], pointAt(box, place), 40)[0];
        if (value === undefined || value.isNaN()) expect(defined).toBe(false);
        else expectInside(value, bounds);
      }
    }),
    { numRuns, seed },
  );
}

const runs = Number(process.env.RUNGCHECK_ENCLOSURES ?? 400);

describe('enclosures of random graphs over every operator on random boxes, against 40 digits', () => {
  it('hold', () => checkRandomGraphs(runs), 0);

  it.each([
    ['a remainder left out', 'thirdMost'],
    ['a second derivative a tenth too small', 'bend'],
    ['a first derivative one part in 10⁶ too small', 'slope'],
  ] as const)(
    'an unsound rule is caught: %s',
    (_name, field) => {
      const factor = { thirdMost: 0, bend: 0.9, slope: 1 - 1e-6 }[field];
      const names = ['atan', 'erf', 'asinh', 'tanh', 'sin', 'exp', 'expm1', 'log'] as const;
      const spies = names.map((name) => {
        const sound = smoothFunctions[name].expand;
        return vi.spyOn(smoothFunctions[name], 'expand').mockImplementation((place, out) => {
          sound(place, out);
          out[field] *= factor;
          if (field === 'thirdMost') out.thirdLeast = 0;
        });
      });
      expect(() => checkRandomGraphs(2000)).toThrow(/Property failed/);
      for (const spy of spies) spy.mockRestore();
    },
    0,
  );

  it('an unsound rule is caught: values one part in 10⁹ too large', () => {
    const sound = smoothFunctions.exp.value;
    const spy = vi.spyOn(smoothFunctions.exp, 'value').mockImplementation((out, mantissa, exponent) => {
      sound(out, mantissa, exponent);
      out[0] = (out[0] as number) * (1 + 1e-9);
    });
    expect(() => checkRandomGraphs(2000)).toThrow(/Property failed/);
    spy.mockRestore();
  }, 0);
});

describe('second-order forms', () => {
  const graph = new Graph();
  const [a, b] = [variable(graph, 'a'), variable(graph, 'b')];

  it('x·(1 − x) over 0.4 … 0.6 to its digits: 0.24 … 0.25', () => {
    const node = mul(graph, a, sub(graph, constant(graph, 1), a));
    const { lower, upper } = boundsOf(graph, node, [
      [0.4, 0.6],
      [0, 0],
      [0, 0],
    ]);
    expect(lower.toNumber()).toBeCloseTo(0.24, 12);
    expect(upper.toNumber()).toBeCloseTo(0.25, 12);
  });

  it('exp(a − b) − exp(a)/exp(b), which is 0, shrinks with the cube of the box', () => {
    const exp = (x: NodeId) => unary(graph, 'exp', x);
    const node = sub(graph, exp(sub(graph, a, b)), div(graph, exp(a), exp(b)));
    const widthOver = (half: number) => {
      const { lower, upper } = boundsOf(graph, node, [
        [1 - half, 1 + half],
        [0.5 - half, 0.5 + half],
        [0, 0],
      ]);
      return upper.minus(lower).toNumber();
    };
    expect(widthOver(0.1) / widthOver(0.01)).toBeGreaterThan(900);
    expect(widthOver(0.01)).toBeLessThan(2e-5);
  });
});

describe('domains', () => {
  const graph = new Graph();
  const x = variable(graph, 'a');
  const zero = constant(graph, 0);
  const one = constant(graph, 1);
  const over = (node: NodeId, lower: number, upper: number) =>
    boundsOf(graph, node, [
      [lower, upper],
      [0, 0],
      [0, 0],
    ]);

  it.each([
    ['1/x across 0', div(graph, one, x), -1, 1],
    ['1/x from 0', div(graph, one, x), 0, 1],
    ['√x below 0', power(graph, x, rational(1, 2)), -1e-9, 1],
    ['log x from 0', unary(graph, 'log', x), 0, 1],
    ['log(1 + x) from −1', unary(graph, 'log1p', x), -1, 0],
    ['W(x) from below −1/e', unary(graph, 'lambertW', x), -0.3679, 0],
    ['x^(−1/3) across 0', power(graph, x, rational(-1, 3)), -1, 1],
  ] as const)('%s may lack a value', (_name, node, lower, upper) => {
    expect(over(node, lower, upper).defined).toBe(false);
  });

  it('a branch that the comparison excludes does not count', () => {
    const { lower, upper, defined } = over(choice(graph, 'ifLess', zero, x, div(graph, one, x), zero), -2, -1);
    expect([lower.toNumber(), upper.toNumber(), defined]).toEqual([0, 0, true]);
  });

  it('1/(1 − x) where x < 1, on a box that touches 1: unbounded, and has a value wherever the branch counts', () => {
    const pole = div(graph, constant(graph, -1), sub(graph, one, x));
    const { lower, upper, defined } = over(choice(graph, 'ifLess', x, one, unary(graph, 'exp', pole), zero), 0.5, 1);
    expect(defined).toBe(true);
    expect(lower.toNumber()).toBe(0);
    // exp(−2) = 0.1353…
    expect(upper.toNumber()).toBeLessThan(0.136);
  });

  it('log(1 + x) where x < 0, on a box that touches −1, may lack a value though x is not zero', () => {
    const node = choice(graph, 'ifLess', x, zero, unary(graph, 'log1p', x), zero);
    expect(over(node, -1, -0.5).defined).toBe(false);
  });

  it('1 − x ≥ 0 stays exact at x = 1', () => expect(over(sub(graph, one, x), 0.5, 1).lower.toNumber()).toBe(0));

  it('0·∞ is 0: x²·exp(−x) on an unbounded box is a hull and never NaN', () => {
    const node = mul(graph, power(graph, x, rational(2)), unary(graph, 'exp', unary(graph, 'neg', x)));
    const { lower, upper } = over(node, 0, Number.POSITIVE_INFINITY);
    expect([lower.toNumber(), upper.toNumber()]).toEqual([0, Number.POSITIVE_INFINITY]);
  });

  it('values that a double does not hold are enclosed: exp(1000·x) over 2 … 3, and its inverse', () => {
    const grown = unary(graph, 'exp', mul(graph, constant(graph, 1000), x));
    // log₁₀ e = 0.4342944819…
    expect(over(grown, 2, 3).lower.log(10).toNumber()).toBeCloseTo(868.5889638, 6);
    expect(
      over(div(graph, one, grown), 2, 3)
        .upper.log(10)
        .toNumber(),
    ).toBeCloseTo(-868.5889638, 6);
  });

  it('more variables than forms have axes are refused', () => {
    expect(() => arrange(graph, x, ['a', 'b', 'c', 'd', 'e', 'f', 'g'])).toThrow(RangeError);
  });
});
