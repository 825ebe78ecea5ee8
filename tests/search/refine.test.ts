import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { gridOf } from '../../src/search/grid.ts';
import { axisOf, cubeGrids, distanceTo, searchOf } from './boxes.ts';

/** 1 outside, −depth at the centre. */
const well = (centre: readonly number[], width: number, depth: number) => (x: Float64Array) =>
  1 - (1 + depth) * Math.exp(-(distanceTo(x, centre) ** 2) / (2 * width ** 2));

describe('local minima', () => {
  // D. M. Himmelblau, Applied Nonlinear Programming (1972).
  test('all four of Himmelblau’s function, to 1e-6', () => {
    const himmelblau = ([x, y]: Float64Array) =>
      ((x as number) ** 2 + (y as number) - 11) ** 2 + ((x as number) + (y as number) ** 2 - 7) ** 2;
    const { minima, violated } = searchOf(himmelblau, cubeGrids(2, 41, -5, 5));
    const zeros = minima.filter(({ value }) => value < 1e-12).map(({ place }) => [...place]);
    expect(zeros.length).toBe(4);
    for (const centre of [
      [3, 2],
      [-2.805118, 3.131312],
      [-3.77931, -3.283186],
      [3.584428, -1.848126],
    ]) {
      expect(zeros.some((place) => distanceTo(place, centre) < 2e-6)).toBe(true);
    }
    expect(violated).toBe(false);
  });

  test('the lowest is never above the lowest grid point', () => {
    const f = ([x, y]: Float64Array) => Math.sin(37 * (x as number)) * Math.cos(53 * (y as number)) + (x as number);
    const result = searchOf(f, cubeGrids(2, 30));
    expect(result.minima[0]?.value).toBeLessThan(-0.9);
    expect(result.stop).toBe('complete');
  });
});

describe('narrow wells of width 1/300 between the grid points', () => {
  // On a flat ground a Gaussian is lower at the nearest grid point as long as it is not rounded away there:
  // half a cell's diagonal may be 8.5 widths.
  test.each([
    [2, 101],
    [2, 61],
    [3, 101],
    [3, 61],
  ])('in %i dimensions on %i values a side: place, depth, share and hull', (n, count) => {
    const centre = [0.31234, 0.67771, 0.5049].slice(0, n);
    const [width, depth] = [1 / 300, 0.5];
    const f = well(centre, width, depth);
    const { minima, regions, violatedShare, violated } = searchOf(f, cubeGrids(n, count));
    expect(violated).toBe(true);
    expect(minima[0]?.value).toBeCloseTo(-depth, 9);
    expect(distanceTo(minima[0]?.place as Float64Array, centre)).toBeLessThan(1e-8);
    // Below 0 within the radius width·√(2 ln(1 + depth)).
    const radius = width * Math.sqrt(2 * Math.log(1 + depth));
    const volume = n === 2 ? Math.PI * radius ** 2 : (4 / 3) * Math.PI * radius ** 3;
    expect(regions.length).toBe(1);
    expect(Math.abs(violatedShare / volume - 1)).toBeLessThan(0.03);
    for (const [axis, { lower, upper }] of (regions[0]?.hull ?? []).entries()) {
      expect(Math.abs(lower - ((centre[axis] as number) - radius))).toBeLessThan(0.02 * radius);
      expect(Math.abs(upper - ((centre[axis] as number) + radius))).toBeLessThan(0.02 * radius);
    }
  });

  test('on sloping ground are found when half a cell is within their basin', () => {
    const centre = [0.31234, 0.67771];
    const f = (x: Float64Array) => well(centre, 1 / 100, 0.5)(x) + 0.3 * (x[0] as number) + 0.2 * (x[1] as number);
    const { minima, regions } = searchOf(f, cubeGrids(2, 101));
    expect(minima[0]?.value).toBeLessThan(-0.2);
    expect(distanceTo(minima[0]?.place as Float64Array, centre)).toBeLessThan(0.01);
    expect(regions.length).toBe(1);
  });

  test('that a grid cannot see are missed: the limit is the cell', () => {
    const f = well([0.305, 0.705], 1 / 3000, 0.5);
    expect(searchOf(f, cubeGrids(2, 11)).violated).toBe(false);
  });
});

describe('what is certain', () => {
  test('a violated box a little wider than a grid step is found wherever it lies, without any slope to it', () => {
    const unit = () => fc.double({ min: 0, max: 1, noNaN: true });
    fc.assert(
      fc.property(unit(), unit(), unit(), (a, b, c) => {
        const centre = [a, b, c];
        const half = 0.5001 / 20;
        const f = (x: Float64Array) => (centre.every((at, i) => Math.abs((x[i] as number) - at) < half) ? -1 : 1);
        const { violated, violatedShare, regions } = searchOf(f, cubeGrids(3, 21), 0, { zoomPoints: 30_000 });
        const inside = (at: number) => Math.min(1, at + half) - Math.max(0, at - half);
        const exact = inside(a) * inside(b) * inside(c);
        expect(violated).toBe(true);
        expect(regions.length).toBe(1);
        expect(Math.abs(violatedShare / exact - 1)).toBeLessThan(0.15);
      }),
      { seed: 5, numRuns: 40 },
    );
  });

  test('a slanted thread between the grid points is found, and says where its measure is a lower bound', () => {
    // |x − y − 0.005| < 1e-3 for x < 0.5: a thread along the diagonal, half a step beside the grid points.
    const f = ([x, y]: Float64Array) =>
      Math.max(Math.abs((x as number) - (y as number) - 0.005) - 1e-3, (x as number) - 0.5);
    const { violated, violatedShare, regions } = searchOf(f, cubeGrids(2, 101));
    expect(violated).toBe(true);
    const exact = 2e-3 * 0.4965;
    expect(violatedShare).toBeLessThan(1.05 * exact);
    expect(regions.some(({ cutOff }) => cutOff) || Math.abs(violatedShare / exact - 1) < 0.1).toBe(true);
  });
});

describe('spots as they occur', () => {
  test('1.96 < s < 2.28 near r_s = 1 in a box of three coordinates', () => {
    const grids = [
      gridOf(axisOf('rs', 0.01, 100, 'logarithmic'), 41, [1]),
      gridOf(axisOf('zeta', 0, 1, 'toward-upper'), 13),
      gridOf(axisOf('s', 0, 5), 41),
    ];
    // Violated where ((s − 2.12)/0.16)² + (ln r_s/0.2)² < 1, at every ζ.
    const f = ([rs, , s]: Float64Array) =>
      (((s as number) - 2.12) / 0.16) ** 2 + (Math.log(rs as number) / 0.2) ** 2 - 1;
    const { regions, violatedShare, minima } = searchOf(f, grids);
    expect(minima[0]?.value).toBeCloseTo(-1, 9);
    const exact = (Math.PI * 0.16 * 0.2) / (5 * Math.log(1e4));
    expect(Math.abs(violatedShare / exact - 1)).toBeLessThan(0.02);
    const [rs, zeta, s] = regions[0]?.hull ?? [];
    expect(zeta?.spans).toBe(true);
    expect(Math.abs((s?.lower as number) - 1.96)).toBeLessThan(2e-3);
    expect(Math.abs((s?.upper as number) - 2.28)).toBeLessThan(2e-3);
    expect(Math.abs(Math.log(rs?.upper as number) - 0.2)).toBeLessThan(2e-3);
  });

  test('0.95 < ζ < 0.999 only', () => {
    const grids = [
      gridOf(axisOf('zeta', 0, 1, 'toward-upper'), 13),
      gridOf(axisOf('s', 0, 5), 33),
      gridOf(axisOf('alpha', 0, Infinity, 'compact'), 33, [1]),
    ];
    const f = ([zeta]: Float64Array) => ((zeta as number) - 0.95) * ((zeta as number) - 0.999);
    const { regions, violatedShare, minima } = searchOf(f, grids);
    expect(minima[0]?.place[0]).toBeCloseTo(0.9745, 6);
    expect(violatedShare).toBeCloseTo(0.049, 3);
    const [zeta, s, alpha] = regions[0]?.hull ?? [];
    expect([zeta?.lower, zeta?.upper]).toEqual([expect.closeTo(0.95, 5), expect.closeTo(0.999, 5)]);
    expect([s?.spans, alpha?.spans]).toEqual([true, true]);
  });

  test('two small regions apart are measured each on its own grid', () => {
    const f = (x: Float64Array) => Math.min(distanceTo(x, [0.2, 0.3]) - 0.012, distanceTo(x, [0.81, 0.62]) - 0.02);
    const { regions, violatedShare } = searchOf(f, cubeGrids(2, 60));
    expect(regions.length).toBe(2);
    expect(Math.abs(violatedShare / (Math.PI * (0.012 ** 2 + 0.02 ** 2)) - 1)).toBeLessThan(0.01);
    expect(regions.every(({ finer }) => finer)).toBe(true);
  });

  test('a large region keeps the share of the scan, and takes the true minimum in', () => {
    const f = (x: Float64Array) => distanceTo(x, [0.503, 0.498]) - 0.3;
    const { regions, violatedShare } = searchOf(f, cubeGrids(2, 101));
    expect(violatedShare).toBeCloseTo(Math.PI * 0.09, 3);
    expect(regions.map(({ finer }) => finer)).toEqual([false]);
    expect(regions[0]?.deepest.value).toBeCloseTo(-0.3, 9);
  });

  test('violated everywhere is a share of 1 and one region that spans every axis', () => {
    const { regions, violatedShare } = searchOf(() => -1, cubeGrids(3, 20));
    expect(violatedShare).toBeCloseTo(1, 12);
    expect(regions[0]?.hull.every(({ spans }) => spans)).toBe(true);
  });

  test('without any value there is no minimum, no region and no violation', () => {
    const result = searchOf(() => Number.NaN, cubeGrids(2, 9));
    expect([result.minima.length, result.regions.length, result.violated]).toEqual([0, 0, false]);
  });

  test('five coordinates, one of them fixed', () => {
    const centre = [0.3, 0.7, 0.4, 0.55];
    const grids = [...cubeGrids(4, 17), gridOf(axisOf('q', 2, 2), 1)];
    const f = (x: Float64Array) => distanceTo(x, centre) - 0.15 + (x[4] as number) - 2;
    const { minima, violatedShare } = searchOf(f, grids);
    expect(minima[0]?.value).toBeCloseTo(-0.15, 8);
    // The volume of a 4-ball, π²r⁴/2.
    expect(Math.abs(violatedShare / ((Math.PI ** 2 / 2) * 0.15 ** 4) - 1)).toBeLessThan(0.1);
  });
});
