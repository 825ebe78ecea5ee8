import { describe, expect, test } from 'vitest';
import { samplePoints } from '../../src/search/sample.ts';
import { axisOf } from './boxes.ts';

const axes = Array.from({ length: 7 }, (_, index) => axisOf(`x${index}`, 0, 1));
const flat = (options: { count: number; blockPoints?: number; edgeShare?: number }): number[][] => {
  const points: number[][] = [];
  for (const { coordinates, even } of samplePoints(axes, options)) {
    for (const [point, flag] of even.entries())
      points.push([flag, ...coordinates.map((values) => values[point] as number)]);
  }
  return points;
};

describe('sampled points', () => {
  test('begin with the corners of the box', () => {
    const corners = flat({ count: 128 }).map(([, ...place]) => place.join(''));
    expect(new Set(corners).size).toBe(128);
    expect(corners.every((corner) => /^[01]{7}$/.test(corner))).toBe(true);
  });

  test('do not depend on the size of the blocks', () => {
    expect(flat({ count: 1000, blockPoints: 77 })).toEqual(flat({ count: 1000 }));
  });

  test('fill the box evenly: a corner box of side 0.7 holds 0.7^7 of them', () => {
    const even = flat({ count: 40_000 }).filter(([flag]) => flag === 1);
    const inside = even.filter(([, ...place]) => place.every((value) => value < 0.7)).length / even.length;
    expect(Math.abs(inside - 0.7 ** 7)).toBeLessThan(2e-3);
  });

  test('a quarter has coordinates at ends, about half of them each', () => {
    const points = flat({ count: 20_000 }).slice(128);
    const edges = points.filter(([flag]) => flag === 0);
    expect(edges.length / points.length).toBeCloseTo(0.25, 1);
    const atEnds = edges.map(([, ...place]) => place.filter((value) => value === 0 || value === 1).length);
    expect(atEnds.reduce((sum, count) => sum + count, 0) / atEnds.length).toBeCloseTo(3.5, 1);
  });
});
