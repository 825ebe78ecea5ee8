import type { Graph, NodeId } from '../graph/graph.ts';
import { compileKernel, compilePoint, type Kernel } from '../kernel/float64.ts';
import type { Axis } from '../search/axis.ts';
import type { EvaluateBlock, PointFunction } from '../search/block.ts';
import { crossings, type Interval } from '../search/cross.ts';
import { type AxisGrid, gridOf } from '../search/grid.ts';
import { descendFromMany } from '../search/minima.ts';
import { searchMinimum } from '../search/refine.ts';
import { type Extent, extentOf } from '../search/region.ts';
import { samplePoints } from '../search/sample.ts';
import { type ScanOutput, type Spot, scanGrid } from '../search/scan.ts';
import { gridCount, pinnedValues, sampledPoints } from './domain.ts';

/** A part of the domain in which a condition is violated. */
export interface ViolatedRegion {
  readonly share: number;
  readonly hull: readonly Extent[];
}

/** What looking at a margin over its domain found; everything in double precision. */
export interface Evidence {
  readonly axes: readonly Axis[];
  /** The margin; NaN where it has no finite value. */
  readonly at: PointFunction;
  readonly points: number;
  readonly withoutValue: number;
  /** The share of the domain that they stand for. */
  readonly withoutValueShare: number;
  readonly firstWithoutValue: Float64Array | undefined;
  /** Local minima, lowest first. */
  readonly minima: readonly Spot[];
  readonly violatedShare: number;
  readonly regions: readonly ViolatedRegion[];
  readonly moreRegions: number;
  /** Grid values per axis; 0 where points are sampled. */
  readonly counts: readonly number[];
  /** The violated interval along each axis through a violated place. */
  readonly through: (place: Float64Array) => readonly Interval[];
}

/** Starting points of the local searches of a margin, their evaluations in all, and the minima followed to their end. */
const startingPoints = 32;
const searchBudget = 12_000;
const minimaKept = 6;

/** Looks at several margins over one product grid, in one pass. A point is violated below −tolerance. */
export function lookOnGrid(
  graph: Graph,
  nodes: readonly NodeId[],
  axes: readonly Axis[],
  tolerances: readonly number[],
  onPoints: (points: number) => void,
): Evidence[] {
  const grids = axes.map((axis) => gridOf(axis, gridCount(axis.name, axes.length), pinnedValues[axis.name]));
  const lengths = grids.map(({ values }) => values.length);
  const groups = axes.map(({ name }) => ({ variables: [name] }));
  const kernel = compileKernel(graph, nodes, groups, lengths);
  const scan = scanGrid(
    (slices, out) => {
      kernel.evaluate(
        slices.map((slice) => [slice]),
        out,
      );
      out.forEach(dropInfinities);
    },
    grids,
    { tolerances, candidates: startingPoints },
  );
  onPoints(scan.points);
  return scan.outputs.map((output, index) => gridEvidence(graph, nodes[index] as NodeId, output, grids));
}

function gridEvidence(graph: Graph, node: NodeId, output: ScanOutput, grids: readonly AxisGrid[]): Evidence {
  const axes = grids.map(({ axis }) => axis);
  const at = pointFunction(graph, node, axes);
  const found = searchMinimum(at, output, grids, {
    evaluate: blockFunctionOf(graph, node, axes),
    budget: searchBudget,
    keep: minimaKept,
  });
  return {
    axes,
    at,
    points: output.points,
    withoutValue: output.withoutValue,
    withoutValueShare: output.withoutValue / output.points,
    firstWithoutValue: output.firstWithoutValue,
    minima: found.minima.map((spot) => tidied(at, spot, axes)),
    violatedShare: found.violatedShare,
    regions: found.regions,
    moreRegions: found.moreRegions,
    counts: grids.map(({ values }) => values.length),
    through: (place) => grids.map((grid, index) => crossings(at, place, index, grid, -output.tolerance)),
  };
}

/** One margin on blocks of its grid; compiled when a finer scan first asks for it. */
function blockFunctionOf(graph: Graph, node: NodeId, axes: readonly Axis[]): EvaluateBlock {
  let kernel: Kernel | undefined;
  return (slices, out) => {
    kernel ??= compileKernel(
      graph,
      [node],
      axes.map(({ name }) => ({ variables: [name] })),
    );
    kernel.evaluate(
      slices.map((slice) => [slice]),
      out,
    );
    out.forEach(dropInfinities);
  };
}

/** The same minimum at a neater place: coordinates at the end of their axis or with few digits, where that costs nothing. */
export function tidied(at: PointFunction, { place, value }: Spot, axes: readonly Axis[]): Spot {
  const allowed = value + 1e-10 * Math.abs(value);
  const neat = place.slice();
  let lowest = value;
  axes.forEach(({ lower, upper }, index) => {
    const exact = neat[index] as number;
    const near = (end: number) => Math.abs(exact - end) <= 1e-6 * (upper - lower);
    const candidates = [lower, upper].filter(near).concat(Number(exact.toPrecision(4)), Number(exact.toPrecision(7)));
    for (const candidate of candidates) {
      neat[index] = Math.min(upper, Math.max(lower, candidate));
      const found = at(neat);
      if (found <= allowed) {
        lowest = found;
        return;
      }
    }
    neat[index] = exact;
  });
  return { place: neat, value: lowest };
}

/** Looks at several margins at points spread over a box of many axes. */
export function lookAtSamples(
  graph: Graph,
  nodes: readonly NodeId[],
  axes: readonly Axis[],
  tolerances: readonly number[],
  onPoints: (points: number) => void,
): Evidence[] {
  const kernel = compileKernel(graph, nodes, [{ variables: axes.map(({ name }) => name) }]);
  const reductions = nodes.map(
    (node, index) => new Sampling(pointFunction(graph, node, axes), axes, tolerances[index] as number),
  );
  for (const { coordinates, even } of samplePoints(axes, { count: sampledPoints })) {
    const out = nodes.map(() => new Float64Array(even.length));
    kernel.evaluate([coordinates], out);
    reductions.forEach((reduction, index) => {
      reduction.add(coordinates, even, out[index] as Float64Array);
    });
    onPoints(even.length);
  }
  return reductions.map((reduction) => reduction.evidence());
}

/** Reduces the samples of one margin. Shares are taken from the points that fill the box evenly. */
class Sampling {
  readonly #at: PointFunction;
  readonly #axes: readonly Axis[];
  readonly #level: number;
  #points = 0;
  #evenPoints = 0;
  #evenBelow = 0;
  #withoutValue = 0;
  #evenWithoutValue = 0;
  #firstWithoutValue: Float64Array | undefined;
  #lowest: Spot[] = [];
  readonly #hull: { lower: number; upper: number }[];

  constructor(at: PointFunction, axes: readonly Axis[], tolerance: number) {
    this.#at = at;
    this.#axes = axes;
    this.#level = -tolerance;
    this.#hull = axes.map(({ lower, upper }) => ({ lower: upper, upper: lower }));
  }

  add(coordinates: readonly Float64Array[], even: Uint8Array, values: Float64Array): void {
    const placeOf = (point: number) => Float64Array.from(coordinates, (column) => column[point] as number);
    for (let point = 0; point < values.length; point++) {
      const value = values[point] as number;
      this.#points++;
      if (!Number.isFinite(value)) {
        this.#withoutValue++;
        if (even[point] === 1) this.#evenWithoutValue++;
        this.#firstWithoutValue ??= placeOf(point);
        continue;
      }
      if (even[point] === 1) {
        this.#evenPoints++;
        if (value < this.#level) this.#evenBelow++;
      }
      if (value < this.#level) this.#widen(placeOf(point));
      const highest = this.#lowest.at(-1);
      if (highest === undefined || this.#lowest.length < startingPoints || value < highest.value) {
        this.#lowest = [...this.#lowest, { place: placeOf(point), value }]
          .sort((a, b) => a.value - b.value)
          .slice(0, startingPoints);
      }
    }
  }

  #widen(place: Float64Array): void {
    this.#hull.forEach((extent, axis) => {
      extent.lower = Math.min(extent.lower, place[axis] as number);
      extent.upper = Math.max(extent.upper, place[axis] as number);
    });
  }

  evidence(): Evidence {
    const axes = this.#axes;
    const at = this.#at;
    const share = this.#evenPoints === 0 ? 0 : this.#evenBelow / this.#evenPoints;
    const hull = axes.map((axis, index) => {
      const { lower, upper } = this.#hull[index] as { lower: number; upper: number };
      return extentOf(axis, lower, upper);
    });
    const grids = axes.map((axis) => gridOf(axis, 65));
    return {
      axes,
      at,
      points: this.#points,
      withoutValue: this.#withoutValue,
      withoutValueShare: this.#evenWithoutValue / Math.max(1, this.#evenPoints + this.#evenWithoutValue),
      firstWithoutValue: this.#firstWithoutValue,
      minima: descendFromMany(at, this.#lowest, axes, { budget: searchBudget, keep: minimaKept }).minima.map((spot) =>
        tidied(at, spot, axes),
      ),
      violatedShare: share,
      regions: hull.some(({ lower, upper }) => lower > upper) ? [] : [{ share, hull }],
      moreRegions: 0,
      counts: axes.map(() => 0),
      through: (place) => grids.map((grid, index) => crossings(at, place, index, grid, this.#level)),
    };
  }
}

/** A margin that depends on no coordinate. */
export function lookOnce(graph: Graph, node: NodeId): Evidence {
  const at = pointFunction(graph, node, []);
  const place = new Float64Array(0);
  const value = at(place);
  const hasValue = Number.isFinite(value);
  return {
    axes: [],
    at,
    points: 1,
    withoutValue: hasValue ? 0 : 1,
    withoutValueShare: hasValue ? 0 : 1,
    firstWithoutValue: hasValue ? undefined : place,
    minima: hasValue ? [{ place, value }] : [],
    violatedShare: 1,
    regions: [],
    moreRegions: 0,
    counts: [],
    through: () => [],
  };
}

function pointFunction(graph: Graph, node: NodeId, axes: readonly Axis[]): PointFunction {
  const value = compilePoint(
    graph,
    node,
    axes.map(({ name }) => name),
  );
  return (place) => {
    const margin = value(place);
    return Number.isFinite(margin) ? margin : Number.NaN;
  };
}

/** An infinite margin says nothing in double precision; high precision looks at the point again. */
function dropInfinities(values: Float64Array): void {
  for (let k = 0; k < values.length; k++) if (!Number.isFinite(values[k] as number)) values[k] = Number.NaN;
}
