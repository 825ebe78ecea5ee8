import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import type { Axis } from '../../src/search/axis.ts';
import { descend } from '../../src/search/descend.ts';
import { axisOf, distanceTo } from './boxes.ts';

const box = (axes: number, lower: number, upper: number): Axis[] =>
  Array.from({ length: axes }, (_, index) => axisOf(`x${index}`, lower, upper));

const rosenbrock = (x: Float64Array): number => {
  let sum = 0;
  for (let i = 0; i + 1 < x.length; i += 1) {
    sum += 100 * ((x[i + 1] as number) - (x[i] as number) ** 2) ** 2 + (1 - (x[i] as number)) ** 2;
  }
  return sum;
};

describe('minima known by hand', () => {
  // H. H. Rosenbrock, Comput. J. 3, 175 (1960): the start (−1.2, 1), the minimum 0 at (1, 1).
  test('Rosenbrock in two variables', () => {
    const { place, value } = descend(rosenbrock, Float64Array.of(-1.2, 1), box(2, -2, 2));
    expect(value).toBeLessThan(1e-18);
    expect(distanceTo(place, [1, 1])).toBeLessThan(1e-8);
  });

  test.each([3, 4, 5])('Rosenbrock in %i variables', (n) => {
    const start = new Float64Array(n).fill(0.3);
    const { place, value } = descend(rosenbrock, start, box(n, -2, 2), { budget: 40_000 });
    expect(value).toBeLessThan(1e-12);
    expect(distanceTo(place, new Array(n).fill(1))).toBeLessThan(1e-5);
  });

  test('a kink in seven variables, Σ|x_i − c_i|, to 1e-11 of the box', () => {
    const centre = [0.1, 0.2, 0.3, 0.45, 0.6, 0.77, 0.9];
    const f = (x: Float64Array) => centre.reduce((sum, c, i) => sum + Math.abs((x[i] as number) - c), 0);
    const { place, stop } = descend(f, new Float64Array(7).fill(0.5), box(7, 0, 1));
    expect(distanceTo(place, centre)).toBeLessThan(1e-11);
    expect(stop).not.toBe('budget');
  });

  test('a kinked valley across the axes, 20|x − y| + |x + y − 1.2|, ends at (0.6, 0.6)', () => {
    const f = ([x, y]: Float64Array) =>
      20 * Math.abs((x as number) - (y as number)) + Math.abs((x as number) + (y as number) - 1.2);
    const { value } = descend(f, Float64Array.of(0.1, 0.2), box(2, 0, 1));
    expect(value).toBeLessThan(1e-6);
  });

  test('a narrow rotated parabola (condition 10^6) is followed to its bottom', () => {
    const f = ([x, y]: Float64Array) =>
      1e6 * ((x as number) - (y as number)) ** 2 + ((x as number) + (y as number) - 1) ** 2;
    const { place } = descend(f, Float64Array.of(0.9, 0.85), box(2, 0, 1));
    expect(distanceTo(place, [0.5, 0.5])).toBeLessThan(1e-6);
  });

  test('corners and edges are reached to the last bit', () => {
    const corner = descend(([x, y, z]) => (x as number) - (y as number) + (z as number), Float64Array.of(3, 4, 5), [
      axisOf('rs', 0.01, 100, 'logarithmic'),
      axisOf('s', 0, 5),
      axisOf('alpha', 0, Infinity, 'compact'),
    ]);
    expect([...corner.place]).toEqual([0.01, 5, 0]);
    const edge = descend(([x, y]) => ((x as number) - 0.3) ** 2 - (y as number), Float64Array.of(0.8, 0.2), [
      axisOf('x', 0, 1),
      axisOf('zeta', 0, 1, 'toward-upper'),
    ]);
    expect(edge.place[1]).toBe(1);
    expect(edge.place[0]).toBeCloseTo(0.3, 7);
  });

  test('a minimum beside an area without values is found: √(x − 0.25) from the right', () => {
    const { place } = descend(([x]) => Math.sqrt((x as number) - 0.25), Float64Array.of(0.9), box(1, 0, 1));
    expect(place[0]).toBeCloseTo(0.25, 11);
    expect(place[0]).toBeGreaterThanOrEqual(0.25);
  });
});

describe('laws', () => {
  test('the result lies in the box and is never above the start, whatever the function', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 1, max: 5 }),
        fc.array(fc.double({ min: 0, max: 1, noNaN: true }), { minLength: 5, maxLength: 5 }),
        fc.array(fc.double({ min: -40, max: 40, noNaN: true }), { minLength: 5, maxLength: 5 }),
        fc.constantFrom('linear', 'logarithmic', 'toward-upper', 'compact'),
        (n, parts, waves, scale) => {
          const axes = box(n, 0.5, 3).map((axis) => ({ ...axis, scale }) as Axis);
          const start = Float64Array.from(
            axes,
            ({ lower, upper }, i) => lower + (parts[i] as number) * (upper - lower),
          );
          const f = (x: Float64Array) => {
            let sum = 0;
            for (let i = 0; i < x.length; i += 1)
              sum += Math.sin((waves[i] as number) * (x[i] as number)) + 0.1 * (x[i] as number);
            return sum > 1.5 ? Number.NaN : sum;
          };
          const { place, value } = descend(f, start, axes, { budget: 500 });
          const first = f(start);
          expect(value <= first || (Number.isNaN(first) && value <= Infinity)).toBe(true);
          expect(
            axes.every(({ lower, upper }, i) => (place[i] as number) >= lower && (place[i] as number) <= upper),
          ).toBe(true);
          if (value < Infinity) expect(f(place)).toBe(value);
        },
      ),
      { seed: 99, numRuns: 200 },
    );
  });

  test('evaluations never exceed the budget, and running out is said', () => {
    let calls = 0;
    const counted = (x: Float64Array) => {
      calls += 1;
      return rosenbrock(x);
    };
    const { evaluations, stop } = descend(counted, Float64Array.of(-1.2, 1), box(2, -2, 2), { budget: 50 });
    expect([calls, evaluations, stop]).toEqual([50, 50, 'budget']);
  });

  test('a constant is flat, and costs little', () => {
    const { stop, evaluations, place } = descend(() => 1, Float64Array.of(0.3, 0.3), box(2, 0, 1));
    expect(stop).toBe('flat');
    expect(evaluations).toBeLessThan(200);
    expect([...place]).toEqual([0.3, 0.3]);
  });

  test('a start outside the box is refused', () => {
    expect(() => descend(() => 1, Float64Array.of(2), box(1, 0, 1))).toThrow(RangeError);
  });
});
