import type { Axis, Scale } from '../../src/search/axis.ts';
import { blockFunction, type PointFunction } from '../../src/search/block.ts';
import { type AxisGrid, gridOf } from '../../src/search/grid.ts';
import { type RefineOptions, type SearchResult, searchMinimum } from '../../src/search/refine.ts';
import { type ScanOutput, scanGrid } from '../../src/search/scan.ts';

/** An axis named by its letter. */
export function axisOf(name: string, lower: number, upper: number, scale: Scale = 'linear'): Axis {
  return { name, lower, upper, scale };
}

/** A cube with so many grid values a side. */
export function cubeGrids(axes: number, count: number, lower = 0, upper = 1): AxisGrid[] {
  return Array.from({ length: axes }, (_, index) => gridOf(axisOf(`x${index}`, lower, upper), count));
}

export function scanOf(f: PointFunction, grids: readonly AxisGrid[], tolerance = 0): ScanOutput {
  return scanGrid(blockFunction(f), grids, { tolerances: [tolerance] }).outputs[0] as ScanOutput;
}

export function searchOf(
  f: PointFunction,
  grids: readonly AxisGrid[],
  tolerance = 0,
  options: RefineOptions = {},
): SearchResult {
  return searchMinimum(f, scanOf(f, grids, tolerance), grids, { evaluate: blockFunction(f), ...options });
}

export function distanceTo(place: ArrayLike<number>, centre: readonly number[]): number {
  return Math.hypot(...centre.map((value, axis) => (place[axis] as number) - value));
}
