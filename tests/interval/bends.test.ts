import { describe, expect, it } from 'vitest';
import { differentiate } from '../../src/derivative/differentiate.ts';
import { power, unary, variable } from '../../src/graph/build.ts';
import { Graph, type NodeId } from '../../src/graph/graph.ts';
import { type SmoothName, smoothFunctions } from '../../src/interval/functions.ts';
import { powerFunction } from '../../src/interval/powers.ts';
import { makeScratch, register } from '../../src/interval/scratch.ts';
import { expand, type Smooth } from '../../src/interval/smooth.ts';
import { evaluateDecimal } from '../../src/kernel/decimal.ts';
import { type Decimal, exactDecimal } from '../../src/number/decimal.ts';
import { rational } from '../../src/number/rational.ts';

/** Places to try, as middle and half width, for functions on the whole line and for those of positive arguments. */
const wholeLine = [-6, -1.3, -1, -0.4, 0, 1e-3, 0.2, 0.7, 1, 1.22, 1.7, 4];
const positive = [1e-6, 0.02, 0.5, 1, 1.5, 7, 300];
const halves = [1e-7, 0.1, 0.7];

const functions: readonly (readonly [string, Smooth, (graph: Graph, x: NodeId) => NodeId, readonly number[]])[] = [
  ...(['exp', 'expm1', 'atan', 'asinh', 'tanh', 'erf', 'sinh', 'cosh'] as const).map(
    (name: SmoothName) =>
      [name, smoothFunctions[name], (graph: Graph, x: NodeId) => unary(graph, name, x), wholeLine] as const,
  ),
  ...(['log', 'log1p', 'lambertW'] as const).map(
    (name: SmoothName) =>
      [name, smoothFunctions[name], (graph: Graph, x: NodeId) => unary(graph, name, x), positive] as const,
  ),
  ...(
    [
      [2, 1],
      [3, 1],
      [4, 1],
      [5, 1],
      [-1, 1],
      [-2, 1],
    ] as const
  ).map(
    ([p, q]) =>
      [
        `x^${p}`,
        powerFunction(rational(p, q)),
        (graph: Graph, x: NodeId) => power(graph, x, rational(p, q)),
        p > 0 ? wholeLine : positive,
      ] as const,
  ),
  ...(
    [
      [1, 2],
      [1, 3],
      [4, 3],
      [-1, 4],
      [7, 3],
      [-5, 6],
    ] as const
  ).map(
    ([p, q]) =>
      [
        `x^(${p}/${q})`,
        powerFunction(rational(p, q)),
        (graph: Graph, x: NodeId) => power(graph, x, rational(p, q)),
        positive,
      ] as const,
  ),
];

describe('parabolas enclose the function over the interval, against 40 digits', () => {
  it.each(functions)('%s', (_name, f, build, middles) => {
    const graph = new Graph();
    const node = build(graph, variable(graph, 'x'));
    const valueAt = (x: Decimal) => evaluateDecimal(graph, [node], new Map([['x', x]]), 40)[0] as Decimal;
    for (const middle of middles) {
      for (const half of halves.map((width) => (middles === positive ? width * middle : width))) {
        const [lower, upper] = [middle - half, middle + half];
        const scratch = makeScratch();
        scratch[register.lower] = lower;
        scratch[register.upper] = upper;
        expand(f, scratch);
        if (!Number.isFinite(scratch[register.error] as number)) continue;
        const at = (index: number) => exactDecimal(scratch[index] as number);
        for (let step = 0; step <= 4; step++) {
          const x = exactDecimal(Math.min(upper, lower + ((upper - lower) * step) / 4));
          const d = x.minus(at(register.middle));
          const line = at(register.offset).plus(at(register.slope).times(d));
          const gap = valueAt(x)
            .minus(line.plus(at(register.bend).times(d).times(d)))
            .abs();
          expect(gap.lte(at(register.error)), `${lower}…${upper}, step ${step}`).toBe(true);
        }
      }
    }
  });

  it.each(functions.filter(([, f]) => f.bends !== undefined))(
    '%s: second and third derivatives lie in their enclosures',
    (_name, f, build, middles) => {
      const graph = new Graph();
      const x = variable(graph, 'x');
      const first = differentiate(graph, build(graph, x), 'x');
      const second = differentiate(graph, first, 'x');
      const third = differentiate(graph, second, 'x');
      const at = (node: NodeId, place: number) =>
        evaluateDecimal(graph, [node], new Map([['x', exactDecimal(place)]]), 40)[0] as Decimal;
      const [value, slope, out, low, high] = Array.from({ length: 5 }, () => new Float64Array(2)) as [
        Float64Array,
        Float64Array,
        Float64Array,
        Float64Array,
        Float64Array,
      ];
      const inside = (true_: Decimal) =>
        !true_.isFinite() || (true_.gte(exactDecimal(out[0] as number)) && true_.lte(exactDecimal(out[1] as number)));
      for (const middle of middles) {
        f.at(middle, value);
        f.slope?.(middle, value, slope);
        f.bends?.second(middle, value, slope, out);
        expect(inside(at(second, middle)), `f″(${middle})`).toBe(true);
        const half = middles === positive ? middle / 2 : 0.6;
        f.at(middle - half, low);
        f.at(middle + half, high);
        if (f.bends?.third(middle - half, middle + half, low, high, out) !== true) continue;
        for (let step = -2; step <= 2; step++)
          expect(inside(at(third, middle + (half * step) / 2)), `f‴ near ${middle}`).toBe(true);
      }
    },
  );

  it('the error falls with the cube of the width', () => {
    const errorOf = (half: number) => {
      const scratch = makeScratch();
      scratch[register.lower] = 1 - half;
      scratch[register.upper] = 1 + half;
      expand(smoothFunctions.exp, scratch);
      return scratch[register.error] as number;
    };
    expect(errorOf(0.02) / errorOf(0.01)).toBeGreaterThan(7);
    expect(errorOf(0.02) / errorOf(0.01)).toBeLessThan(9);
  });
});
