import { describe, expect, test } from 'vitest';
import { gridOf } from '../../src/search/grid.ts';
import { refineHull } from '../../src/search/hull.ts';
import { regionsOf } from '../../src/search/region.ts';
import { axisOf, cubeGrids, distanceTo, scanOf } from './boxes.ts';

describe('connected regions', () => {
  test('two discs apart are two regions of known area, the larger first', () => {
    const f = (x: Float64Array) => Math.min(distanceTo(x, [0.25, 0.25]) - 0.2, distanceTo(x, [0.75, 0.7]) - 0.1);
    const grids = cubeGrids(2, 201);
    const { kept, more } = regionsOf(scanOf(f, grids), grids);
    expect(more).toBe(0);
    expect(kept.map(({ share }) => share)).toEqual([
      expect.closeTo(Math.PI * 0.04, 2),
      expect.closeTo(Math.PI * 0.01, 3),
    ]);
    expect(distanceTo((kept[1] as (typeof kept)[0]).deepest.place, [0.75, 0.7])).toBeLessThan(1e-12);
  });

  test('a hull is refined from grid values to the circle’s ends', () => {
    const centre = [0.503, 0.498];
    const f = (x: Float64Array) => distanceTo(x, centre) - 0.2345;
    const grids = cubeGrids(2, 101);
    const [region] = regionsOf(scanOf(f, grids), grids).kept;
    const { hull } = refineHull(region as NonNullable<typeof region>, f, grids, grids, 0).region;
    for (const [axis, { lower, upper, spans }] of hull.entries()) {
      expect(lower).toBeCloseTo((centre[axis] as number) - 0.2345, 6);
      expect(upper).toBeCloseTo((centre[axis] as number) + 0.2345, 6);
      expect(spans).toBe(false);
    }
  });

  test('a slab touches the ends it touches and spans the axes it spans', () => {
    const grids = [gridOf(axisOf('rs', 0.01, 100, 'logarithmic'), 21), gridOf(axisOf('s', 0, 5), 51)];
    const [region] = regionsOf(
      scanOf(([, s]) => 2.05 - (s as number), grids),
      grids,
    ).kept;
    const [rs, s] = (region as NonNullable<typeof region>).hull;
    expect(rs).toMatchObject({ spans: true, lower: 0.01, upper: 100 });
    expect(s).toMatchObject({ touchesLower: false, touchesUpper: true, spans: false, upper: 5 });
    expect(s?.lower).toBeCloseTo(2.1, 12);
  });

  test('a thin slanted band is one region', () => {
    const grids = cubeGrids(2, 101);
    const f = ([x, y]: Float64Array) => Math.abs((x as number) - (y as number)) - 1e-3;
    expect(regionsOf(scanOf(f, grids), grids).kept.length).toBe(1);
  });

  test('beyond the kept ones regions are counted, with their share', () => {
    const grids = cubeGrids(1, 1001);
    // sin(20πx) < −0.5 on a third of each of ten periods.
    const regions = regionsOf(
      scanOf(([x]) => Math.sin(20 * Math.PI * (x as number)) + 0.5, grids),
      grids,
      8,
    );
    expect([regions.kept.length, regions.more]).toEqual([8, 2]);
    const total = regions.kept.reduce((sum, { share }) => sum + share, regions.shareOfMore);
    expect(total).toBeCloseTo(1 / 3, 2);
  });

  test('cells without a value separate regions', () => {
    const grids = cubeGrids(2, 31);
    const f = ([x]: Float64Array) => (Math.abs((x as number) - 0.5) < 0.02 ? Number.NaN : -1);
    expect(regionsOf(scanOf(f, grids), grids).kept.map(({ share }) => share)).toEqual([
      expect.closeTo(0.5, 12),
      expect.closeTo(0.5, 12),
    ]);
  });
});
