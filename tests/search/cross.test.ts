import { describe, expect, test } from 'vitest';
import { crossings } from '../../src/search/cross.ts';
import { gridOf } from '../../src/search/grid.ts';
import { axisOf } from './boxes.ts';

const grid = gridOf(axisOf('s', 0, 5), 51);

describe('the violated interval through a place', () => {
  test('of (s − 1.96)(s − 2.28) < 0 is known by its factors', () => {
    const f = ([s]: Float64Array) => ((s as number) - 1.96) * ((s as number) - 2.28);
    const { lower, upper } = crossings(f, Float64Array.of(2.1), 0, grid, 0);
    expect(lower.kind).toBe('crossing');
    expect(lower.value).toBeCloseTo(1.96, 9);
    expect(upper.value).toBeCloseTo(2.28, 9);
    expect(f(Float64Array.of(lower.value))).toBeLessThan(0);
  });

  test('reaches the end of the domain and says so', () => {
    const { lower, upper } = crossings(([s]) => Math.PI - (s as number), Float64Array.of(4), 0, grid, 0);
    expect(lower.value).toBeCloseTo(Math.PI, 9);
    expect(upper).toEqual({ value: 5, kind: 'end' });
  });

  test('ends where there is no value, which is not called a crossing', () => {
    const { upper } = crossings(([s]) => -Math.sqrt(3.3 - (s as number)) - 1, Float64Array.of(1), 0, grid, 0);
    expect(upper.kind).toBe('no-value');
    expect(upper.value).toBeCloseTo(3.3, 9);
  });

  test('runs along one axis only, on a logarithmic axis to 1e-10 of the value', () => {
    const rs = gridOf(axisOf('rs', 0.01, 100, 'logarithmic'), 41);
    const f = ([s, x]: Float64Array) => (x as number) - 0.02 * (s as number);
    const { upper, lower } = crossings(f, Float64Array.of(2, 0.015), 1, rs, 0);
    expect(lower).toEqual({ value: 0.01, kind: 'end' });
    expect(Math.abs(upper.value / 0.04 - 1)).toBeLessThan(1e-9);
  });

  test('of a place that is not violated does not exist', () => {
    expect(() => crossings(() => 1, Float64Array.of(2), 0, grid, 0)).toThrow(RangeError);
  });
});
