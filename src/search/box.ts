import { axisUnit, axisValue } from './axis.ts';
import type { AxisGrid } from './grid.ts';
import type { Region } from './region.ts';

/** Lower and upper value along each axis. */
export type Box = readonly (readonly [number, number])[];

/** A region that fewer grid values than this cross along some axis is resolved badly. */
const wellResolved = 12;
/** The least width of a box in unit coordinates. */
const leastWidth = 1e-9;

/** Whether enough grid values cross the region along every axis for its share to be trusted. */
export function isResolved({ hull }: Region, grids: readonly AxisGrid[]): boolean {
  return grids.every(({ values }, axis) => {
    const { lower, upper } = hull[axis] as Region['hull'][number];
    const inside = values.filter((value) => value >= lower && value <= upper).length;
    return inside >= Math.min(wellResolved, values.length);
  });
}

/** The hull of a region and one grid step more on every side. */
export function boxAround({ hull }: Region, grids: readonly AxisGrid[]): Box {
  return grids.map(({ values }, axis) => {
    const { lower, upper } = hull[axis] as Region['hull'][number];
    const before = values.findLast((value) => value < lower) ?? lower;
    return [before, values.find((value) => value > upper) ?? upper];
  });
}

/** A box three times as wide in unit coordinates, inside the domain. */
export function widened(box: Box, grids: readonly AxisGrid[]): Box {
  return grids.map(({ axis }, index) => {
    const [low, high] = box[index] as readonly [number, number];
    const [from, to] = [axisUnit(axis, low), axisUnit(axis, high)];
    const width = Math.max(to - from, leastWidth);
    return [axisValue(axis, from - width), axisValue(axis, to + width)];
  });
}

export function overlap(a: Box, b: Box): boolean {
  return a.every(([lower, upper], axis) => {
    const [otherLower, otherUpper] = b[axis] as readonly [number, number];
    return lower <= otherUpper && otherLower <= upper;
  });
}

export function boxHolds(box: Box, place: Float64Array): boolean {
  return box.every(([lower, upper], axis) => {
    const value = place[axis] as number;
    return value >= lower && value <= upper;
  });
}
