import { partOfAxis } from './axis.ts';
import type { PointFunction } from './block.ts';
import { boxAround } from './box.ts';
import { crossings } from './cross.ts';
import { descend } from './descend.ts';
import type { AxisGrid } from './grid.ts';
import { extentOf, type Region } from './region.ts';

/** Rounds of moving an end outwards and looking for a deeper place beside it. */
const rounds = 4;
const descentBudget = 150;

/**
 * The region with the ends of its hull moved from grid values to where f rises to the level: outwards
 * along the axis, to 1e-10 of the value, then to the lowest place at that coordinate, from where the
 * region may reach further, and so on for a few rounds. Exact where the boundary is smooth and the axes
 * are its own; a slanted thin region may reach a little further. `grids` are those the region was seen
 * on, `domain` those whose ends the hull may touch.
 */
export function refineHull(
  region: Region,
  f: PointFunction,
  grids: readonly AxisGrid[],
  domain: readonly AxisGrid[],
  level: number,
): { readonly region: Region; readonly evaluations: number } {
  let evaluations = 0;
  const box = boxAround(region, grids);
  const moved = (index: number, side: 0 | 1): number => {
    const grid = grids[index] as AxisGrid;
    const [lower, upper] = box[index] as readonly [number, number];
    const limit = side === 0 ? lower : upper;
    let place = (region.ends[index] as readonly [Float64Array, Float64Array])[side].slice();
    for (let round = 0; round < rounds; round += 1) {
      const before = place[index] as number;
      evaluations += 1;
      if (before === limit || !(f(place) < level)) break;
      const interval = crossings(f, place, index, grid, level);
      evaluations += interval.evaluations;
      const end = (side === 0 ? interval.lower : interval.upper).value;
      place[index] = end;
      if (!Number.isFinite(end)) break;
      if (round > 0 && Math.abs(end - before) <= 1e-6 * Math.abs(limit - end)) break;
      const axes = grids.map(({ axis }, other) => {
        const [low, high] = other === index ? [end, end] : (box[other] as readonly [number, number]);
        return other === index ? { ...axis, lower: end, upper: end } : partOfAxis(axis, low, high);
      });
      const deeper = descend(f, place, axes, { quick: true, step: 1 / 8, unitTolerance: 1e-4, budget: descentBudget });
      evaluations += deeper.evaluations;
      if (!(deeper.value < level)) break;
      place = deeper.place.slice();
    }
    return place[index] as number;
  };
  const hull = region.hull.map((extent, index) => {
    const { axis } = domain[index] as AxisGrid;
    return extentOf(
      axis,
      extent.touchesLower ? extent.lower : moved(index, 0),
      extent.touchesUpper ? extent.upper : moved(index, 1),
    );
  });
  return { region: { ...region, hull }, evaluations };
}
