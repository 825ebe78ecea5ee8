import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { add, binary, choice, constant, div, mul, power, sub, unary, variable } from '../../src/graph/build.ts';
import { Graph, type NodeId } from '../../src/graph/graph.ts';
import { makeSigns } from '../../src/graph/sign.ts';
import { compileIntervals, outcome } from '../../src/kernel/interval.ts';
import { rational } from '../../src/number/rational.ts';
import { arbitraryExpression, variableNames } from '../graph/arbitrary.ts';

const graph = new Graph();
const [a, b] = ['a', 'b'].map((name) => variable(graph, name)) as [NodeId, NodeId];
const one = constant(graph, 1);

/** Lower and upper bound, and whether there is a value, over a box of a and b. */
function over(
  node: NodeId,
  box: readonly number[],
  positive: readonly string[] = [],
): readonly [number, number, boolean] {
  const signs = makeSigns(graph, new Set(positive));
  const kernel = compileIntervals(graph, [node], ['a', 'b'], signs);
  const out = new Float64Array(kernel.stride);
  kernel.evaluate(Float64Array.from(box), 0, out);
  return [out[outcome.lower] as number, out[outcome.upper] as number, out[outcome.outside] === 0];
}

const width = ([lower, upper]: readonly [number, number, boolean]) => upper - lower;

describe('second-order forms', () => {
  it('exclude what the exact range excludes to third order: x·y − x²/2 near (1, 1)', () => {
    const node = sub(
      graph,
      mul(graph, a, b),
      mul(graph, constant(graph, rational(1, 2)), power(graph, a, rational(2))),
    );
    // Over |ε|, |δ| ≤ h: 1/2 + δ + εδ − ε²/2, from 1/2 − h − h²/2 − h² at ε = h, δ = −h to 1/2 + h + h²/2.
    const h = 1 / 64;
    const [lower, upper] = over(node, [1 - h, 1 + h, 1 - h, 1 + h]);
    expect(lower).toBeLessThanOrEqual(0.5 - h - 1.5 * h * h);
    expect(lower).toBeGreaterThan(0.5 - h - 1.5 * h * h - 1e-12);
    expect(upper).toBeGreaterThanOrEqual(0.5 + h + (h * h) / 2);
    expect(upper).toBeLessThan(0.5 + h + h * h + 1e-12);
  });

  it('what cancels exactly to second order is left with an error that falls with the cube of the width', () => {
    // eᵃ·e^(−a) − 1 is 0.
    const node = sub(
      graph,
      mul(graph, unary(graph, 'exp', a), unary(graph, 'exp', sub(graph, b, a))),
      unary(graph, 'exp', b),
    );
    const wide = width(over(node, [0.9, 1.1, 0.9, 1.1]));
    const narrow = width(over(node, [0.95, 1.05, 0.95, 1.05]));
    expect(wide / narrow).toBeGreaterThan(7);
    expect(wide).toBeLessThan(0.03);
  });

  it('a/(a + b) lies between 0 and 1, also where both come to 0', () => {
    const share = div(graph, a, add(graph, a, b));
    expect(over(share, [0, 1, 0, 2], ['a', 'b'])).toEqual([0, 1, true]);
    expect(over(share, [0, 1, 0, 2])[2]).toBe(false);
    const [lower, upper] = over(share, [1, 2, 3, 4], ['a', 'b']);
    expect([lower, upper].map((x) => Number(x.toFixed(6)))).toEqual([0.2, 0.4]);
  });

  it('max(a, 1) and a branch keep the slope where the switch divides the box', () => {
    // The width of max(a, 1) − a over 0.9…1.1 is 0.1; of intervals alone it is 0.3, of the chord 0.15.
    const kink = sub(graph, binary(graph, 'max', a, one), a);
    expect(width(over(kink, [0.9, 1.1, 0, 0]))).toBeLessThan(0.16);
    const joined = sub(
      graph,
      choice(graph, 'ifLess', a, one, a, sub(graph, mul(graph, constant(graph, 2), a), one)),
      a,
    );
    expect(width(over(joined, [0.9, 1.1, 0, 0]))).toBeLessThan(0.21);
  });

  it('f(a)·(1 − f(a)) is seen as a parabola of f where a enters by f alone', () => {
    const f = div(graph, one, add(graph, one, unary(graph, 'exp', mul(graph, constant(graph, 8), a))));
    const node = mul(graph, b, mul(graph, f, sub(graph, one, f)));
    const [lower, upper] = over(node, [-1, 1, 1, 1.5]);
    expect(lower).toBeGreaterThan(-0.2);
    expect(upper).toBeLessThan(0.6);
  });
});

describe('values kept from the box before', () => {
  it('never change what a fresh kernel would say: random expressions over random walks of boxes', () => {
    const ends = fc.tuple(fc.double({ min: -2, max: 2, noNaN: true }), fc.constantFrom(0, 1e-3, 0.3, 1));
    const step = fc.tuple(fc.integer({ min: 0, max: 7 }), fc.array(ends, { minLength: 3, maxLength: 3 }));
    fc.assert(
      fc.property(arbitraryExpression(4), fc.array(step, { minLength: 3, maxLength: 6 }), (build, walk) => {
        const own = new Graph();
        const node = build(own);
        const kept = compileIntervals(own, [node], variableNames);
        const box = new Float64Array(6);
        const [before, after] = [new Float64Array(kept.stride), new Float64Array(kept.stride)];
        for (const [axes, places] of walk) {
          places.forEach(([middle, half], axis) => {
            if ((axes & (1 << axis)) !== 0) box.set([middle - half, middle + half], 2 * axis);
          });
          kept.evaluate(box, 0, before);
          compileIntervals(own, [node], variableNames).evaluate(box, 0, after);
          expect(before).toEqual(after);
        }
      }),
      { numRuns: 60, seed: 5 },
    );
  });
});
