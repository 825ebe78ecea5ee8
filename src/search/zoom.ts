import { axisMeasure, axisUnit, axisValue, partOfAxis } from './axis.ts';
import type { EvaluateBlock } from './block.ts';
import { type Box, boxHolds } from './box.ts';
import { type AxisGrid, gridOf } from './grid.ts';
import { extentOf, type Region, regionsOf } from './region.ts';
import { scanGrid } from './scan.ts';

export interface Zoom {
  /** Largest first; shares, ends and touching flags speak of the whole domain. */
  readonly regions: readonly Region[];
  /** The grids of the last, finest scan. */
  readonly grids: readonly AxisGrid[];
  readonly points: number;
  /** The regions reach beyond the last box that was scanned: their shares and hulls are too small. */
  readonly cutOff: boolean;
}

export interface ZoomRequest {
  readonly evaluate: EvaluateBlock;
  /** The grids of the first scan. */
  readonly grids: readonly AxisGrid[];
  readonly tolerance: number;
  /** Total weight of the points with a value in the first scan. */
  readonly valuedWeight: number;
  /** Points that one scan should take; up to `stretch` times that to halve the steps of a wide box at all. */
  readonly points: number;
}

const rounds = 4;
/** Part of the box that a hull must fill along each axis to be well resolved. */
const enoughFilled = 0.5;
const mostPerAxis = 1025;
const stretch = 8;
const mostRegions = 64;

/**
 * Scans a box again on a finer grid, and moves the box until it just holds what it shows: grown where a
 * region reaches its side, shrunk where a region is much smaller. `seed` is a violated place in the box;
 * unless the region is `alone` there, only what the hull around the seed holds is kept. `undefined` where
 * the box is too wide to be scanned more finely with that many points.
 */
export function zoom(request: ZoomRequest, start: Box, seed: Float64Array, alone: boolean): Zoom | undefined {
  let box = start;
  let points = 0;
  let found: Zoom | undefined;
  for (let round = 0; round < rounds; round += 1) {
    const grids = finerGrids(request.grids, box, request.points, seed);
    if (grids === undefined) break;
    const scan = scanGrid(request.evaluate, grids, { tolerances: [request.tolerance], candidates: 1 });
    points += scan.points;
    const [output] = scan.outputs as [(typeof scan.outputs)[0]];
    const { kept } = regionsOf(output, grids, mostRegions);
    const chosen = alone ? kept : kept.filter((region) => boxHolds(hullOf([region], grids.length), seed));
    if (chosen.length === 0) break;
    const hull = hullOf(chosen, grids.length);
    const next = fittedBox(request.grids, grids, box, hull);
    const fraction = measureOf(request.grids, box) * (output.valuedWeight / request.valuedWeight);
    found = {
      regions: chosen.map((region) => inDomain(region, fraction, request.grids)),
      grids,
      points,
      cutOff: next?.grows ?? false,
    };
    if (next === undefined) break;
    box = next.box;
  }
  return found && { ...found, points };
}

/**
 * Grids over the box that keep the density of the first scan along every axis and, while points are
 * left, halve the steps of the axis with fewest values. `undefined` where nothing can be halved.
 */
function finerGrids(
  grids: readonly AxisGrid[],
  box: Box,
  points: number,
  seed: Float64Array,
): readonly AxisGrid[] | undefined {
  const counts = grids.map(({ values }, axis) => {
    const [lower, upper] = box[axis] as readonly [number, number];
    return lower === upper ? 1 : Math.max(3, values.filter((value) => value >= lower && value <= upper).length);
  });
  const product = () => counts.reduce((total, count) => total * count, 1);
  const limit = Math.min(stretch * points, Math.max(points, 2 * product()));
  let halvings = 0;
  for (;;) {
    let thinnest = -1;
    for (const [axis, count] of counts.entries()) {
      if (count > 1 && count < mostPerAxis && (thinnest < 0 || count < (counts[thinnest] as number))) thinnest = axis;
    }
    if (thinnest < 0 || (product() / (counts[thinnest] as number)) * (2 * (counts[thinnest] as number) - 1) > limit)
      break;
    counts[thinnest] = 2 * (counts[thinnest] as number) - 1;
    halvings += 1;
  }
  if (halvings === 0 || product() > limit) return undefined;
  return grids.map(({ axis }, index) => {
    const [lower, upper] = box[index] as readonly [number, number];
    return gridOf(partOfAxis(axis, lower, upper), counts[index] as number, [seed[index] as number]);
  });
}

function hullOf(regions: readonly Region[], axes: number): Box {
  return Array.from({ length: axes }, (_, axis) => [
    Math.min(...regions.map(({ hull }) => hull[axis]?.lower as number)),
    Math.max(...regions.map(({ hull }) => hull[axis]?.upper as number)),
  ]);
}

/** The box to scan next, or undefined where the present one fits. */
function fittedBox(
  domain: readonly AxisGrid[],
  grids: readonly AxisGrid[],
  box: Box,
  hull: Box,
): { readonly box: Box; readonly grows: boolean } | undefined {
  let isFitting = true;
  let grows = false;
  const next = domain.map(({ axis }, index): readonly [number, number] => {
    const [low, high] = (box[index] as readonly [number, number]).map((value) => axisUnit(axis, value)) as [
      number,
      number,
    ];
    const [from, to] = (hull[index] as readonly [number, number]).map((value) => axisUnit(axis, value)) as [
      number,
      number,
    ];
    if (low === high) return box[index] as readonly [number, number];
    const width = high - low;
    const step = width / ((grids[index] as AxisGrid).values.length - 1);
    const grownLow = low > 0 && from <= low;
    const grownHigh = high < 1 && to >= high;
    grows ||= grownLow || grownHigh;
    if (grows || to - from + 2 * step < enoughFilled * width) isFitting = false;
    return [
      axisValue(axis, grownLow ? low - width / 2 : from - 1.5 * step),
      axisValue(axis, grownHigh ? high + width / 2 : to + 1.5 * step),
    ];
  });
  return isFitting ? undefined : { box: next, grows };
}

function measureOf(domain: readonly AxisGrid[], box: Box): number {
  return domain.reduce((product, { axis }, index) => {
    const [lower, upper] = box[index] as readonly [number, number];
    return axis.lower === axis.upper ? product : product * (axisMeasure(axis, upper) - axisMeasure(axis, lower));
  }, 1);
}

function inDomain(region: Region, fraction: number, domain: readonly AxisGrid[]): Region {
  return {
    ...region,
    share: region.share * fraction,
    hull: region.hull.map(({ lower, upper }, axis) => extentOf((domain[axis] as AxisGrid).axis, lower, upper)),
  };
}
