import { blockFunction, type EvaluateBlock, type PointFunction } from './block.ts';
import { type Box, boxAround, boxHolds, isResolved, overlap, widened } from './box.ts';
import { crossings } from './cross.ts';
import type { AxisGrid } from './grid.ts';
import { refineHull } from './hull.ts';
import { descendFromMany } from './minima.ts';
import { extentOf, type Region, regionsOf } from './region.ts';
import type { ScanOutput, SearchStop, Spot } from './scan.ts';
import { type Zoom, zoom } from './zoom.ts';

export interface RefineOptions {
  /** The same function on blocks, with one output: makes finer scans affordable. */
  readonly evaluate?: EvaluateBlock;
  /** Evaluations of the local searches (default 40 000). */
  readonly budget?: number;
  /** Points that one finer scan should take (default 2^17 with `evaluate`, else 2^14); a thin wide box may take 8 times that. */
  readonly zoomPoints?: number;
  /** Regions that may be looked at on finer grids (default 8), each in at most 4 scans. */
  readonly zooms?: number;
  /** Local minima followed to their end (default 8). */
  readonly keep?: number;
}

interface RefinedRegion extends Region {
  /** Measured on a grid finer than that of the first scan. */
  readonly finer: boolean;
  /** It reaches beyond the box that was looked at: share and hull are lower bounds. */
  readonly cutOff: boolean;
}

export interface SearchResult {
  /** Distinct local minima, lowest first; the first is the lowest value found by a local search. */
  readonly minima: readonly Spot[];
  readonly violated: boolean;
  /** Part of the domain's points with a value; badly resolved regions are measured on finer grids. */
  readonly violatedShare: number;
  /** Largest first. A region with 0 points was met by local search only: its hull is a cross through it. */
  readonly regions: readonly RefinedRegion[];
  /** Regions left out, and their share. */
  readonly moreRegions: number;
  readonly shareOfMore: number;
  /** Evaluations besides those of the first scan. */
  readonly points: number;
  /** `budget`: some local search was cut short. */
  readonly stop: SearchStop;
}

/**
 * From the scan of one output: the true local minima; regions that the grid resolves badly, or that
 * only a local search met, scanned again on finer grids; hull ends found by bisection. A local minimum
 * within a grid step of a region's hull is taken to belong to that region.
 *
 * What is certain to be seen is a violated region that holds a box of one grid step along every axis.
 * A narrower one is found where its surroundings slope towards it at some grid point near by.
 */
export function searchMinimum(
  f: PointFunction,
  scan: ScanOutput,
  grids: readonly AxisGrid[],
  options: RefineOptions = {},
): SearchResult {
  const level = -scan.tolerance;
  const search = descendFromMany(
    f,
    scan.candidates,
    grids.map(({ axis }) => axis),
    { step: 1 / 64, budget: options.budget ?? 40_000, keep: options.keep ?? 8 },
  );
  const closer = makeCloser(f, scan, grids, options);
  const coarse = regionsOf(scan, grids);
  const boxes = coarse.kept.map((region) => boxAround(region, grids));
  const seen = coarse.kept.flatMap((region, index) => {
    if (isResolved(region, grids)) return [closer.asSeen(region)];
    const box = boxes[index] as Box;
    const alone = coarse.more === 0 && boxes.every((other) => other === box || !overlap(other, box));
    return closer.look(box, region.deepest.place, alone) ?? [closer.asSeen(region)];
  });
  const regions = [...seen];
  for (const minimum of search.minima) {
    if (!(minimum.value < level)) break;
    const known = regions.findIndex((region) => boxHolds(boxAround(region, grids), minimum.place));
    if (known < 0) regions.push(...closer.fromPlace(minimum));
    else regions[known] = withDeepest(regions[known] as RefinedRegion, minimum);
  }
  regions.sort((a, b) => b.share - a.share);
  return {
    minima: search.minima,
    violated: (search.minima[0]?.value ?? Infinity) < level,
    violatedShare: Math.min(
      1,
      regions.reduce((sum, { share }) => sum + share, coarse.shareOfMore),
    ),
    regions,
    moreRegions: coarse.more,
    shareOfMore: coarse.shareOfMore,
    points: search.evaluations + closer.points(),
    stop: search.stop,
  };
}

function withDeepest(region: RefinedRegion, spot: Spot): RefinedRegion {
  return spot.value < region.deepest.value ? { ...region, deepest: spot } : region;
}

/** Looks at regions more closely, and counts the points that takes. */
function makeCloser(f: PointFunction, scan: ScanOutput, grids: readonly AxisGrid[], options: RefineOptions) {
  const { evaluate = blockFunction(f), zooms = 8 } = options;
  const { tolerance, valuedWeight } = scan;
  const zoomPoints = options.zoomPoints ?? (options.evaluate === undefined ? 2 ** 14 : 2 ** 17);
  const request = { evaluate, grids, tolerance, valuedWeight, points: zoomPoints };
  let points = 0;
  let looks = 0;
  const withEnds = (region: Region, seenOn: readonly AxisGrid[], finer: boolean, cutOff = false): RefinedRegion => {
    const refined = refineHull(region, f, seenOn, grids, -tolerance);
    points += refined.evaluations;
    return { ...refined.region, finer, cutOff };
  };
  const look = (box: Box, seed: Float64Array, alone: boolean): RefinedRegion[] | undefined => {
    if (looks >= zooms) return undefined;
    looks += 1;
    const found: Zoom | undefined = zoom(request, box, seed, alone);
    points += found?.points ?? 0;
    return found?.regions.map((region) => withEnds(region, found.grids, true, found.cutOff));
  };
  /** A region that lies between the grid points: its widths along the axes through its minimum size the box. */
  const fromPlace = (spot: Spot): RefinedRegion[] => {
    points += 1;
    if (!(f(spot.place) < -tolerance)) return [];
    const box = grids.map((grid, axis): readonly [number, number] => {
      const { lower, upper, evaluations } = crossings(f, spot.place, axis, grid, -tolerance);
      points += evaluations;
      return [lower.value, upper.value];
    });
    const found = look(widened(box, grids), spot.place, false);
    if (found !== undefined) return found.map((region) => withDeepest(region, spot));
    const hull = box.map(([lower, upper], axis) => extentOf((grids[axis] as AxisGrid).axis, lower, upper));
    const ends = grids.map(() => [spot.place, spot.place] as const);
    return [{ share: 0, points: 0, hull, deepest: spot, ends, finer: false, cutOff: true }];
  };
  return { look, fromPlace, asSeen: (region: Region) => withEnds(region, grids, false), points: () => points };
}
