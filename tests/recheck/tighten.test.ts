import fc from 'fast-check';
import { describe, expect, it, vi } from 'vitest';
import { add, constant, div, mul, power, sub, unary, variable } from '../../src/graph/build.ts';
import { Graph, type NodeId } from '../../src/graph/graph.ts';
import { makeSigns, type Signs } from '../../src/graph/sign.ts';
import { reachable } from '../../src/graph/traverse.ts';
import { evaluateDecimal } from '../../src/kernel/decimal.ts';
import { rational } from '../../src/number/rational.ts';
import { slot } from '../../src/recheck/form.ts';
import { lowerBounds } from '../../src/recheck/lower-bounds.ts';
import { shareEnds } from '../../src/recheck/tighten.ts';
import { arbitraryExpression, variableNames } from '../graph/arbitrary.ts';
import { arbitraryBox, arbitraryPlaces, type Box, boundsOf, expectInside, pointAt } from './boxes.ts';

const infinity = Number.POSITIVE_INFINITY;
const still: readonly [number, number] = [0, 0];

/** Values in 40 digits of a/(a + b) for random a, b ≥ 0 lie inside. */
function checkShares(numRuns: number): void {
  fc.assert(
    fc.property(
      arbitraryExpression(2),
      arbitraryExpression(2),
      fc.constantFrom('abs', 'square', 'exp'),
      arbitraryBox(-2, 2),
      arbitraryPlaces,
      (first, second, kind, box, places) => {
        const graph = new Graph();
        const a = unary(graph, 'abs', first(graph));
        const inner = second(graph);
        const b =
          kind === 'square'
            ? power(graph, inner, rational(2))
            : kind === 'abs'
              ? unary(graph, 'abs', inner)
              : unary(graph, 'exp', unary(graph, 'sin', inner));
        const share = div(graph, a, add(graph, a, b));
        // A margin made of it, so that its form counts too.
        const node = sub(graph, share, mul(graph, share, share));
        for (const output of [share, node]) {
          const bounds = boundsOf(graph, output, box);
          for (const place of places) {
            const value = evaluateDecimal(graph, [output], pointAt(box, place), 40)[0];
            if (value === undefined || !value.isFinite()) expect(bounds.defined).toBe(false);
            else expectInside(value, bounds);
          }
        }
      },
    ),
    { numRuns, seed: 31 },
  );
}

describe('a share a/(a + b) of what is not negative', () => {
  const graph = new Graph();
  const [a, b] = [variable(graph, 'a'), variable(graph, 'b')];
  const share = div(graph, a, add(graph, a, b));

  it('encloses its values on random boxes, against 40 digits', () => checkShares(400), 0);

  it('an unsound rule is caught: the least value at the greatest b, and the greatest one too', () => {
    const sound = shareEnds.put;
    const spy = vi.spyOn(shareEnds, 'put').mockImplementation((out, rowA, atA, rowB, atB) => {
      const atEnd = rowB.slice(atB, atB + slot.unit);
      atEnd.copyWithin(slot.lower, slot.upper);
      sound(out, rowA, atA, atEnd, 0);
    });
    expect(() => checkShares(400)).toThrow(/Property failed/);
    spy.mockRestore();
  }, 0);

  it('an unsound rule is caught: a lower end one part in 10⁹ too high', () => {
    const sound = shareEnds.put;
    const spy = vi.spyOn(shareEnds, 'put').mockImplementation((out, ...rows) => {
      sound(out, ...rows);
      out[0] = Math.floor((out[0] as number) * (1 + 1e-9));
    });
    expect(() => checkShares(2000)).toThrow(/Property failed/);
    spy.mockRestore();
  }, 0);

  it('is enclosed to its digits: 1/4 … 2/3 for a in 1 … 2, b in 1 … 3', () => {
    const { lower, upper } = boundsOf(graph, share, [[1, 2], [1, 3], still]);
    expect(lower.toNumber()).toBeCloseTo(0.25, 12);
    expect(upper.toNumber()).toBeCloseTo(2 / 3, 12);
  });

  it.each([
    ['that touches 0/0', [0, 1], [0, 1], 0, 1],
    ['without end', [0, infinity], [0, infinity], 0, 1],
    ['without end along b', [1, 2], [0, infinity], 0, 1],
    ['without end along a', [1, infinity], [1, 3], 0.25, 1],
    ['where a touches 0', [0, 1], [1, 2], 0, 0.5],
  ] as const)('on a box %s', (_name, ofA, ofB, low, high) => {
    const signs = makeSigns(graph, new Set(['a', 'b']));
    const { lower, upper, defined } = boundsOf(graph, share, [ofA, ofB, still], signs);
    expect(defined).toBe(true);
    expect(lower.toNumber()).toBeCloseTo(low, 12);
    expect(upper.toNumber()).toBeCloseTo(high, 12);
  });

  it('on a box that touches 0/0 may lack a value where no sign is known', () => {
    expect(boundsOf(graph, share, [[0, 1], [0, 1], still]).defined).toBe(false);
  });

  it('is left alone where a may be negative: a/(a + b) from −1/2 at a = −1, b = 3', () => {
    const { lower } = boundsOf(graph, share, [[-1, 2], [3, 4], still]);
    expect(lower.toNumber()).toBeLessThanOrEqual(-0.5);
  });
});

const functions = {
  log: (graph: Graph, x: NodeId) => unary(graph, 'log', x),
  log1p: (graph: Graph, x: NodeId) => unary(graph, 'log1p', x),
  lambertW: (graph: Graph, x: NodeId) => unary(graph, 'lambertW', x),
  'x^(1/2)': (graph: Graph, x: NodeId) => power(graph, x, rational(1, 2)),
  'x^(3/4)': (graph: Graph, x: NodeId) => power(graph, x, rational(3, 4)),
  'x^(-1/2)': (graph: Graph, x: NodeId) => power(graph, x, rational(-1, 2)),
  'x^(-1/3)': (graph: Graph, x: NodeId) => power(graph, x, rational(-1, 3)),
  'x^(-2)': (graph: Graph, x: NodeId) => power(graph, x, rational(-2)),
  '1/x': (graph: Graph, x: NodeId) => div(graph, constant(graph, 1), x),
};

/** Says of one node that it is inside the domain of every function. */
const saying = (node: NodeId): Signs => ({
  isPositive: (id) => id === node,
  isNonNegative: (id) => id === node,
  isAboveMinusOne: (id) => id === node,
});

describe('an argument that its sign keeps inside a domain', () => {
  it.each(Object.entries(functions))('%s: cut there, it encloses all values, against 40 digits', (name, apply) => {
    const least = name === 'log1p' ? -1 : 0;
    let reaching = 0;
    fc.assert(
      fc.property(arbitraryExpression(2), arbitraryBox(-2, 2), arbitraryPlaces, (build, box, places) => {
        const graph = new Graph();
        const argument = mul(graph, constant(graph, 3), build(graph));
        const image = apply(graph, argument);
        if (evaluateDecimal(graph, [argument], pointAt(box, [0.5, 0.5, 0.5]), 40)[0]?.lte(least) === true) return;
        const bounds = boundsOf(graph, image, box, saying(argument));
        const ofArgument = boundsOf(graph, argument, box);
        if (ofArgument.lower.lt(least)) reaching++;
        expect(bounds.defined).toBe(ofArgument.defined);
        for (const place of places) {
          const [x, value] = evaluateDecimal(graph, [argument, image], pointAt(box, place), 40);
          // Where the argument is elsewhere, what was said of it is wrong.
          if (x === undefined || !x.gt(least) || value === undefined || !value.isFinite()) continue;
          expectInside(value, bounds);
        }
      }),
      { numRuns: 250, seed: 32 },
    );
    expect(reaching).toBeGreaterThan(10);
  });

  it('1/x over −1 … 2 is 1/2 or more where x is positive', () => {
    const graph = new Graph();
    const x = variable(graph, 'a');
    const inverse = functions['1/x'](graph, x);
    const { lower, upper, defined } = boundsOf(graph, inverse, [[-1, 2], still, still], saying(x));
    expect(lower.toNumber()).toBeCloseTo(0.5, 12);
    expect([upper.toNumber(), defined]).toEqual([infinity, true]);
    expect(boundsOf(graph, inverse, [[-1, 2], still, still]).defined).toBe(false);
  });

  it('log(1 + (e^(−x) − 1)/(1 + y)) has a value for every x, y > 0, without end', () => {
    const graph = new Graph();
    const [x, y] = [variable(graph, 'a'), variable(graph, 'b')];
    const part = div(graph, unary(graph, 'expm1', unary(graph, 'neg', x)), add(graph, constant(graph, 1), y));
    const box: Box = [[0, infinity], [0, infinity], still];
    const over = (signs?: Signs) => boundsOf(graph, unary(graph, 'log1p', part), box, signs);
    expect(over(makeSigns(graph, new Set(['a', 'b']))).defined).toBe(true);
    expect(over().defined).toBe(false);
  });
});

describe('lower bounds of all nodes over a box', () => {
  it('are below every value, against 40 digits', () => {
    fc.assert(
      fc.property(arbitraryExpression(4), arbitraryBox(0.1, 2), arbitraryPlaces, (build, box, places) => {
        const graph = new Graph();
        const node = build(graph);
        const signs = makeSigns(graph, new Set(variableNames.filter((_, axis) => (box[axis]?.[0] ?? -1) >= 0)));
        const lower = lowerBounds(graph, node, variableNames, Float64Array.from(box.flat()), signs);
        const ids = reachable(graph, [node]);
        for (const place of places) {
          const values = evaluateDecimal(graph, ids, pointAt(box, place), 40);
          ids.forEach((id, index) => {
            const value = values[index];
            if (value === undefined || !value.isFinite()) return;
            expectInside(value, { lower: value.mul(0).plus(lower(id)), upper: value.abs().plus(1) });
          });
        }
      }),
      { numRuns: 200, seed: 33 },
    );
  });

  it('tell that (2 − w³)^(5/3) is positive for w in 0 … 1, which its making does not', () => {
    const graph = new Graph();
    const w = variable(graph, 'a');
    const base = sub(graph, constant(graph, 2), power(graph, w, rational(3)));
    const node = power(graph, base, rational(5, 3));
    const positive = new Set(['a']);
    const byMaking = makeSigns(graph, positive);
    expect(byMaking.isNonNegative(node)).toBe(false);
    const box = Float64Array.from([0, 1, 0, 0, 0, 0]);
    const bounded = makeSigns(graph, positive, lowerBounds(graph, node, variableNames, box, byMaking));
    expect(bounded.isPositive(node)).toBe(true);
    const wider = Float64Array.from([0, 2, 0, 0, 0, 0]);
    expect(
      makeSigns(graph, positive, lowerBounds(graph, node, variableNames, wider, byMaking)).isNonNegative(node),
    ).toBe(false);
  });

  it('on a box without end, and of a node that is not asked for: −∞', () => {
    const graph = new Graph();
    const [a, b] = [variable(graph, 'a'), variable(graph, 'b')];
    const box = Float64Array.from([0, infinity, 0, infinity, 0, 0]);
    const signs = makeSigns(graph, new Set(['a', 'b']));
    const difference = sub(graph, a, b);
    const lower = lowerBounds(graph, difference, variableNames, box, signs);
    expect([lower(difference), lower(a), lower(add(graph, a, b))]).toEqual([-infinity, 0, -infinity]);
  });
});
