import fc from 'fast-check';
import { describe, expect, it, vi } from 'vitest';
import { choice, constant, div, mul, power, sub, unary, variable } from '../../src/graph/build.ts';
import { Graph, type NodeId } from '../../src/graph/graph.ts';
import { smoothFunctions } from '../../src/interval/functions.ts';
import { evaluateDecimal } from '../../src/kernel/decimal.ts';
import { compileIntervals, outcome } from '../../src/kernel/interval.ts';
import { evaluateIntervals } from '../../src/kernel/interval-point.ts';
import { exactDecimal } from '../../src/number/decimal.ts';
import { rational } from '../../src/number/rational.ts';
import { arbitraryExpression, variableNames } from '../graph/arbitrary.ts';

type Box = readonly (readonly [number, number])[];

const arbitraryBox: fc.Arbitrary<Box> = fc
  .tuple(
    fc.constantFrom(0, 1e-9, 1e-3, 0.1, 1),
    fc.array(fc.double({ min: -2, max: 2, noNaN: true }), { minLength: 3, maxLength: 3 }),
  )
  .map(([half, middles]) => middles.map((middle) => [middle - half, middle + half] as const));

const arbitraryPlaces = fc.array(fc.array(fc.constantFrom(0, 0.5, 1, 0.25, 0.9), { minLength: 3, maxLength: 3 }), {
  minLength: 1,
  maxLength: 3,
});

interface Enclosure {
  readonly lower: number;
  readonly upper: number;
  readonly defined: boolean;
}

function compiled(graph: Graph, node: NodeId, box: Box): Enclosure {
  const kernel = compileIntervals(graph, [node], variableNames);
  const out = new Float64Array(kernel.stride);
  kernel.evaluate(Float64Array.from(box.flat()), 0, out);
  return {
    lower: out[outcome.lower] as number,
    upper: out[outcome.upper] as number,
    defined: out[outcome.outside] === 0,
  };
}

const evaluators: readonly (readonly [string, (graph: Graph, node: NodeId, box: Box) => Enclosure])[] = [
  ['generated code with second-order forms', compiled],
  [
    'natural intervals node by node',
    (graph, node, box) =>
      evaluateIntervals(
        graph,
        [node],
        new Map(variableNames.map((name, i) => [name, box[i] as [number, number]])),
      )[0] as Enclosure,
  ],
];

/** True values in 40 digits at points of random boxes lie inside what the evaluator gives; where it says that there is one, there is. */
function checkRandomGraphs(enclose: (graph: Graph, node: NodeId, box: Box) => Enclosure, numRuns: number): void {
  fc.assert(
    fc.property(arbitraryExpression(4), arbitraryBox, arbitraryPlaces, (build, box, places) => {
      const graph = new Graph();
      const node = build(graph);
      const { lower, upper, defined } = enclose(graph, node, box);
      expect(lower).not.toBeNaN();
      expect(upper).not.toBeNaN();
      for (const place of places) {
        const point = new Map(
          variableNames.map((name, axis) => {
            const [from, to] = box[axis] as readonly [number, number];
            const inside = Math.min(to, Math.max(from, from + (place[axis] as number) * (to - from)));
            return [name, exactDecimal(inside)] as const;
          }),
        );
        const value = evaluateDecimal(graph, [node], point, 40)[0];
        if (value === undefined || value.isNaN()) expect(defined).toBe(false);
        else {
          const slack = value.abs().times('1e-30');
          if (!value.plus(slack).gte(exactDecimal(lower)) || !value.minus(slack).lte(exactDecimal(upper)))
            throw new Error(`${value} is outside ${lower} … ${upper}`);
        }
      }
    }),
    { numRuns, seed: 7 },
  );
}

describe('enclosures of random graphs over every operator on random boxes, against 40 digits', () => {
  it.each(evaluators)('%s', (_name, enclose) => checkRandomGraphs(enclose, 200), 0);

  it('an unsound rule is caught: some functions with their ends one part in 10⁹ too tight', () => {
    const spies = (['atan', 'erf', 'asinh', 'tanh'] as const).map((name) => {
      const sound = smoothFunctions[name].at;
      return vi.spyOn(smoothFunctions[name], 'at').mockImplementation((x, out) => {
        sound(x, out);
        const inward = Math.abs(out[0] as number) * 1e-9;
        out[0] = (out[0] as number) + inward;
        out[1] = (out[1] as number) - inward;
      });
    });
    expect(() => checkRandomGraphs((graph, node, box) => compiled(graph, node, box), 1000)).toThrow(/Property failed/);
    for (const spy of spies) spy.mockRestore();
  }, 0);
});

describe('domains', () => {
  const graph = new Graph();
  const x = variable(graph, 'a');
  const zero = constant(graph, 0);
  const one = constant(graph, 1);
  const over = (node: NodeId, lower: number, upper: number) =>
    compiled(graph, node, [
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
    ['x^(−1/3) across 0', power(graph, x, rational(-1, 3)), -1, 1],
  ] as const)('%s may lack a value', (_name, node, lower, upper) => {
    expect(over(node, lower, upper).defined).toBe(false);
  });

  it('a branch that the comparison excludes does not count', () => {
    const node = choice(graph, 'ifLess', zero, x, div(graph, one, x), zero);
    expect(over(node, -2, -1)).toMatchObject({ lower: 0, upper: 0, defined: true });
  });

  it('1/(1 − x) where x < 1, on a box that touches 1: unbounded, and has a value wherever the branch counts', () => {
    const node = choice(
      graph,
      'ifLess',
      x,
      one,
      unary(graph, 'exp', div(graph, constant(graph, -1), sub(graph, one, x))),
      zero,
    );
    const value = over(node, 0.5, 1);
    expect(value.defined).toBe(true);
    expect(value.lower).toBe(0);
    expect(value.upper).toBeLessThan(0.136);
  });

  it('1 − x ≥ 0 stays exact at x = 1', () => expect(over(sub(graph, one, x), 0.5, 1).lower).toBe(0));

  it('0·∞ is 0: x²·exp(−x) on an unbounded box is a hull and never NaN', () => {
    const node = mul(graph, power(graph, x, rational(2)), unary(graph, 'exp', unary(graph, 'neg', x)));
    const value = over(node, 0, Number.POSITIVE_INFINITY);
    expect([value.lower, value.upper]).toEqual([0, Number.POSITIVE_INFINITY]);
  });
});
