import type { DomainCoordinate } from '../constraint/domain.ts';
import type { MapPanel } from '../finding/margin-map.ts';
import {
  type PlaneRegions,
  type Rectangle,
  type RegionAxis,
  type RegionTree,
  regionStates,
} from '../finding/regions.ts';
import { type Axis, axisMeasure } from '../search/axis.ts';
import { readBoxTree } from '../search/box-tree.ts';
import { planeOf, planeParts, renumbered, withViolated } from '../search/plane.ts';

const mostExamples = 2;

/**
 * The regions on the plane of two axes; each other coordinate of the tree is held at the value given, or at its worst.
 * Edges along ζ are exact to a rounding, because the boxes are those of w. Coordinates at their worst may also be held at
 * values of `examples`, trees of the plane alone: what is violated there is violated at some value.
 */
export function regionsOnPlane(
  { axes, letters, boxes, stop, rewrites }: RegionTree,
  x: Axis,
  y: Axis,
  held: ReadonlyMap<string, number>,
  examples: readonly RegionTree[] = [],
): PlaneRegions {
  const indexOf = (name: string) => axes.findIndex((axis) => axis.name === name);
  const drawn = [indexOf(x.name), indexOf(y.name)] as const;
  const fixed = new Map(
    [...held]
      .map(([name, value]) => [indexOf(name), value] as const)
      .filter(([index]) => index >= 0)
      .map(([index, value]) => [index, alongTree(axes[index] as RegionAxis, value)] as const),
  );
  const whole = (axis: Axis, index: number) => {
    const own = axes[index];
    return own === undefined ? ([axis.lower, axis.upper] as const) : ([own.lower, own.upper] as const);
  };
  const bounds = { x: whole(x, drawn[0]), y: whole(y, drawn[1]) };
  const plane = examples.reduce(
    (known, example) => {
      const numbers = example.axes.map(({ name }) => indexOf(name));
      return withViolated(known, renumbered(readBoxTree(example.axes, example.letters), numbers));
    },
    planeOf(readBoxTree(axes, letters), drawn, fixed),
  );
  const parts = planeParts(plane, drawn, bounds);
  const measure = (axis: Axis, lower: number, upper: number) => axisMeasure(axis, upper) - axisMeasure(axis, lower);
  const found = regionStates.map((state) => {
    const rectangles = parts
      .filter((part) => part.state === state)
      .map((part): Rectangle => [...coordinates(x, axes[drawn[0]], part.x), ...coordinates(y, axes[drawn[1]], part.y)]);
    const share = rectangles.reduce((sum, [x0, x1, y0, y1]) => sum + measure(x, x0, x1) * measure(y, y0, y1), 0);
    // Where one state is everywhere, its share is 1 and not a rounding less.
    return { state, rectangles, share: rectangles.length === parts.length ? 1 : share };
  });
  const byState = <Value>(value: (entry: (typeof found)[number]) => Value) =>
    Object.fromEntries(found.map((entry) => [entry.state, value(entry)])) as Record<
      (typeof regionStates)[number],
      Value
    >;
  return {
    ...byState(({ rectangles }) => rectangles),
    shares: byState(({ share }) => share),
    boxes: examples.reduce((sum, example) => sum + example.boxes, boxes),
    stop,
    rewrites,
  };
}

/** Where a value of the coordinate is on the axis of the tree. */
function alongTree({ runs }: RegionAxis, value: number): number {
  return runs === 'root' ? Math.cbrt(1 - value) : value;
}

/** The part of the coordinate that a part of the tree's axis is; the ends of the axis are those of the domain. */
function coordinates(axis: Axis, own: RegionAxis | undefined, [lower, upper]: readonly [number, number]) {
  if (own?.runs !== 'root') return [lower, upper] as const;
  const at = (w: number) => (w <= own.lower ? axis.upper : w >= own.upper ? axis.lower : 1 - w ** 3);
  return [at(upper), at(lower)] as const;
}

/** Where violated cells take their smallest margin most often: values of the coordinates that a map leaves at their worst. */
export function worstPlaces(
  { worstOver, worstAt, margins }: MapPanel,
  tolerance: number,
): ReadonlyMap<DomainCoordinate, number>[] {
  if (worstOver.length === 0) return [];
  const found = new Map<string, { place: Map<DomainCoordinate, number>; cells: number }>();
  margins.forEach((margin, cell) => {
    if (margin === null || margin >= -tolerance) return;
    const place = new Map(worstOver.map(({ name }) => [name as DomainCoordinate, worstAt[name]?.[cell] as number]));
    const key = [...place.values()].join();
    const known = found.get(key) ?? { place, cells: 0 };
    known.cells++;
    found.set(key, known);
  });
  const most = [...found.values()].sort((a, b) => b.cells - a.cells);
  return most.slice(0, mostExamples).map(({ place }) => place);
}
